package org.merewarden.web;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import org.junit.jupiter.api.Test;

/** The roles' tasks as the product describes them. */
class NavigationTest {
    @Test
    void eachRoleSeesWhatItMayUse() {
        assertThat(addresses("CLERK"))
                .containsExactly(
                        "/portfolio",
                        "/season/2026",
                        "/landings/new",
                        "/water-bodies",
                        "/cooperatives",
                        "/assessments",
                        "/policy");
        assertThat(addresses("BIOLOGIST"))
                .contains("/imports", "/shares", "/activity")
                .doesNotContain("/accounts", "/settings");
        assertThat(addresses("APPROVER")).isEqualTo(addresses("BIOLOGIST"));
        assertThat(addresses("ADMINISTRATOR"))
                .contains("/accounts", "/settings", "/shares", "/activity")
                .doesNotContain("/landings/new", "/imports");
        assertThat(addresses(null)).isEmpty();
    }

    @Test
    void thePageShownAndTheOneAboveItAreMarked() {
        assertThat(marks("/portfolio")).containsExactly("/portfolio page");
        assertThat(marks("/portfolio/compare")).containsExactly("/portfolio true");
        assertThat(marks("/season/2025/landings")).containsExactly("/season/2026 true");
        assertThat(marks("/policy-of-another")).isEmpty();
    }

    private static List<String> addresses(String role) {
        return Navigation.of(role, 2026, "/").stream()
                .map(Navigation.Link::address)
                .toList();
    }

    private static List<String> marks(String address) {
        return Navigation.of("CLERK", 2026, address).stream()
                .filter(link -> link.current() != null)
                .map(link -> link.address() + " " + link.current())
                .toList();
    }
}
