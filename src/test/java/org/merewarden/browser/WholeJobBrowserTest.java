package org.merewarden.browser;

import static org.assertj.core.api.Assertions.assertThat;

import com.microsoft.playwright.Locator;
import com.microsoft.playwright.Response;
import java.time.LocalDate;
import java.time.ZoneOffset;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.MethodOrderer;
import org.junit.jupiter.api.Order;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.api.TestMethodOrder;
import org.merewarden.Demonstration;
import org.merewarden.DemonstrationApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.boot.test.web.server.LocalServerPort;
import org.springframework.jdbc.core.simple.JdbcClient;

/** The whole job as its people do it, one after the other, in a real browser. */
@DemonstrationApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
@TestMethodOrder(MethodOrderer.OrderAnnotation.class)
class WholeJobBrowserTest {
    private static final String STOCK = "/stocks/mizzow-lake/FPI";

    @LocalServerPort
    private int port;

    @Autowired
    private JdbcClient jdbc;

    private Browsers browsers;
    private String shareAddress;

    @BeforeAll
    void start() throws InterruptedException {
        browsers = Browsers.start();
        Demonstration.assessed(jdbc);
    }

    @AfterAll
    void stop() {
        if (browsers != null) {
            browsers.close();
        }
    }

    private Office person(String username) {
        return new Office(browsers.browser(), port, 1280, true).signIn(username);
    }

    @Test
    @Order(1)
    void theBiologistSortsChoosesAndCompares() {
        try (Office office = person("biologist")) {
            assertThat(office.path()).isEqualTo("/portfolio");
            office.follow("Margin to the fold");
            assertThat(office.path()).contains("sort=margin");
            assertThat(office.page().locator("th[aria-sort=ascending]").textContent())
                    .contains("Margin");
            for (int row = 0; row < 3; row++) {
                office.page().locator("tbody input[type=checkbox]").nth(row).check();
            }
            office.press("Compare the chosen stocks");
            assertThat(office.path()).startsWith("/portfolio/compare?");
            assertThat(office.page().locator("main table tbody tr").count()).isGreaterThanOrEqualTo(3);
            office.page().locator("main canvas").first().waitFor();
            office.picture("compare-1280");
            office.page().locator("main table tbody th a").first().click();
            assertThat(office.path()).startsWith("/stocks/");
            assertThat(office.text()).contains("This is not a forecast for this season.");
            office.picture("stock-1280");
        }
    }

    @Test
    @Order(2)
    void theBiologistProposesALimit() {
        try (Office office = person("biologist").go(STOCK)) {
            office.follow("Advice");
            office.page().getByLabel("Amount (total").fill("3.6");
            office.page().getByText("Set-asides and reported fraction").click();
            office.page().getByLabel("Set aside for angling").fill("0.4");
            office.page().getByLabel("Set aside for others").fill("0");
            office.page().getByLabel("Expected reported fraction").fill("0.9");
            office.page()
                    .getByLabel("Reason", new com.microsoft.playwright.Page.GetByLabelOptions())
                    .last()
                    .fill("Nearer the fold than last year.");
            Locator difference = office.page().getByLabel("Why it differs from the recommendation");
            if (difference.count() > 0) {
                difference.fill("The cooperatives agreed to less.");
            }
            office.press("Propose");
            assertThat(office.text()).contains("3.6 t for season");
            // (3.6 − 0.4) × 0.9 = 2.88
            assertThat(office.text()).contains("2.88 t");
            assertThat(office.page()
                            .locator("main")
                            .getByText("Issue", new Locator.GetByTextOptions().setExact(true))
                            .count())
                    .as("a biologist is offered no decision")
                    .isZero();
        }
    }

    @Test
    @Order(3)
    void theApproverIssuesIt() {
        try (Office office = person("approver").go(STOCK + "/advice")) {
            office.page().getByLabel("Remark of the issuer").fill("Agreed.");
            office.press("Issue");
            assertThat(office.page().locator("[role=status]").textContent()).contains("is issued and in force");
            assertThat(office.text()).contains("The limit in force for season").contains("3.6 t");
            office.picture("advice-1280");
            office.page()
                    .locator("td:has-text('in force')")
                    .locator("..")
                    .locator("a")
                    .first()
                    .click();
            assertThat(office.text()).contains("Issued").contains("2.88 t").contains("A limit is no entitlement");
            office.picture("notice-1280");
        }
    }

    @Test
    @Order(4)
    void theClerkLogsThreeLandingsAndCorrectsOne() {
        try (Office office = person("clerk")) {
            for (String weight : new String[] {"12.5", "8", "21"}) {
                office.go("/landings/new");
                office.page().locator("#lake").selectOption("mizzow-lake");
                office.page().locator("[id='lines[0].species']").selectOption("FPI");
                office.page().locator("[id='lines[0].weight']").fill(weight);
                office.press("Store");
                assertThat(office.text()).contains(weight);
            }
            office.picture("landing-stored-1280");
            office.go("/season/" + LocalDate.now(ZoneOffset.UTC).getYear() + "/landings?lake=mizzow-lake");
            office.picture("log-1280");
            int before = count("landing");
            office.follow("Correct");
            office.page().locator("[id='lines[0].weight']").fill("12");
            office.page().locator("#reason").fill("Misread the slip.");
            office.press("Store the correction");
            assertThat(count("landing")).as("a correction is a new entry").isEqualTo(before + 1);
            assertThat(jdbc.sql("select reason from landing where entry_kind = 'correction'")
                            .query(String.class)
                            .list())
                    .contains("Misread the slip.");
        }
    }

    private int count(String table) {
        return jdbc.sql("select count(*) from " + table).query(Integer.class).single();
    }

    @Test
    @Order(5)
    void theBiologistSharesAndAStrangerReads() {
        try (Office office = person("biologist").go("/shares");
                Office stranger = new Office(browsers.browser(), port, 360, true)) {
            office.page()
                    .locator("#cooperative")
                    .selectOption(new com.microsoft.playwright.options.SelectOption().setIndex(1));
            office.press("Make the link");
            office.picture("shares-1280");
            String text = office.page().content();
            int at = text.indexOf("/view/");
            shareAddress = text.substring(at).split("[^A-Za-z0-9/_-]")[0];
            stranger.go(shareAddress);
            assertThat(stranger.text()).contains("left").contains("A limit is no entitlement");
            assertThat(stranger.text().toLowerCase()).doesNotContain("margin");
            assertThat(stranger.overflow()).isZero();
            stranger.picture("view-360");
            EveryPageBrowserTest.assertClean(stranger, "the share view");
            office.press("Revoke");
            Response gone = stranger.page().navigate("http://localhost:" + port + shareAddress);
            assertThat(gone.status()).isEqualTo(404);
            Response never = stranger.page().navigate("http://localhost:" + port + "/view/" + "A".repeat(43));
            assertThat(never.status()).isEqualTo(404);
        }
    }
}
