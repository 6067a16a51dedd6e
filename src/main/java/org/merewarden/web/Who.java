package org.merewarden.web;

import org.springframework.security.core.Authentication;
import org.springframework.security.core.context.SecurityContextHolder;

/** Who is acting: the signed-in person's user name, or the system's where nobody is (jobs, start-up). */
public final class Who {
    public static final String SYSTEM = "merewarden";

    private Who() {}

    public static String name() {
        Authentication authentication = SecurityContextHolder.getContext().getAuthentication();
        return authentication == null || !authentication.isAuthenticated() ? SYSTEM : authentication.getName();
    }

    /** Whether the signed-in person has the role, e.g. {@code APPROVER}. */
    public static boolean has(String role) {
        Authentication authentication = SecurityContextHolder.getContext().getAuthentication();
        return authentication != null
                && authentication.getAuthorities().stream().anyMatch(a -> ("ROLE_" + role).equals(a.getAuthority()));
    }
}
