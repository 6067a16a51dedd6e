package org.merewarden.portfolio;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.net.URI;
import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.regex.Pattern;
import java.util.stream.Collectors;
import org.hamcrest.Matchers;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.StatementCount;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.assessment.AssessForTests;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;

@WholeApplication
class PortfolioPagesTest {
    /** Of one lake each; the names share a word that no other test's lakes have. */
    private static boolean filled;

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private AssessForTests assessments;

    @BeforeEach
    void threeLakes() {
        if (filled) {
            return;
        }
        filled = true;
        TestRegion region = new TestRegion(jdbc);
        for (String name : List.of("Amber", "Basalt", "Chalk")) {
            long stock = region.stock(region.lake("pf-" + name.toLowerCase(), "Portfoliomere " + name), "FPE");
            if (!name.equals("Chalk")) {
                region.catches(stock, 2015, List.of(9.0, 10.0, 12.0, 11.0, 9.0, 8.0, 9.0, 10.0, 9.0, 8.0));
                region.index(stock, 2015, List.of(2.0, 1.9, 1.7, 1.5, 1.4, 1.5, 1.4, 1.3, 1.2, 1.2));
                assessments.assess(stock, 2024);
            }
        }
    }

    private String page(String address) throws Exception {
        return mvc.perform(get(URI.create(address)).with(user("b").roles("BIOLOGIST")))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString(StandardCharsets.UTF_8);
    }

    /** The lakes of the table's rows, in order. */
    private static List<String> lakes(String html) {
        return Pattern.compile("<a href=\"/stocks/(pf-[a-z0-9-]+)/FPE\">")
                .matcher(html)
                .results()
                .map(m -> m.group(1))
                .toList();
    }

    @Test
    void aProposalThatWaitsLeadsToItsDecision() throws Exception {
        long stock = jdbc.sql("select s.id from stock s join water_body w on w.id = s.water_body_id where w.code = ?")
                .param("pf-amber")
                .query(Long.class)
                .single();
        jdbc.sql(
                        "insert into catch_limit (stock_id, season_year, amount, unit, valid_from, valid_to, origin, created_at,"
                                + " created_by) values (?, 2149, 7.125, 't', date '2149-01-01', date '2149-12-31', 'decided',"
                                + " current_timestamp, 'test')")
                .param(stock)
                .update();
        jdbc.sql(
                        "insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason)"
                                + " select max(id), 'PROPOSED', current_timestamp, 'test', current_timestamp, 'why' from catch_limit")
                .update();
        assertThat(page("/portfolio"))
                .contains("7.125\u00a0t for season 2149")
                .contains("href=\"/stocks/pf-amber/FPE/advice?season=2149#open\"");
        jdbc.sql(
                        "insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason)"
                                + " select max(id), 'REFUSED', current_timestamp, 'test', current_timestamp, 'no' from catch_limit")
                .update();
        assertThat(page("/portfolio")).doesNotContain("for season 2149");
    }

    @Test
    void theTableSortsByItsHeadersLinksAndKeepsTheFilter() throws Exception {
        String up = page("/portfolio?q=portfoliomere&sort=water&dir=asc");
        assertThat(lakes(up)).startsWith("pf-amber", "pf-basalt", "pf-chalk");
        assertThat(up)
                .contains("aria-sort=\"ascending\"")
                .contains("href=\"/portfolio?q=portfoliomere&amp;sort=water&amp;dir=desc\"");
        assertThat(lakes(page("/portfolio?q=portfoliomere&sort=water&dir=desc")))
                .endsWith("pf-chalk", "pf-basalt", "pf-amber");
        assertThat(lakes(page("/portfolio?q=portfoliomere%20amber"))).containsExactly("pf-amber");
        assertThat(lakes(page("/portfolio?q=portfoliomere&standing=unassessed")))
                .contains("pf-chalk");
    }

