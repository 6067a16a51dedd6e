package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.util.UUID;
import java.util.stream.DoubleStream;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.advice.AdviceWorking.Basis;
import org.merewarden.advice.AdviceWorking.Between;
import org.merewarden.assessment.AssessForTests;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.policy.LimitRule;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.Recommendation;
import org.merewarden.records.SeasonInProgress;
import org.merewarden.web.Figures;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;

/** The rule put to stored stocks: what stands between assessment and limit, and what the page says of it. */
@WholeApplication
class AdviserTest {
    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private MockMvc mvc;

    @Autowired
    private AssessForTests assess;

    @Autowired
    private Adviser adviser;

    @Autowired
    private StepWords words;

    @Autowired
    private OutlookDrawings drawings;

    @Autowired
    private SeasonInProgress log;

    @Autowired
    private Seasons seasons;

    private TestRegion region;
    private String lake;
    private long stock;
    private int current;

    @BeforeEach
    void register() {
        region = new TestRegion(jdbc);
        lake = "adv-" + UUID.randomUUID().toString().substring(0, 8);
        stock = region.stock(region.lake(lake, "Advised Lake " + lake), "FPE");
        current = seasons.current();
    }

    /** Twelve seasons of catches and an index, up to the season before the current one, and an assessment of them. */
    private void assessed() {
        double[] catches = {30, 40, 45, 45, 40, 30, 15, 10, 10, 10, 12, 15};
        double[] index = {19, 16, 13.5, 11.5, 10, 9.5, 10, 11, 12, 13, 13.5, 14};
        region.catches(stock, current - 12, DoubleStream.of(catches).boxed().toList());
        region.index(stock, current - 12, DoubleStream.of(index).boxed().toList());
        assess.assess(stock, current - 1);
    }

    private void landed(LocalDate date, double kg) {
        jdbc.sql("insert into landing (entry_key, entry_kind, season_year, landed_on, water_body_id, stock_id, species,"
                        + " sector, weight_kg, live_weight_kg, presentation, conversion_factor, fate, recorded_at,"
                        + " recorded_by) select ?, 'landing', ?, ?, water_body_id, id, 'FPE', 'commercial', ?, ?, 'whole', 1,"
                        + " 'kept', ?, 'test' from stock where id = ?")
                .params(UUID.randomUUID().toString(), current, date, kg, kg, OffsetDateTime.now(), stock)
                .update();
    }

    @Test
    void withoutAnAssessmentThereIsNoAdvice() {
        assertThat(adviser.advise(stock, current)).isEmpty();
    }

    @Test
    void theSeasonAfterTheAssessedOneHasNothingBetween() {
        assessed();
        AdviceWorking working = adviser.work(stock, current).orElseThrow();
        assertThat(working.between()).isEmpty();
        assertThat(working.outlook().firstSeason()).isEqualTo(current);
        // recorded removals of the season before; no limit
        assertThat(working.earlier().removalsTonnes()).isEqualTo(15);
        assertThat(working.earlier().limitTonnes()).isNaN();
        assertThat(adviser.advise(stock, current - 1)).isEmpty();
    }

    @Test
    void aSeasonInProgressWithoutLandingsTakesItsFullLimit() {
        assessed();
        long notice = region.limit(stock, current, 16);
        AdviceWorking working = adviser.work(stock, current + 1).orElseThrow();
        assertThat(working.between()).containsExactly(new Between(current, 16, 0.2, Basis.LIMIT));
        assertThat(working.earlier().limitTonnes()).isEqualTo(16);
        assertThat(working.earlier().removalsTonnes()).isNaN();
        assertThat(working.earlierNotice()).isEqualTo(notice);
        assertThat(adviser.season(stock)).isEqualTo(current + 1);
    }

    @Test
    void aSeasonInProgressEndsWhereItsLandingsLead() {
        assessed();
        long limit = region.limit(stock, current, 16);
        jdbc.sql("update catch_limit set reported_fraction = 0.8, set_aside_angling_t = 2 where id = ?")
                .param(limit)
                .update();
        // 4 t in the first quarter of the year: 16.2 t to be logged by its end
        landed(LocalDate.of(current, 3, 31), 4000);
        double days = LocalDate.of(current, 12, 31).getDayOfYear();
        double passed = LocalDate.of(current, 3, 31).getDayOfYear() / days;
        Between between =
                adviser.work(stock, current + 1).orElseThrow().between().get(0);
        assertThat(between.basis()).isEqualTo(Basis.LANDINGS);
        assertThat(between.tonnes()).isCloseTo(4 / passed / 0.8 + 2, within(1e-9));
        assertThat(between.cv()).isCloseTo(0.05 + 0.3 * (1 - passed), within(1e-12));
        assertThat(log.logged(stock, current).orElseThrow().recordedUpTo()).isEqualTo(LocalDate.of(current, 3, 31));
    }

