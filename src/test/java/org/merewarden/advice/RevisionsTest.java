package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.merewarden.advice.LimitDesk.APPROVER;
import static org.merewarden.advice.LimitDesk.BIOLOGIST;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.time.Instant;
import java.time.LocalDateTime;
import java.time.ZoneOffset;
import java.time.format.DateTimeFormatter;
import java.time.temporal.ChronoUnit;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.assessment.AssessForTests;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

/** Changing or closing within the season, at once or at a moment to come; each test has a stock or season of its own. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class RevisionsTest {
    private static final String STOCK = "/stocks/rev-lake/FPE";

    @Autowired
    private LimitDesk desk;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private AssessForTests assess;

    @Autowired
    private Limits limits;

    @Autowired
    private PendingLimits pending;

    @Autowired
    private OfficeSettings settings;

    @Autowired
    private Seasons seasons;

    private TestRegion region;
    private long stock;

    @BeforeAll
    void register() {
        region = new TestRegion(jdbc);
        stock = region.stock(region.lake("rev-lake", "Revised Lake"), "FPE");
        region.right(region.cooperative("rev-north", "Revised North"), stock, 60);
        region.right(region.cooperative("rev-south", "Revised South"), stock, 40);
        region.catches(stock, 2018, List.of(12.0, 14.0, 11.0, 9.0, 10.0, 12.0));
        assess.assess(stock, 2025);
    }

    @BeforeEach
    void nothingRecommended() {
        desk.recommendNothing();
    }

    @AfterEach
    void restore() {
        desk.restore();
        settings.set(OfficeSettings.TIME_ZONE, "UTC");
    }

    private long issued(Map<String, String> fields) throws Exception {
        long id = desk.propose(STOCK, fields, BIOLOGIST);
        desk.act(id, "issue", "Agreed.", APPROVER);
        assertThat(desk.state(id)).isEqualTo("ISSUED");
        return id;
    }

    private Map<String, String> revision(int season, String tonnes, String day, String time) {
        Map<String, String> fields = desk.fields(season);
        fields.put("purpose", "revision");
        fields.put("amount", tonnes);
        fields.put("effectiveDate", day);
        fields.put("effectiveTime", time);
        return fields;
    }

    /** From the present minute, which has begun. */
    private Map<String, String> revisionNow(int season, String tonnes) {
        LocalDateTime now = LocalDateTime.now(settings.zone());
        String time = now.toLocalTime().truncatedTo(ChronoUnit.MINUTES).toString();
        return revision(season, tonnes, now.toLocalDate().toString(), time);
    }

    private double standingOn() {
        return jdbc.sql("select removals_t from stock_standing where stock_id = ?")
                .param(stock)
                .query(Double.class)
                .single();
    }

    private Instant effective(long id, String act) {
        return jdbc.sql("select effective_at from limit_decision where limit_id = ? and act = ?")
                .params(id, act)
                .query(java.time.OffsetDateTime.class)
                .single()
                .toInstant();
    }

    @Test
    void aRevisionWhoseMomentHasComeReplacesTheLimitAtOnceAndALaterOneAtItsTime() throws Exception {
        int season = seasons.current();
        long first = issued(desk.fields(season));
        assertThat(standingOn()).isEqualTo(12.5);
        String form = desk.page(STOCK + "/advice?season=" + season + "&revise=true", BIOLOGIST);
        assertThat(form).contains("Revise the limit for season " + season).contains("effectiveTime");

        Instant before = Instant.now().minusSeconds(1);
        long second = issued(revisionNow(season, "8"));
        LimitView now = limits.inForce(stock, season).orElseThrow();
        assertThat(now.id()).isEqualTo(second);
        assertThat(now.purpose()).isEqualTo("revision");
        // nothing holds for what lies behind: from its issue on
        assertThat(now.effectiveAt()).isBetween(before, Instant.now());
        assertThat(effective(first, "SUPERSEDED")).isEqualTo(effective(second, "ISSUED"));
        assertThat(standingOn()).isEqualTo(8);

        settings.set(OfficeSettings.TIME_ZONE, "Europe/Oslo");
        // in Oslo's winter 23:58 is 22:58 UTC
        long third = issued(revision(season, "5", season + "-12-31", "23:58"));
        Instant moment = Instant.parse(season + "-12-31T22:58:00Z");
        assertThat(effective(third, "ISSUED")).isEqualTo(moment);
        pending.takeEffect(moment.minusSeconds(1));
        assertThat(limits.inForce(stock, season).orElseThrow().id()).isEqualTo(second);
        assertThat(standingOn()).isEqualTo(8);
        assertThat(desk.page(STOCK + "/advice", BIOLOGIST))
                .contains("Notice " + third + ": revised to 5 t, season " + season)
                .contains("23:58")
                .contains("Revise the limit in force: revised to 8 t, season " + season);
        // what is issued ahead is not what is revised
        assertThat(desk.page(STOCK + "/advice?season=" + season + "&revise=true", BIOLOGIST))
                .containsPattern("<input[^>]*name=\"amount\" value=\"8.0\"");
        pending.takeEffect(moment);
        pending.takeEffect(moment);
        assertThat(limits.inForce(stock, season).orElseThrow().id()).isEqualTo(third);
        assertThat(standingOn()).isEqualTo(5);
        assertThat(effective(second, "SUPERSEDED")).isEqualTo(moment);
        // 60 and 40 % of (5 − 2.5) × 0.85 t
        assertThat(limits.allocations(season).stream()
                        .filter(a -> a.stockId() == stock)
                        .map(AllocationView::amountKg)
                        .toList())
                .containsExactly(1275L, 850L);
        assertThat(jdbc.sql("select action || ': ' || before_text || ' -> ' || after_text from activity_entry"
                                + " where subject like ? and action = 'put limit in force'")
                        .param("notice " + third + ",%")
                        .query(String.class)
                        .list())
                .containsExactly("put limit in force: in force: revision, 8 t, notice " + second
                        + " -> revision, 5 t, set aside 2.5 t");
    }

    @Test
    void aRevisionWithdrawnBeforeItsMomentNeverTakesEffect() throws Exception {
        long first = issued(desk.fields(2132));
        long second = issued(revision(2132, "8", "2132-06-01", "06:00"));
        assertThat(LimitDesk.said(desk.act(second, "withdraw", "The survey was late.", APPROVER), "done"))
                .contains("is withdrawn")
                .doesNotContain("No limit is in force");
        pending.takeEffect(Instant.parse("2132-07-01T00:00:00Z"));
        assertThat(limits.inForce(stock, 2132).orElseThrow().id()).isEqualTo(first);
        assertThat(desk.state(first)).isEqualTo("ISSUED");
    }

    /** What was superseded does not come back by itself. */
    @Test
    void withdrawingARevisionSaysThatNoLimitIsLeft() throws Exception {
        String address = "/stocks/rev-left/FRO";
        region.stock(region.lake("rev-left", "Left Lake"), "FRO");
        int season = seasons.current();
        long first = desk.propose(address, desk.fields(season), BIOLOGIST);
        desk.act(first, "issue", "Agreed.", APPROVER);
        assertThat(desk.page(address + "/advice", APPROVER))
                .contains("Then no limit is in force for season " + season + ".");
        long second = desk.propose(address, revisionNow(season, "8"), BIOLOGIST);
        desk.act(second, "issue", "Agreed.", APPROVER);
        assertThat(desk.page(address + "/advice", APPROVER))
                .contains("Then no limit is in force for season " + season + ". To go back to notice " + first
                        + " (12.5 t for season " + season + "), do not withdraw")
                .contains(address + "/advice?season=" + season + "&amp;revise=true#propose");
        var answer = desk.act(second, "withdraw", "A slip.", APPROVER);
        assertThat(LimitDesk.said(answer, "done"))
                .contains("Notice " + second + " is withdrawn. No limit is in force for season " + season + " now");
        String next = String.valueOf(answer.andReturn().getResponse().getRedirectedUrl());
        assertThat(desk.page(next, BIOLOGIST))
                .contains("Last limit: 12.5 t, season " + season + " (notice " + first + ")");
    }

    /** To open a closed stock again, the limit that held before is filled in. */
    @Test
    void aClosureIsRevisedFromTheLimitBeforeIt() throws Exception {
        String address = "/stocks/rev-opened/FRO";
        region.stock(region.lake("rev-opened", "Opened Lake"), "FRO");
        int season = seasons.current();
        long first = desk.propose(address, desk.fields(season), BIOLOGIST);
        desk.act(first, "issue", "Agreed.", APPROVER);
        Map<String, String> now = revisionNow(season, "");
        desk.send(address + "/closures", closure(now.get("effectiveDate"), now.get("effectiveTime")), BIOLOGIST);
        desk.act(desk.newest(), "issue", "Closed.", APPROVER);
        assertThat(desk.page(address + "/advice?season=" + season + "&revise=true", BIOLOGIST))
                .containsPattern("<input[^>]*name=\"amount\" value=\"12.5\"");
    }

    @Test
    void aRevisionNamesItsMomentInTheSeasonOfALimitInForce() throws Exception {
        assertThat(LimitDesk.body(desk.send(STOCK + "/limits", revision(2133, "8", "2133-06-01", "06:00"), BIOLOGIST)))
                .contains("No limit is in force for season 2133");
        issued(desk.fields(2134));
        settings.set(OfficeSettings.TIME_ZONE, "Europe/Oslo");
        for (String[] bad : new String[][] {
            {"", "06:00", "Enter the day and the hour"},
            {"2134-06-01", "", "Enter the day and the hour"},
            {"2135-01-01", "06:00", "1 Jan 2135 lies outside season 2134, which runs from 1 Jan 2134 to 31 Dec 2134"},
            {"2019-06-01", "06:00", "1 Jun 2019 lies outside season 2134"},
            {"2134-06-01", "noon", "is no time of day such as 06:00: “noon”"},
            // the last Sunday of March 2134
            {"2134-03-28", "02:30", "The clocks are put forward: 02:30 does not exist on 28 Mar 2134"}
        }) {
            var answer = desk.send(STOCK + "/limits", revision(2134, "8", bad[0], bad[1]), BIOLOGIST)
                    .andExpect(status().is(422));
            assertThat(LimitDesk.body(answer)).contains(bad[2]);
        }
    }

    private static Map<String, String> closure(String day, String time) {
        Map<String, String> fields = new LinkedHashMap<>();
        fields.put("closeOn", day);
        fields.put("closeAt", time);
        fields.put("closeReason", "Fish die in the north bay.");
        return fields;
    }

    private long close(
            Map<String, String> fields, org.springframework.test.web.servlet.request.RequestPostProcessor who)
            throws Exception {
        desk.send(STOCK + "/closures", fields, who).andExpect(status().is3xxRedirection());
        return desk.newest();
    }

    @Test
    void anApproverClosesInOneActWhereTheOfficeAllowsIt() throws Exception {
        long first = issued(desk.fields(2136));
        long proposed = close(closure("2136-06-01", "06:00"), APPROVER);
        assertThat(desk.state(proposed)).isEqualTo("PROPOSED");
        assertThat(LimitDesk.said(desk.act(proposed, "issue", "", APPROVER), "refused"))
                .contains("you proposed it yourself");

        desk.ownProposals();
        long byBiologist = close(closure("2136-06-01", "06:00"), BIOLOGIST);
        assertThat(desk.state(byBiologist)).isEqualTo("PROPOSED");
        long closed = close(closure("2136-06-02", "06:30"), APPROVER);
        assertThat(desk.state(closed)).isEqualTo("ISSUED");
        assertThat(limits.inForce(stock, 2136).orElseThrow().amountTonnes()).isEqualTo(12.5);
        assertThat(desk.page(STOCK + "/advice", BIOLOGIST)).contains("Notice " + closed + ": closed, season 2136");

        pending.takeEffect(Instant.parse("2136-06-02T06:30:00Z"));
        LimitView limit = limits.inForce(stock, 2136).orElseThrow();
        assertThat(limit.amountTonnes()).isZero();
        assertThat(limit.purpose()).isEqualTo("closure");
        assertThat(limit.toBeLoggedTonnes()).isZero();
        assertThat(limits.allocations(2136).stream()
                        .map(AllocationView::amountKg)
                        .toList())
                .containsExactly(0L, 0L);
        assertThat(desk.page("/notices/" + closed, BIOLOGIST)).contains("Closed from 2 Jun 2136, 06:30 (UTC)");
        assertThat(desk.page("/notices/" + closed, BIOLOGIST))
                .contains("Fish die in the north bay. (own proposal, as the office’s settings allow)");
        // a row from before tells the same in words
        jdbc.sql("update limit_decision set own_proposal = false, reason = 'Ice. (own proposal, as the office''s"
                        + " settings allow)' where limit_id = ? and act = 'ISSUED'")
                .param(closed)
                .update();
        assertThat(desk.page("/notices/" + closed, BIOLOGIST))
                .contains("<dd>Ice. (own proposal, as the office&#39;s settings allow)</dd>");
        assertThat(desk.page("/notices/" + first, BIOLOGIST)).contains("superseded by notice " + closed);
        assertThat(desk.page(STOCK + "/advice", BIOLOGIST)).contains("superseded by notice " + closed);
    }

    private static String written(String pattern, Instant moment) {
        return DateTimeFormatter.ofPattern(pattern, Locale.UK)
                .withZone(ZoneOffset.UTC)
                .format(moment);
    }

    /** Proposed for a moment to come, issued after it: it holds from its issue, and says so. */
    @Test
    void aClosureThatIsIssuedLateSaysFromWhenItHolds() throws Exception {
        long lake = region.stock(region.lake("rev-late", "Late Lake"), "FRO");
        int season = seasons.current();
        long first = desk.propose("/stocks/rev-late/FRO", desk.fields(season), BIOLOGIST);
        desk.act(first, "issue", "Agreed.", APPROVER);
        LocalDateTime asked = LocalDateTime.now(settings.zone()).plusMinutes(1);
        desk.send(
                        "/stocks/rev-late/FRO/closures",
                        closure(
                                asked.toLocalDate().toString(),
                                asked.toLocalTime()
                                        .truncatedTo(ChronoUnit.MINUTES)
                                        .toString()),
                        BIOLOGIST)
                .andExpect(status().is3xxRedirection());
        long id = desk.newest();
        assertThat(jdbc.sql("select measures from catch_limit where id = ? and measures is not null")
                        .param(id)
                        .query(String.class)
                        .list())
                .isEmpty();
        // three days pass until an approver comes
        jdbc.sql("update catch_limit set effective_at = ?, valid_from = ? where id = ?")
                .params(
                        Instant.now().minus(3, ChronoUnit.DAYS).atOffset(ZoneOffset.UTC),
                        asked.toLocalDate().minusDays(3),
                        id)
                .update();
        desk.act(id, "issue", "Closed.", APPROVER);
        Instant holds = effective(id, "ISSUED");
        assertThat(holds).isAfter(Instant.now().minus(5, ChronoUnit.MINUTES));
        String moment = written("d MMM yyyy, HH:mm", holds);
        String day = written("d MMM yyyy", holds);
        String notice = desk.page("/notices/" + id, BIOLOGIST);
        assertThat(notice)
                .contains("<dt>Takes effect</dt><dd>" + moment + "</dd>")
                .contains("Closed from " + moment + " (UTC)")
                .contains("<dd>" + day + " – 31 Dec " + season + "</dd>");
        LimitView limit = limits.inForce(lake, season).orElseThrow();
        assertThat(limit.validFrom())
                .isEqualTo(LocalDateTime.ofInstant(holds, ZoneOffset.UTC).toLocalDate());
        assertThat(limit.measures()).contains("Closed from");
        // what was logged before stays scaled as under the limit before
        assertThat(limit.reportedFraction()).isEqualTo(0.85);
        assertThat(limit.setAsidesTonnes()).isZero();
    }

    @Test
    void aClosureNeedsItsMomentAndReasonAndIsStoredOnce() throws Exception {
        for (String[] bad : new String[][] {
            {"closeOn", "", "Enter the day and the hour"},
            {"closeAt", "25:00", "is no time of day"},
            {"closeReason", " ", "Write down why"},
            {"closeReason", "x".repeat(4001), "At most 4000 characters"},
            {"closeOn", "2019-06-01", "1 Jun 2019, 06:00 lies more than an hour back"},
            {"closeKey", "", "the form came without its own number"}
        }) {
            Map<String, String> fields = closure("2137-06-01", "06:00");
            fields.put(bad[0], bad[1]);
            var answer = desk.send(STOCK + "/closures", fields, APPROVER).andExpect(status().is(422));
            assertThat(LimitDesk.body(answer)).contains(bad[2]);
        }
        Map<String, String> fields = closure("2137-06-01", "06:00");
        fields.put("closeKey", "closure-2137");
        long id = close(fields, APPROVER);
        assertThat(LimitDesk.said(desk.send(STOCK + "/closures", fields, APPROVER), "refused"))
                .contains("was stored before, as number " + id);
    }
}
