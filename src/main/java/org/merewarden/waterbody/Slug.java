package org.merewarden.waterbody;

import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Problem;

/** Codes that stand in addresses: lower-case letters, digits and hyphens; "new" is the address of the empty form. */
final class Slug {
    static final String PATTERN = "(?!new$)[a-z0-9-]+";

    private Slug() {}

    /** Why the code cannot stand in an address, or null. */
    static @Nullable Problem problem(String column, String code) {
        return code.matches(PATTERN) && code.length() <= 60
                ? null
                : new Problem(
                        column,
                        code,
                        "stands in addresses and needs 1 to 60 lower-case letters, digits and hyphens, and may not be"
                                + " “new”");
    }
}
