package org.merewarden.portfolio;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.containsString;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.flash;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.awt.Rectangle;
import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.Locale;
import java.util.stream.IntStream;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.Demonstration;
import org.merewarden.DemonstrationApplication;
import org.merewarden.Paper;
import org.merewarden.StatementCount;
import org.merewarden.advice.Limits;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.web.Figures;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;

/** The meeting pack of the demonstration region, read back. */
@DemonstrationApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class MeetingPackTest {
    private static final Rectangle WITHIN = new Rectangle(14, 5, 182, 287);
    private static final int EACH = 13;
    private static final String ADDRESS = "/portfolio/pack.pdf";

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private Portfolio portfolio;

    @Autowired
    private Limits limits;

    @BeforeAll
    void assessed() throws InterruptedException {
        Demonstration.assessed(jdbc);
        LocaleContextHolder.setLocale(Locale.UK);
    }

    private ResultActions asked(List<String> stocks) throws Exception {
        var request = get(ADDRESS).locale(Locale.UK).with(user("b").roles("BIOLOGIST"));
        stocks.forEach(s -> request.param("stock", s));
        return mvc.perform(request);
    }

    private Paper pack(List<String> stocks) throws Exception {
        return new Paper(asked(stocks)
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsByteArray());
    }

    private Entry entry(String key) {
        return portfolio.entries(limits.presentSeason()).stream()
                .filter(e -> e.stock().key().equals(key))
                .findFirst()
                .orElseThrow();
    }

    private static void assertEveryPageWithinMargins(Paper paper, String name) throws Exception {
        for (int page = 1; page <= paper.pages(); page++) {
            Rectangle ink = Paper.ink(paper.picture(page, name));
            assertThat(WITHIN.contains(ink)).as("page %d, ink %s", page, ink).isTrue();
            assertThat(ink.height).as("page %d is not blank", page).isGreaterThan(100);
        }
    }

    @Test
    void threeStocksAreATableAndTwoPagesOfDrawings() throws Exception {
        List<String> keys = List.of("skelder-water:PLN", "pellowin-lake:PLN", "mizzow-lake:FPI");
        try (Paper paper = pack(List.of(keys.get(0), keys.get(1), "nowhere:FPE", keys.get(2), keys.get(0)))) {
            assertEveryPageWithinMargins(paper, "pack-three");
            assertThat(paper.pages()).isEqualTo(3);
            assertThat(paper.title()).isEqualTo("Meeting pack, season " + limits.presentSeason());
            assertThat(paper.language()).isEqualTo("en");
            assertThat(paper.marked()).isTrue();
            assertThat(paper.fonts()).containsExactlyInAnyOrder("DejaVuSans", "DejaVuSans-Bold");
            assertThat(paper.tags()).contains("H1", "H2", "Table", "TH", "TD", "Figure");
            assertThat(paper.text(1)).contains("There is no stock of this name: nowhere:FPE.", "INVENTED DATA");
            for (int i = 0; i < keys.size(); i++) {
                Entry e = entry(keys.get(i));
                AssessmentView a = e.assessment();
                // a long interval goes on in the next line
                assertThat(paper.text(1).replace("– ", "–"))
                        .contains(
                                e.stock().title(),
                                Figures.interval(a.msyTonnes(), a.msyLowTonnes(), a.msyHighTonnes()),
                                Figures.interval(a.bOverBmsy(), a.bOverBmsyLow(), a.bOverBmsyHigh()))
                        .contains(Figures.tonnes(e.limitTonnes()).replace('\u00a0', ' '));
                assertThat(paper.text(2 + i / 2)).contains(e.stock().title());
                assertThat(paper.alternatives())
                        .anyMatch(t -> t.startsWith(
                                "Lasting catches against biomass: " + e.stock().title()))
                        .anyMatch(t -> t.startsWith(e.stock().title() + ": biomass at the start of each season"));
            }
        }
    }

    @Test
    void theWholeRegionFits() throws Exception {
        List<String> all = portfolio.entries(limits.presentSeason()).stream()
                .map(e -> e.stock().key())
                .toList();
        try (Paper paper = pack(all)) {
            assertEveryPageWithinMargins(paper, "pack-region");
            // 30 stocks: the table may need two pages, the stocks need 15
            assertThat(paper.pages()).isBetween(16, 17);
            for (Entry e : portfolio.entries(limits.presentSeason())) {
                assertThat(paper.text()
                                .split(java.util.regex.Pattern.quote(e.stock().title()), -1)
                                .length)
                        .as(e.stock().title())
                        .isGreaterThan(2);
            }
        }
    }

    @Test
    void aProposalThatWaitsStandsInTheTable() throws Exception {
        Entry e = entry("skelder-water:PLN");
        jdbc.sql(
                        "insert into catch_limit (stock_id, season_year, amount, unit, valid_from, valid_to, origin, created_at,"
                                + " created_by) values (?, 2150, 7.25, 't', date '2150-01-01', date '2150-12-31', 'decided',"
                                + " current_timestamp, 'test')")
                .param(e.stock().id())
                .update();
        long id = jdbc.sql("select max(id) from catch_limit").query(Long.class).single();
        decide(id, "PROPOSED");
        try (Paper paper = pack(List.of("skelder-water:PLN"))) {
            assertThat(paper.text(1)).contains("7.25 t for 2150");
        }
        decide(id, "REFUSED");
        try (Paper paper = pack(List.of("skelder-water:PLN"))) {
            assertThat(paper.text(1)).doesNotContain("7.25 t for 2150");
        }
    }

    private void decide(long id, String act) {
        jdbc.sql("insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason)"
                        + " values (?, ?, current_timestamp, 'test', current_timestamp, 'for a test')")
                .params(id, act)
                .update();
    }

    @Test
    void eachStockCostsTheSameFewStatements() throws Exception {
        List<String> keys = portfolio.entries(limits.presentSeason()).stream()
                .filter(e -> e.assessment() != null)
                .map(e -> e.stock().key())
                .limit(5)
                .toList();
        pack(keys).close();
        int one = StatementCount.during(() -> pack(keys.subList(0, 1)).close());
        int five = StatementCount.during(() -> pack(keys).close());
        assertThat(five - one).isLessThanOrEqualTo(4 * EACH);
        assertThat(one).isLessThanOrEqualTo(EACH + 30);
    }

    @Test
    void noneOrTooManyAreAnsweredWithASentence() throws Exception {
        List<String> many =
                IntStream.rangeClosed(1, 41).mapToObj(i -> "lake-" + i + ":FPE").toList();
        for (List<String> stocks : List.of(List.<String>of(), many)) {
            asked(stocks)
                    .andExpect(redirectedUrl("/portfolio"))
                    .andExpect(flash().attribute("refused", containsString("between 1 and 40 stocks")));
        }
    }

    @Test
    void thePortfolioOffersIt() throws Exception {
        assertThat(new String(
                        mvc.perform(get("/portfolio").with(user("b").roles("BIOLOGIST")))
                                .andReturn()
                                .getResponse()
                                .getContentAsByteArray(),
                        StandardCharsets.UTF_8))
                .contains("formaction=\"" + ADDRESS + "\"");
    }
}
