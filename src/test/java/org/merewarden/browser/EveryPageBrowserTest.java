package org.merewarden.browser;

import static org.assertj.core.api.Assertions.assertThat;

import com.deque.html.axecore.playwright.AxeBuilder;
import com.deque.html.axecore.results.Rule;
import java.util.List;
import java.util.stream.Stream;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.merewarden.Demonstration;
import org.merewarden.DemonstrationApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.boot.test.web.server.LocalServerPort;
import org.springframework.jdbc.core.simple.JdbcClient;

/** Every kind of page: no WCAG 2.2 A or AA violation that axe can see, no sideways scrolling, readable without scripts. */
@DemonstrationApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class EveryPageBrowserTest {
    private static final List<String> LEVELS = List.of("wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa");

    private static final List<String> PAGES = List.of(
            "/portfolio",
            "/portfolio?sort=margin&dir=asc&standing=strained",
            "/portfolio/compare",
            "/portfolio/compare?stock=skelder-water:PLN&stock=pellowin-lake:PLN&stock=mizzow-lake:FPI",
            "/stocks/pellowin-lake/PLN",
            "/stocks/thavick-water/ACH",
            "/stocks/lurrow-tarn/FPE",
            "/stocks/bothrick-lake/FPE",
            "/stocks/ilveray-water/FVE",
            "/stocks/orlow-tarn/ACH/evidence",
            "/stocks/pellowin-lake/PLN/assessments/1",
            "/stocks/lurrow-tarn/FPE/assessments/1",
            "/stocks/pellowin-lake/PLN/advice",
            "/stocks/pellowin-lake/PLN/advice?season=2026&revise=true",
            "/limits/1/papers",
            "/notices/1",
            "/water-bodies",
            "/water-bodies/skelder-water",
            "/water-bodies/keddrun-reservoir",
            "/water-bodies/skelder-water/edit",
            "/water-bodies/skelder-water/events",
            "/water-bodies/skelder-water/stocks/new",
            "/water-bodies/new",
            "/stocks/skelder-water/PLN/edit",
            "/cooperatives",
            "/cooperatives/new",
            "/cooperatives/quilder-hands",
            "/cooperatives/quilder-hands/edit",
            "/species-weights",
            "/imports",
            "/imports/1",
            "/formats",
            "/returns/2026",
            "/returns/2025",
            "/returns/1850",
            "/season/2026",
            "/season/2026/landings?lake=orlow-tarn",
            "/season/2026/stocks/skelder-water/PLN",
            "/landings/new",
            "/landings/3000/correct",
            "/assessments",
            "/assessments?run=1",
            "/policy",
            "/policy/1",
            "/policy/2?against=1",
            "/policy/new?from=1",
            "/shares",
            "/activity");

    private static final List<String> ADMINISTRATORS = List.of("/accounts", "/settings");

    /** Looked at by axe at both widths; the others differ in width alone and are looked at on the phone. */
    private static final List<String> WIDE_TOO = List.of(
            "/portfolio",
            "/stocks/pellowin-lake/PLN",
            "/stocks/pellowin-lake/PLN/assessments/1",
            "/stocks/pellowin-lake/PLN/advice",
            "/season/2026");

    @LocalServerPort
    private int port;

    @Autowired
    private JdbcClient jdbc;

    private Browsers browsers;
    private Office wide;
    private Office narrow;
    private Office withoutScripts;
    private Office administrator;

    @BeforeAll
    void start() throws InterruptedException {
        browsers = Browsers.start();
        Demonstration.assessed(jdbc);
        proposePolicy();
        wide = new Office(browsers.browser(), port, 1280, true).signIn("approver");
        narrow = new Office(browsers.browser(), port, 360, true).signIn("approver");
        withoutScripts = new Office(browsers.browser(), port, 320, false).signIn("approver");
        administrator = new Office(browsers.browser(), port, 1280, true).signIn("administrator");
    }

    /** A second version that waits for a decision, so that there is one to compare and decide about. */
    private void proposePolicy() {
        jdbc.sql("insert into policy_version select 2, limit_fraction, 'CATCH', ramp_target_fraction,"
                        + " ramp_low_fraction, ramp_high_fraction, catch_quantile, horizon_years, 0.05, steadiness_cap,"
                        + " carry_over, payback, set_aside_subsistence, set_aside_angling, set_aside_research,"
                        + " set_aside_other, rounding_share, rounding_least_kg, watch_from, strained_from,"
                        + " critical_from, pooled, interval_probability, current_timestamp, 'biologist'"
                        + " from policy_version where number = 1"
                        + " and not exists (select 1 from policy_version where number = 2)")
                .update();
        jdbc.sql("insert into policy_act (policy_number, act, decided_at, decided_by, reason)"
                        + " select 2, 'PROPOSED', current_timestamp, 'biologist', 'More careful after two bad years.'"
                        + " where not exists (select 1 from policy_act where policy_number = 2)")
                .update();
    }

    @AfterAll
    void stop() {
        if (browsers != null) {
            browsers.close();
        }
    }

    static Stream<String> pages() {
        return PAGES.stream();
    }

    @ParameterizedTest
    @MethodSource("pages")
    void isAccessibleAndFits(String path) {
        String name = path.substring(1).replaceAll("[^A-Za-z0-9]+", "-");
        for (Office office : List.of(wide, narrow)) {
            office.go(path);
            assertThat(office.page().locator("h1").count()).as("one h1").isEqualTo(1);
            office.picture("page-" + name + (office == wide ? "-1280" : "-360"));
            assertThat(office.overflow()).as("pixels wider than the window").isZero();
            if (office == narrow || WIDE_TOO.contains(path)) {
                assertClean(office, path);
            }
        }
    }

    @ParameterizedTest
    @MethodSource("pages")
    void readsWithoutScriptsAt320(String path) {
        withoutScripts.go(path);
        assertThat(withoutScripts.heading()).isNotBlank();
        assertThat(withoutScripts.text().length()).isGreaterThan(80);
    }

    @Test
    void administratorsPagesToo() {
        for (String path : ADMINISTRATORS) {
            administrator.go(path);
            assertThat(administrator.page().locator("h1").count()).isEqualTo(1);
            administrator.picture("page-" + path.substring(1) + "-1280");
            assertClean(administrator, path);
        }
    }

    @Test
    void theDoorIsAccessible() {
        try (Office stranger = new Office(browsers.browser(), port, 360, true)) {
            stranger.go("/sign-in");
            assertClean(stranger, "/sign-in");
            stranger.picture("page-sign-in-360");
            stranger.go("/portfolio");
            assertThat(stranger.path()).startsWith("/sign-in");
            assertThat(stranger.page().locator("code").count()).isEqualTo(8);
        }
    }

    static void assertClean(Office office, String path) {
        List<Rule> violations = new AxeBuilder(office.page())
                .withTags(LEVELS)
                // our pages have no frames: no second page is needed to gather results
                .setLegacyMode(true)
                .analyze()
                .getViolations();
        assertThat(violations)
                .as("axe on " + path)
                .extracting(rule -> rule.getId() + ": " + rule.getHelp() + " "
                        + rule.getNodes().stream()
                                .map(n -> n.getTarget() + " " + n.getHtml())
                                .toList())
                .isEmpty();
    }
}