    /** Closed after 4 t: no more is expected, and what was taken before the closure is not paid back. */
    @Test
    void aClosedSeasonEndsWithWhatWasTaken() {
        assessed();
        long limit = region.limit(stock, current, 0);
        jdbc.sql("update catch_limit set purpose = 'closure', origin = 'decided', effective_at = ? where id = ?")
                .params(OffsetDateTime.now(), limit)
                .update();
        landed(LocalDate.of(current, 3, 31), 4000);
        AdviceWorking working = adviser.work(stock, current + 1).orElseThrow();
        assertThat(working.between()).containsExactly(new Between(current, 4, 0.05, Basis.CLOSED));
        assertThat(working.earlier().limitTonnes()).isZero();
        assertThat(working.earlier().removalsTonnes()).isNaN();
        assertThat(working.recommendation().after(Recommendation.Rule.LAST_SEASON))
                .isEqualTo(working.recommendation().after(Recommendation.Rule.RISK));
    }

    /** Closed in the second week: too few days for a pace, yet nothing that was taken is forgotten. */
    @Test
    void anEarlyClosureRemembersWhatWasTaken() {
        assessed();
        long before = region.limit(stock, current, 16);
        jdbc.sql("update catch_limit set reported_fraction = 0.8, set_aside_angling_t = 2 where id = ?")
                .param(before)
                .update();
        jdbc.sql("delete from limit_in_force where limit_id = ?").param(before).update();
        jdbc.sql("insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason)"
                        + " values (?, 'SUPERSEDED', ?, 'test', ?, 'closed')")
                .params(before, OffsetDateTime.now(), OffsetDateTime.now())
                .update();
        long closure = region.limit(stock, current, 0);
        jdbc.sql("update catch_limit set purpose = 'closure', origin = 'decided', effective_at = ? where id = ?")
                .params(OffsetDateTime.now(), closure)
                .update();
        landed(LocalDate.of(current, 1, 10), 8000);
        Between between =
                adviser.work(stock, current + 1).orElseThrow().between().get(0);
        // 8 t logged of 0.8, and 2 t kept for anglers
        assertThat(between).isEqualTo(new Between(current, 12, 0.05, Basis.CLOSED));
    }

    @Test
    void aSeasonFarAheadIsNotAdvised() {
        assessed();
        assertThat(adviser.work(stock, current + 10)).isPresent();
        assertThat(adviser.work(stock, current + 11)).isEmpty();
    }

    @Test
    void withNeitherLandingsNorLimitTheLastRemovalsGoOn() {
        assessed();
        Between between =
                adviser.work(stock, current + 1).orElseThrow().between().get(0);
        assertThat(between.basis()).isEqualTo(Basis.LAST_REMOVALS);
        assertThat(between.tonnes()).isBetween(12.0, 18.0);
    }

    @Test
    void theRecommendationIsTheRulesOwnAndTheSameEveryTime() {
        assessed();
        region.limit(stock, current, 16);
        AdviceWorking working = adviser.work(stock, current + 1).orElseThrow();
        Recommendation again = new LimitRule(Policy.DEFAULT).recommend(working.outlook(), working.earlier());
        assertThat(working.recommendation()).isEqualTo(again);
        Adviser.Advice advice = adviser.advise(stock, current + 1).orElseThrow();
        assertThat(advice.limitTonnes()).isEqualTo(again.limitTonnes());
        assertThat(advice.working()).contains("\"rule\":\"RAMP\"").contains("\"LIMIT\"");
        assertThat(advice.provisional()).isFalse();
    }

    @Test
    void evidenceNoneGivesAProvisionalCeiling() throws Exception {
        assess.assess(stock, current - 1);
        assertThat(adviser.advise(stock, current).orElseThrow().provisional()).isTrue();
        assertThat(page("")).contains("provisional ceiling").contains("Evidence strength none");
    }

    @Test
    void thePageShowsTheRulesNumbers() throws Exception {
        assessed();
        region.limit(stock, current, 16);
        AdviceWorking working = adviser.work(stock, current + 1).orElseThrow();
        Recommendation r = working.recommendation();
        String page = page("");
        assertThat(page)
                .contains("For season " + (current + 1) + " the rule recommends a limit of "
                        + Figures.decided(r.limitTonnes()))
                .contains("the full limit of " + Figures.tonnes(16.0))
                .contains(Figures.tonnes(r.ceilingTonnes()))
                .contains(Figures.percent(r.risk()))
                .contains("Risk curve of")
                .contains("Biomass ahead of");
        for (Recommendation.Step step : r.steps()) {
            assertThat(page)
                    .contains(
                            step.rule() == Recommendation.Rule.ROUNDING
                                    ? Figures.decided(step.tonnes())
                                    : Figures.digits(step.tonnes(), 4) + "\u00a0t");
        }
    }