    @Test
    void anUnassessedStockIsSortedLastEitherWay() throws Exception {
        assertThat(lakes(page("/portfolio?q=portfoliomere%20a&sort=msy&dir=asc")))
                .last()
                .isEqualTo("pf-chalk");
        assertThat(lakes(page("/portfolio?q=portfoliomere%20a&sort=msy&dir=desc")))
                .last()
                .isEqualTo("pf-chalk");
    }

    @Test
    void theFilesHoldTheShownRows() throws Exception {
        String query = "?q=portfoliomere&sort=water&dir=desc";
        String csv = page("/portfolio.csv" + query);
        String shown = lakes(page("/portfolio" + query)).stream()
                .map(code -> jdbc.sql("select name from water_body where code = ?")
                        .param(code)
                        .query(String.class)
                        .single())
                .collect(Collectors.joining(" "));
        assertThat(csv.lines().skip(2).map(l -> l.split(",")[0]).collect(Collectors.joining(" ")))
                .isEqualTo(shown);
        mvc.perform(get("/portfolio.xlsx" + query).with(user("b").roles("BIOLOGIST")))
                .andExpect(status().isOk())
                .andExpect(content()
                        .contentTypeCompatibleWith(
                                "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet"));
    }

    @Test
    void anAssessedStockHasItsDiagramHistoryAndActions() throws Exception {
        String html = page("/stocks/pf-amber/FPE");
        assertThat(html)
                .contains("in Portfoliomere Amber: ")
                .contains("<canvas class=\"equilibrium\"")
                .contains("<canvas class=\"history\"")
                .contains("action=\"/stocks/pf-amber/FPE/assessments\"")
                .contains("href=\"/stocks/pf-amber/FPE/assessments/1\"")
                .contains("href=\"/stocks/pf-amber/FPE/evidence\"")
                .doesNotContain("style=\"")
                .doesNotContain("??");
    }

    @Test
    void onlyBiologistsAndApproversMayAssess() throws Exception {
        mvc.perform(get("/stocks/pf-amber/FPE").with(user("c").roles("CLERK")))
                .andExpect(status().isOk())
                .andExpect(content().string(Matchers.not(Matchers.containsString("/FPE/assessments\""))));
    }

    @Test
    void aStockWithoutAssessmentSaysHowToGetOne() throws Exception {
        assertThat(page("/stocks/pf-chalk/FPE"))
                .contains("No assessment is stored yet")
                .contains("action=\"/stocks/pf-chalk/FPE/assessments\"");
    }

    @Test
    void anUnknownStockIsNotFound() throws Exception {
        mvc.perform(get("/stocks/pf-amber/XXX").with(user("b").roles("BIOLOGIST")))
                .andExpect(status().isNotFound());
    }

    @Test
    void comparisonDrawsTheChosenAndExplainsWithout() throws Exception {
        String html = page("/portfolio/compare?stock=pf-amber:FPE&stock=pf-basalt:FPE&stock=pf-chalk:FPE&axes=hectare");
        assertThat(html)
                .contains("Catch, kg/ha a year")
                .contains("Not drawn, because no assessment has a result for it:")
                .contains("aria-current=\"page\"")
                .contains("id=\"comparison\"")
                .doesNotContain("??");
        assertThat(page("/portfolio/compare")).contains("Choose between one and twelve");
    }

    @Test
    void statementsDoNotGrowWithTheStocks() throws Exception {
        page("/portfolio");
        int few = StatementCount.during(() -> page("/portfolio"));
        TestRegion region = new TestRegion(jdbc);
        for (int i = 0; i < 57; i++) {
            long stock = region.stock(region.lake("pf-many-" + i, "Portfoliomere Zz" + i), "FPE");
            region.limit(stock, 2026, 5);
        }
        int many = StatementCount.during(
                () -> assertThat(lakes(page("/portfolio"))).hasSizeGreaterThanOrEqualTo(60));
        assertThat(few).isPositive();
        assertThat(many).isEqualTo(few);
    }
}
