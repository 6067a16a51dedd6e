package org.merewarden.account;

import java.util.Set;

/**
 * A person with an account, as other features see them.
 *
 * @param waters codes of the waters at which a clerk may log landings; {@code *} stands for all
 * @param enabled whether the account may sign in
 */
public record Person(String username, String displayName, Role role, Set<String> waters, boolean enabled) {
    /** A clerk logs at the waters assigned to them, biologists and approvers anywhere, administrators nowhere. */
    public boolean mayLogAt(String lakeCode) {
        return switch (role) {
            case BIOLOGIST, APPROVER -> true;
            case CLERK -> waters.contains(ALL_WATERS) || waters.contains(lakeCode);
            case ADMINISTRATOR -> false;
        };
    }

    static final String ALL_WATERS = "*";
}