    /** The last limit kept 2 t for anglers and expected 80 % to be reported; the policy sets nothing aside. */
    @Test
    void theWayToTheLogbookIsTheFormsOwn() throws Exception {
        assessed();
        long limit = region.limit(stock, current, 16);
        jdbc.sql("update catch_limit set reported_fraction = 0.8, set_aside_angling_t = 2 where id = ?")
                .param(limit)
                .update();
        double recommended = adviser.advise(stock, current + 1).orElseThrow().limitTonnes();
        assertThat(recommended).isGreaterThan(2);
        assertThat(page(""))
                .containsSubsequence(
                        "Limit (total removals)",
                        Figures.decided(recommended),
                        "kept for angling",
                        Figures.decided(2.0),
                        "left for commercial removals",
                        Figures.decided(recommended - 2),
                        "80% are expected to be reported",
                        Figures.decided(0.8 * (recommended - 2)));
    }

    @Test
    void aReadersOwnCatchStandsBesideTheOthersAndInTheAddress() throws Exception {
        assessed();
        Outlook outlook = adviser.work(stock, current).orElseThrow().outlook();
        String page = page("?season=" + current + "&own=60&weak=20");
        assertThat(page)
                .contains("yours: " + Figures.tonnes(60.0))
                .contains("above tolerance")
                .contains("value=\"60\"")
                .contains("halved at 20% of K");
        assertThat(outlook.risk(Course.ofCatch(60))).isGreaterThan(0.1);
        assertThat(page).contains(Figures.percent(outlook.risk(Course.ofCatch(60))));
    }

    @Test
    void whatCannotBeAskedIsNamedAtItsField() throws Exception {
        assessed();
        assertThat(page("?own=-5&weak=0"))
                .doesNotContain("yours:")
                .contains("halved at 10% of K")
                .contains("“-5” cannot be looked at: a catch is 0 to 10,000,000 t a year.")
                .contains("“0” cannot be looked at: growth is halved at more than 0 and at most 100 % of K.")
                .contains("value=\"-5\"", "value=\"0\"", "aria-describedby=\"own-error\"");
        assertThat(page("?own=two&weak=101"))
                .doesNotContain("yours:")
                .contains("“two”", "value=\"two\"", "“101” cannot be looked at", "value=\"101\"");
        assertThat(page("?own=2,5")).contains("yours: 2.5\u00a0t").doesNotContain("cannot be looked at");
    }

    /** Reported fraction of the last limit 0.8, nothing set aside by the policy. */
    @Test
    void theAmountToBeLoggedIsAlwaysShown() throws Exception {
        assessed();
        double limit =
                adviser.work(stock, current).orElseThrow().recommendation().limitTonnes();
        assertThat(page("?season=" + current))
                .contains("left for commercial removals</dt><dd>" + Figures.decided(limit))
                .contains("of them to be logged (100% are expected to be reported)</dt><dd>" + Figures.decided(limit));
        long before = region.limit(stock, current - 1, 20);
        jdbc.sql("update catch_limit set reported_fraction = 0.8 where id = ?")
                .param(before)
                .update();
        limit = adviser.work(stock, current).orElseThrow().recommendation().limitTonnes();
        assertThat(page("?season=" + current))
                .contains("of them to be logged (80% are expected to be reported)</dt><dd>"
                        + Figures.decided(0.8 * limit));
    }

    /** Constants of the policy with decimals, and what it sets aside in whole kilograms. */
    @Test
    void constantsKeepTheirDecimals() {
        assessed();
        Policy d = Policy.DEFAULT;
        Policy policy = new Policy(
                d.limitFraction(),
                d.ramp(),
                0.375,
                d.horizonYears(),
                0.075,
                d.steadinessCap(),
                d.lastSeason(),
                new Policy.SetAsides(0.125, 0, 0, 0),
                d.rounding(),
                d.standing(),
                d.pooled(),
                d.intervalProbability());
        AdviceWorking working = adviser.work(stock, current, policy, 1).orElseThrow();
        assertThat(words.of(working))
                .extracting(OutlookPage.Step::text)
                .anyMatch(t -> t.contains("the 37.5% quantile"));
        assertThat(words.of(working))
                .extracting(OutlookPage.Step::text)
                .anyMatch(t -> t.startsWith("Risk") && t.contains("7.5%"))
                .noneMatch(t -> t.contains("8%"));
        assertThat(drawings.draw(working, drawings.curve(working), "perch")).contains("tolerated: 7.5%");
        for (OutlookPage.RiskRow row : drawings.rows(working, drawings.curve(working))) {
            double shown = Double.parseDouble(row.chance().replaceAll("[%<>]", ""));
            assertThat(shown > 7.5).as(row.chance()).isEqualTo(row.above());
        }
    }

    @Test
    void anUnassessedStockIsToldSo() throws Exception {
        assertThat(page("")).contains("not assessed yet").doesNotContain("Risk curve of");
    }

    private String page(String query) throws Exception {
        return mvc.perform(get("/stocks/" + lake + "/FPE/advice" + query)
                        .with(user("ines").roles("BIOLOGIST")))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString();
    }

    @Test
    void seasonsWithoutLandingsAreAbsentFromTheLog() {
        assertThat(log.logged(stock, current)).isEmpty();
        assertThat(log.loggedKilograms(stock, current)).isEmpty();
    }
}
