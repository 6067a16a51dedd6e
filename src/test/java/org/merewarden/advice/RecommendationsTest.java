package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.merewarden.advice.LimitDesk.APPROVER;
import static org.merewarden.advice.LimitDesk.BIOLOGIST;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.assessment.AssessForTests;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

/** The recommendation on record beside the limit, the form that is filled in from it, and drafts. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class RecommendationsTest {
    private static final String STOCK = "/stocks/rec-lake/FPE";
    private static final String BARE = "/stocks/rec-bare/FRO";

    @Autowired
    private LimitDesk desk;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private AssessForTests assess;

    @Autowired
    private Seasons seasons;

    @Autowired
    private PolicyStore policies;

    private TestRegion region;
    private long stock;
    private int now;

    @BeforeAll
    void register() {
        now = seasons.current();
        region = new TestRegion(jdbc);
        stock = region.stock(region.lake("rec-lake", "Recommended Lake"), "FPE");
        region.stock(region.lake("rec-bare", "Unassessed Lake"), "FRO");
        region.catches(stock, 2018, List.of(12.0, 14.0, 11.0, 9.0, 10.0, 12.0));
        assess.assess(stock, 2025);
    }

    @AfterEach
    void restore() {
        desk.restore();
    }

    private int limits() {
        return jdbc.sql("select count(*) from catch_limit").query(Integer.class).single();
    }

    @Test
    void anotherAmountThanTheRecommendedNeedsAReasonThatNamesBoth() throws Exception {
        desk.recommend(stock, 10.0001, false, 1);
        Map<String, String> fields = desk.fields(now + 1);
        int before = limits();
        var answer = desk.send(STOCK + "/limits", fields, BIOLOGIST).andExpect(status().is(422));
        assertThat(LimitDesk.body(answer))
                .contains("The recommendation is 10.0001 t, the amount here 12.5 t: write down why they differ.");
        assertThat(limits()).isEqualTo(before);

        fields.put("differenceReason", "The ministry allows one season of grace.");
        long id = desk.propose(STOCK, fields, BIOLOGIST);
        var kept = jdbc.sql("""
                        select r.limit_t, r.season_year, r.policy_number, r.assessment_id, r.working, r.made_by,
                            l.difference_reason
                        from catch_limit l join recommendation r on r.id = l.recommendation_id where l.id = ?""").param(id).query().singleRow();
        assertThat(kept.values())
                .containsExactly(
                        10.0001,
                        now + 1,
                        1,
                        desk.assessment(stock),
                        "{\"made\":\"for a test\"}",
                        "ines",
                        "The ministry allows one season of grace.");
        assertThat(desk.page(STOCK + "/advice", APPROVER))
                .contains("12.5 t for season " + (now + 1))
                .contains("10 t (policy version 1)")
                .contains("The ministry allows one season of grace.");
    }

    @Test
    void theRecommendedAmountNeedsNoReason() throws Exception {
        // a relative difference of 1e-10 is the same amount
        desk.recommend(stock, 12.5 * (1 + 1e-10), false, 1);
        Map<String, String> fields = desk.fields(now + 2);
        fields.put("differenceReason", "There is none.");
        long id = desk.propose(STOCK, fields, BIOLOGIST);
        assertThat(jdbc.sql("select count(*) from catch_limit where id = ? and recommendation_id is not null"
                                + " and difference_reason is null")
                        .param(id)
                        .query(Integer.class)
                        .single())
                .isEqualTo(1);
        // a relative difference of 1e-8 is another one
        desk.recommend(stock, 12.5 * (1 + 1e-8), false, 1);
        desk.send(STOCK + "/limits", desk.fields(now + 2), BIOLOGIST).andExpect(status().is(422));
    }

    @Test
    void anEffortLimitMayDifferWithoutAReasonAndKeepsOneThatIsGiven() throws Exception {
        desk.recommend(stock, 10, false, 1);
        Map<String, String> fields = desk.fields(now + 2);
        fields.put("kind", "effort");
        fields.put("unit", "net-nights");
        long without = desk.propose(STOCK, fields, BIOLOGIST);
        fields.put("differenceReason", "10 t are what 12.5 net-nights take.");
        long with = desk.propose(STOCK, fields, BIOLOGIST);
        assertThat(desk.page("/notices/" + without, BIOLOGIST)).contains("<dd>10 t</dd>");
        assertThat(desk.page("/notices/" + with, BIOLOGIST))
                .contains("<dd>10 t (the limit differs: 10 t are what 12.5 net-nights take.)</dd>");
        assertThat(desk.page(STOCK + "/advice?season=" + (now + 2), BIOLOGIST))
                .contains("For an effort limit it may stay empty: the recommendation is in tonnes.");
    }

    @Test
    void aPolicyThatChangedSinceIsSaidBesideTheProposal() throws Exception {
        String address = "/stocks/rec-policy/FRO";
        long ruled = region.stock(region.lake("rec-policy", "Ruled Lake"), "FRO");
        region.catches(ruled, 2018, List.of(2.0, 2.5, 2.0, 1.5, 2.0, 2.2));
        assess.assess(ruled, 2025);
        int present = policies.inForce().number();
        desk.recommend(ruled, 12.5, false, present);
        long same = desk.propose(address, desk.fields(now + 1), BIOLOGIST);
        assertThat(desk.page(address + "/advice", APPROVER)).doesNotContain("The policy has changed since");
        jdbc.sql("insert into policy_version select 902, limit_fraction, ramp_line, ramp_target_fraction,"
                        + " ramp_low_fraction, ramp_high_fraction, catch_quantile, horizon_years, tolerance,"
                        + " steadiness_cap, carry_over, payback, 0, 0, 0, 0, rounding_share, rounding_least_kg,"
                        + " watch_from, strained_from, critical_from, pooled, interval_probability, created_at,"
                        + " created_by from policy_version where number = 1")
                .update();
        desk.recommend(ruled, 12.5, false, 902);
        long other = desk.propose(address, desk.fields(now + 1), BIOLOGIST);
        String page = desk.page(address + "/advice", APPROVER);
        assertThat(page)
                .containsOnlyOnce("The policy has changed since: the recommendation was made by version 902;"
                        + " version " + present + " is in force.");
        // a caution only
        desk.act(other, "issue", "Agreed.", APPROVER);
        assertThat(desk.state(other)).isEqualTo("ISSUED");
        desk.act(same, "refuse", "Decided.", APPROVER);
    }

    @Test
    void aProvisionalCeilingNeedsItsDayOfReview() throws Exception {
        desk.recommend(stock, 12.5, true, 1);
        Map<String, String> fields = desk.fields(now + 3);
        assertThat(LimitDesk.body(desk.send(STOCK + "/limits", fields, BIOLOGIST)))
                .contains("A provisional ceiling needs a day by which it is looked at again.");
        for (String day : List.of((now + 2) + "-12-31", (now + 5) + "-01-01")) {
            fields.put("reviewBy", day);
            assertThat(LimitDesk.body(
                            desk.send(STOCK + "/limits", fields, BIOLOGIST).andExpect(status().is(422))))
                    .contains("is too early or too late");
        }
        fields.put("reviewBy", (now + 4) + "-12-31");
        desk.propose(STOCK, fields, BIOLOGIST);
        assertThat(desk.page(STOCK + "/advice", APPROVER))
                .contains("A provisional ceiling, to be looked at again by 31 Dec " + (now + 4) + ".");
    }

    @Test
    void anUnassessedStockHasNothingToDifferFrom() throws Exception {
        assertThat(desk.page(BARE + "/advice?season=" + (now + 1), BIOLOGIST))
                .contains("There is no recommendation for season " + (now + 1))
                .doesNotContain("differenceReason");
        long id = desk.propose(BARE, desk.fields(now + 1), BIOLOGIST);
        assertThat(desk.page(BARE + "/advice", APPROVER)).contains("nothing; there was no usable assessment");
        assertThat(LimitDesk.said(desk.act(id, "issue", "", APPROVER), "refused"))
                .contains("no assessment stands behind it");
        desk.act(id, "issue", "A first ceiling.", APPROVER);
        assertThat(jdbc.sql("select reason || ' ' || doubt from limit_decision where limit_id = ? and act = 'ISSUED'")
                        .param(id)
                        .query(String.class)
                        .single())
                .isEqualTo("A first ceiling. missing");
    }

    @Test
    void theFormIsFilledInFromTheRecommendationAndTheLastLimit() throws Exception {
        desk.recommendNothing();
        Map<String, String> last = desk.fields(now - 1);
        last.put("measures", "Mesh 45 mm at least.");
        last.put("legalBasis", "Waters Act 12.");
        long id = desk.propose(STOCK, last, BIOLOGIST);
        desk.act(id, "issue", "Agreed.", APPROVER).andExpect(status().is3xxRedirection());
        desk.recommend(stock, 31.2, false, 1);
        String page = desk.page(STOCK + "/advice?season=" + now, BIOLOGIST);
        assertThat(value(page, "amount")).isEqualTo("31.2");
        assertThat(value(page, "season")).isEqualTo(Integer.toString(now));
        assertThat(value(page, "validFrom")).isEqualTo(now + "-01-01");
        assertThat(value(page, "validTo")).isEqualTo(now + "-12-31");
        assertThat(value(page, "angling")).isEqualTo("1.0");
        assertThat(value(page, "reportedFraction")).isEqualTo("0.85");
        assertThat(value(page, "legalBasis")).isEqualTo("Waters Act 12.");
        assertThat(page)
                .contains("At first filled in from the recommendation. Last limit: 12.5 t, season " + (now - 1)
                        + " (notice " + id + ").")
                .contains("Filled in from the last limit, notice " + id)
                .contains("Mesh 45 mm at least.");
        // 2.5 t are more than the whole of this one
        desk.recommend(stock, 2, false, 1);
        assertThat(value(desk.page(STOCK + "/advice?season=" + now, BIOLOGIST), "angling"))
                .isEqualTo("0.0");
        jdbc.sql("insert into policy_version select 901, limit_fraction, ramp_line, ramp_target_fraction,"
                        + " ramp_low_fraction, ramp_high_fraction, catch_quantile, horizon_years, tolerance,"
                        + " steadiness_cap, carry_over, payback, 0.1, 0.05, 0, 0, rounding_share, rounding_least_kg,"
                        + " watch_from, strained_from, critical_from, pooled, interval_probability, created_at,"
                        + " created_by from policy_version where number = 1")
                .update();
        desk.recommend(stock, 31.2, false, 901);
        String byPolicy = desk.page(STOCK + "/advice?season=" + now, BIOLOGIST);
        assertThat(value(byPolicy, "subsistence")).isEqualTo("3.12");
        assertThat(value(byPolicy, "angling")).isEqualTo("1.56");
        assertThat(byPolicy).contains("the policy’s shares of the recommended amount");
    }

    @Test
    void aSeasonFarAheadIsNotAdvised() throws Exception {
        // the work grows with the seasons between, whoever asks
        desk.recommend(stock, 10, false, 1);
        long id = desk.propose(STOCK, desk.fields(now + 6), BIOLOGIST);
        assertThat(jdbc.sql("select recommendation_id from catch_limit where id = ?")
                        .param(id)
                        .query(Long.class)
                        .optional())
                .isEmpty();
        assertThat(desk.page(STOCK + "/advice?season=" + (now + 6), BIOLOGIST)).isEmpty();
    }

    /** The value in a field of the page. */
    private static String value(String page, String name) {
        var field = java.util.regex.Pattern.compile("<input[^>]*name=\"" + name + "\"[^>]*>")
                .matcher(page);
        assertThat(field.find()).as(name).isTrue();
        return field.group().replaceAll("(?s).*value=\"([^\"]*)\".*", "$1");
    }

    @Test
    void aDraftIsReplacedDiscardedOrProposed() throws Exception {
        desk.recommend(stock, 10, true, 1);
        Map<String, String> fields = desk.fields(now + 4);
        fields.put("act", "draft");
        fields.put("reason", "");
        long first = desk.propose(STOCK, fields, BIOLOGIST);
        assertThat(desk.state(first)).isEqualTo("DRAFTED");
        String page = desk.page(STOCK + "/advice", BIOLOGIST);
        assertThat(page)
                .contains("Draft " + first + ": 12.5 t for season " + (now + 4))
                .doesNotContain("issue-" + first);
        assertThat(desk.page("/notices/" + first, BIOLOGIST)).contains("DRAFT: not yet proposed");
        assertThat(LimitDesk.said(desk.act(first, "issue", "Now.", APPROVER), "refused"))
                .contains("was decided already");

        fields.put("draft", Long.toString(first));
        fields.put("amount", "11");
        long second = desk.propose(STOCK, fields, APPROVER);
        assertThat(desk.state(first)).isEqualTo("DISCARDED");
        assertThat(value(desk.page(STOCK + "/advice?draft=" + second, BIOLOGIST), "amount"))
                .isEqualTo("11.0");
        // the first is replaced already
        assertThat(LimitDesk.said(desk.send(STOCK + "/limits", fields, BIOLOGIST), "refused"))
                .contains("discarded or replaced meanwhile");

        fields.put("draft", Long.toString(second));
        fields.put("act", "propose");
        assertThat(LimitDesk.body(desk.send(STOCK + "/limits", fields, BIOLOGIST)))
                .contains("Write down why", "why they differ", "looked at again");
        assertThat(desk.state(second)).isEqualTo("DRAFTED");
        fields.putAll(Map.of("reason", "Now.", "differenceReason", "Grace.", "reviewBy", (now + 4) + "-06-01"));
        long proposed = desk.propose(STOCK, fields, BIOLOGIST);
        assertThat(desk.state(second)).isEqualTo("DISCARDED");
        assertThat(desk.state(proposed)).isEqualTo("PROPOSED");
        assertThat(LimitDesk.said(desk.act(second, "discard", "", BIOLOGIST), "refused"))
                .contains("discarded or replaced");
        assertThat(jdbc.sql("select before_text from activity_entry where subject like ? and action = 'proposed limit'")
                        .param("notice " + proposed + ",%")
                        .query(String.class)
                        .single())
                .isEqualTo("draft " + second + ": 11 t, set aside 2.5 t");

        fields.remove("draft");
        fields.put("act", "draft");
        long third = desk.propose(STOCK, fields, BIOLOGIST);
        assertThat(LimitDesk.said(desk.act(third, "discard", "", BIOLOGIST), "done"))
                .contains("is discarded");
        assertThat(desk.state(third)).isEqualTo("DISCARDED");
        assertThat(desk.page(STOCK + "/advice", BIOLOGIST)).doesNotContain("Draft " + third + ":");
    }

    @Test
    void aFormThatIsSentTwiceIsStoredOnce() throws Exception {
        desk.recommendNothing();
        Map<String, String> fields = desk.fields(now + 5);
        fields.put("key", "form-2127");
        long id = desk.propose(STOCK, fields, BIOLOGIST);
        int before = limits();
        fields.put("amount", "99");
        assertThat(LimitDesk.said(desk.send(STOCK + "/limits", fields, BIOLOGIST), "refused"))
                .contains("was stored before, as number " + id + "; nothing was stored again");
        assertThat(limits()).isEqualTo(before);
    }

    @Test
    void anOlderAssessmentBehindAProposalNeedsAReasonOfItsIssuer() throws Exception {
        desk.recommendNothing();
        long late = region.stock(region.lake("rec-late", "Lately Assessed Lake"), "FRO");
        String address = "/stocks/rec-late/FRO";
        region.catches(late, 2018, List.of(2.0, 2.5, 2.0, 1.5, 2.0, 2.2));
        assess.assess(late, 2024);
        long id = desk.propose(address, desk.fields(2128), BIOLOGIST);
        assess.assess(late, 2025);
        assertThat(desk.page(address + "/advice", APPROVER)).contains("A newer assessment of the stock exists");
        assertThat(LimitDesk.said(desk.act(id, "issue", "", APPROVER), "refused"))
                .contains("the assessment behind it is superseded by a newer one");
        long second = desk.propose(address, desk.fields(2129), BIOLOGIST);
        jdbc.sql("update assessment set settled = false where id = ?")
                .param(desk.assessment(late))
                .update();
        assertThat(LimitDesk.said(desk.act(second, "issue", " ", APPROVER), "refused"))
                .contains("the assessment behind it did not settle");
        desk.act(second, "issue", "The nets were lost.", APPROVER);
        assertThat(jdbc.sql("select reason || ' ' || doubt from limit_decision where limit_id = ? and act = 'ISSUED'")
                        .param(second)
                        .query(String.class)
                        .single())
                .isEqualTo("The nets were lost. unsettled");
        assertThat(desk.page("/notices/" + second, BIOLOGIST))
                .contains("The nets were lost. (the assessment behind it did not settle)");
    }
}
