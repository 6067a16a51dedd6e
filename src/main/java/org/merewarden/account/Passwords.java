package org.merewarden.account;

import java.nio.charset.StandardCharsets;
import org.jspecify.annotations.Nullable;
import org.springframework.validation.Errors;

/** What a password must be: long rather than odd. BCrypt reads no more than 72 bytes. */
final class Passwords {
    static final int SHORTEST = 12;
    static final int MOST_BYTES = 72;

    private Passwords() {}

    static void check(@Nullable String password, String field, Errors errors) {
        String typed = password == null ? "" : password;
        if (typed.length() < SHORTEST) {
            errors.rejectValue(field, "account.password.short", new Object[] {SHORTEST, typed.length()}, "too short");
        } else if (typed.getBytes(StandardCharsets.UTF_8).length > MOST_BYTES) {
            errors.rejectValue(field, "account.password.long", new Object[] {MOST_BYTES}, "too long");
        }
    }
}
