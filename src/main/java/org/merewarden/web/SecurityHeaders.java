package org.merewarden.web;

import org.springframework.security.config.Customizer;
import org.springframework.security.config.annotation.web.builders.HttpSecurity;
import org.springframework.security.config.annotation.web.configurers.HeadersConfigurer;
import org.springframework.security.web.header.writers.ReferrerPolicyHeaderWriter.ReferrerPolicy;

/**
 * The headers every answer carries beside the platform's own (no sniffing, no framing, no storing of pages): nothing is
 * loaded from elsewhere, nothing runs in line, and no address is handed on, since a share link is a secret.
 */
public final class SecurityHeaders {
    public static final String CONTENT_POLICY = "default-src 'self'; script-src 'self'; style-src 'self';"
            + " img-src 'self' data:; object-src 'none'; base-uri 'none'; form-action 'self'; frame-ancestors 'none'";

    private SecurityHeaders() {}

    public static Customizer<HeadersConfigurer<HttpSecurity>> all() {
        return headers -> headers.contentSecurityPolicy(policy -> policy.policyDirectives(CONTENT_POLICY))
                .referrerPolicy(policy -> policy.policy(ReferrerPolicy.NO_REFERRER))
                .permissionsPolicyHeader(policy -> policy.policy("camera=(), geolocation=(), microphone=()"));
    }
}
