package org.merewarden.season;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.Callable;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.merewarden.intake.Problem;
import org.merewarden.season.LandingLog.Outcome;
import org.merewarden.season.LandingLog.Result;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.security.core.context.SecurityContextHolder;

/** Expected weights are worked by hand from the entries. */
@WholeApplication
class LandingLogTest {
    @Autowired
    LandingLog log;

    @Autowired
    LandingStore store;

    @Autowired
    Uptakes uptakes;

    @Autowired
    LogEntries entries;

    @Autowired
    CompletenessStatements statements;

    @Autowired
    Seasons seasons;

    @Autowired
    OfficeSettings settings;

    @Autowired
    JdbcClient jdbc;

    LogFixture at;
    LocalDate today;
    int season;

    @BeforeEach
    void region() {
        LogFixture.signIn(jdbc, "log-biologist", "BIOLOGIST");
        today = seasons.today();
        season = seasons.current();
        at = new LogFixture(jdbc, season, 3.0);
    }

    @AfterEach
    void signOut() {
        SecurityContextHolder.clearContext();
    }

    private LandingRow stored(Entry... lines) {
        String key = lines[0].key().substring(1, 37);
        Outcome outcome = log.log(key, List.of(lines));
        assertThat(outcome.result()).as("%s", outcome.problems()).isEqualTo(Result.STORED);
        return outcome.rows().get(0);
    }

    private LandingRow stored(String species, double kg) {
        return stored(at.entry(LogFixture.key(), 1, today, species, at.first, kg));
    }

    private double taken() {
        return uptakes.of(at.perch, season).orElseThrow().takenKg();
    }

    @Test
    void theSameFormFromEightThreadsIsStoredOnce() throws Exception {
        String key = LogFixture.key();
        List<Entry> lines =
                List.of(at.entry(key, 1, today, "FPE", at.first, 10), at.entry(key, 2, today, "PLN", at.first, 20));
        ExecutorService threads = Executors.newFixedThreadPool(8);
        try {
            var context = SecurityContextHolder.getContext();
            Callable<Result> send = () -> {
                SecurityContextHolder.setContext(context);
                return log.log(key, lines).result();
            };
            List<Result> results = new ArrayList<>();
            for (Future<Result> result : threads.invokeAll(List.of(send, send, send, send, send, send, send, send))) {
                results.add(result.get());
            }
            assertThat(results).filteredOn(r -> r == Result.STORED).hasSize(1);
            assertThat(results).filteredOn(r -> r == Result.ALREADY).hasSize(7);
        } finally {
            threads.shutdownNow();
        }
        assertThat(at.rows()).hasSize(2);
    }

    @Test
    void theSameKeyWithOtherContentIsRefusedAndShowsWhatIsStored() {
        String key = LogFixture.key();
        stored(at.entry(key, 1, today, "FPE", at.first, 10));

        Outcome other = log.log(key, List.of(at.entry(key, 1, today, "FPE", at.first, 11)));
        Outcome oneMore = log.log(
                key,
                List.of(at.entry(key, 1, today, "FPE", at.first, 10), at.entry(key, 2, today, "PLN", at.first, 5)));

        assertThat(other.result()).isEqualTo(Result.CONFLICT);
        assertThat(other.rows().get(0).entry().weightKg()).isEqualTo(10);
        assertThat(oneMore.result()).isEqualTo(Result.CONFLICT);
        assertThat(at.rows()).hasSize(1);
    }

    @Test
    void overTheLimitIsStoredAndFlagged() {
        // 3 t − 1 t set aside leave 2,000 kg to be logged
        assertThat(stored("FPE", 1999).flags()).isEmpty();
        assertThat(stored("FPE", 1).flags()).isEmpty();
        assertThat(stored("FPE", 0.5).flags()).containsExactly(Flag.OVER_LIMIT);
        assertThat(taken()).isCloseTo(2000.5, within(1e-9));
    }

    /** 2,000 kg could be logged until the closure. */
    @Test
    void whatWasLandedBeforeTheClosureIsMeasuredByTheLimitUntilThen() {
        java.time.OffsetDateTime tomorrow = today.plusDays(1).atTime(6, 0).atOffset(java.time.ZoneOffset.UTC);
        long closure = new org.merewarden.TestRegion(jdbc).closure(at.perch, seasons.current(), tomorrow);
        assertThat(stored("FPE", 1500).flags()).isEmpty();
        assertThat(stored("FPE", 501).flags()).containsExactly(Flag.OVER_LIMIT);
        jdbc.sql("update catch_limit set valid_from = ? where id = ?")
                .params(today, closure)
                .update();
        assertThat(stored("FPE", 1).flags()).containsExactly(Flag.OVER_LIMIT);
    }

    @Test
    void theUnlistedUnlimitedMixedAndSeizedAreStoredAndFlagged() {
        assertThat(stored("PLN", 5).flags()).containsExactly(Flag.NO_LIMIT, Flag.NO_RIGHT);
        assertThat(stored("FPI", 5).flags()).containsExactly(Flag.NO_STOCK);
        assertThat(stored(Entry.MIXED, 5).flags()).containsExactly(Flag.MIXED);
        String key = LogFixture.key();
        Entry seized = at.entry(LandingLog.lineKey(key, 1), today, "FPE", at.first, 5, "whole", "seized");
        assertThat(stored(seized).flags()).containsExactly(Flag.SEIZED);
    }

    @Test
    void afterTheLastDayOfTheLimitIsStoredAndFlagged() {
        jdbc.sql("update catch_limit set valid_from = ?, valid_to = ? where stock_id = ?")
                .params(today.minusDays(9), today.minusDays(2), at.perch)
                .update();
        assertThat(stored("FPE", 1).flags()).containsExactly(Flag.AFTER_VALIDITY);
        assertThat(stored(at.entry(LogFixture.key(), 1, today.minusDays(2), "FPE", at.first, 1))
                        .flags())
                .isEmpty();
    }

    @Test
    void keptDiscardedAndSeizedCountReleasedDoNot() {
        int n = 0;
        for (String fate : List.of("kept", "discarded", "seized", "released")) {
            String key = LogFixture.key();
            double kg = Math.pow(10, n++);
            stored(at.entry(LandingLog.lineKey(key, 1), today, "FPE", at.first, kg, "whole", fate));
        }
        assertThat(taken()).isEqualTo(111);
    }

    @Test
    void aCorrectionStandsInTheTotalsAndTheOldRowInTheHistory() {
        LandingRow wrong = stored("FPE", 100);
        String key = LogFixture.key();
        Entry right = at.entry(key, 1, today, "FPE", at.first, 10);

        Outcome corrected = log.correct(wrong, right, "a zero too many");
        Outcome again = log.correct(log.find(wrong.id()).orElseThrow(), right, "a zero too many");
        Outcome second = log.correct(
                log.find(wrong.id()).orElseThrow(), at.entry(LogFixture.key(), 1, today, "FPE", at.first, 12), "other");

        assertThat(corrected.result()).isEqualTo(Result.STORED);
        assertThat(again.result()).isEqualTo(Result.ALREADY);
        assertThat(second.result()).isEqualTo(Result.CONFLICT);
        assertThat(second.rows().get(0).entry().weightKg()).isEqualTo(10);
        assertThat(taken()).isEqualTo(10);
        assertThat(store.histories(List.of(wrong.id())))
                .extracting(row -> row.entry().weightKg())
                .containsExactly(100.0, 10.0);
        assertThat(entries.totals(season, filter()).liveKg()).isEqualTo(10);
        assertThat(jdbc.sql("select count(*) from activity_entry where action = 'corrected landing' and subject like ?")
                        .param("Landing " + wrong.id() + " %")
                        .query(Long.class)
                        .single())
                .isEqualTo(1);
    }

    @Test
    void theFlagOfACorrectionCountsTheOldRowOut() {
        LandingRow wrong = stored("FPE", 1900);
        Entry right = at.entry(LogFixture.key(), 1, today, "FPE", at.first, 1800);
        assertThat(log.correct(wrong, right, "misread").rows().get(0).flags()).isEmpty();
    }

    @Test
    void withdrawingTwiceIsTheSameAsOnceAndCountsNothing() {
        LandingRow row = stored("FPE", 100);
        assertThat(log.withdraw(row, "wrong lake").result()).isEqualTo(Result.STORED);
        assertThat(log.withdraw(log.find(row.id()).orElseThrow(), "wrong lake").result())
                .isEqualTo(Result.ALREADY);
        assertThat(taken()).isZero();
        assertThat(entries.totals(season, filter())).isEqualTo(new LogEntries.Totals(1, 0, 0, 0));
    }

    private LogFilter filter() {
        return new LogFilter(at.lake, null, null, null, null, null);
    }

    @Test
    void liveWeightUsesTheFactorOfTheDay() {
        for (Object[] factor :
                new Object[][] {{"2000-01-01", 1.2}, {today.minusDays(1).toString(), 1.5}}) {
            jdbc.sql(
                            "insert into weight_conversion (species, presentation, valid_from, factor) values ('FPE', ?, ?, ?)")
                    .params("cut " + at.lake, LocalDate.parse((String) factor[0]), factor[1])
                    .update();
        }
        String cut = "cut " + at.lake;
        LandingRow old = stored(at.entry(
                LandingLog.lineKey(LogFixture.key(), 1), today.minusDays(2), "FPE", at.first, 10, cut, "kept"));
        LandingRow now =
                stored(at.entry(LandingLog.lineKey(LogFixture.key(), 1), today, "FPE", at.first, 10, cut, "kept"));
        assertThat(old.liveWeightKg()).isCloseTo(12, within(1e-9));
        assertThat(now.liveWeightKg()).isCloseTo(15, within(1e-9));
        String key = LogFixture.key();
        Outcome unknown = log.log(
                key, List.of(at.entry(LandingLog.lineKey(key, 1), today, "FPE", at.first, 10, "minced", "kept")));
        assertThat(unknown.problems().get(0))
                .extracting(Problem::column, Problem::value)
                .containsExactly(org.assertj.core.groups.Tuple.tuple("presentation", "minced"));
        assertThat(unknown.problems().get(0).get(0).rule()).contains("whole").contains(cut);
    }

    @Test
    void aDayToComeIsRefusedAndNothingOfTheSlipIsStored() {
        String key = LogFixture.key();
        Outcome outcome = log.log(
                key,
                List.of(
                        at.entry(key, 1, today, "FPE", at.first, 1),
                        at.entry(key, 2, today.plusDays(1), "FPE", at.first, 1)));
        assertThat(outcome.result()).isEqualTo(Result.REFUSED);
        assertThat(outcome.problems().get(1)).extracting(Problem::column).containsExactly("date");
        assertThat(at.rows()).isEmpty();
    }

    @Test
    void theSeasonFollowsTheOfficesFirstMonth() {
        settings.set(OfficeSettings.FIRST_MONTH, "4");
        try {
            assertThat(stored(at.entry(LogFixture.key(), 1, LocalDate.of(2020, 3, 31), "FPE", at.first, 1))
                            .season())
                    .isEqualTo(2019);
            LandingRow april = stored(at.entry(LogFixture.key(), 1, LocalDate.of(2020, 4, 1), "FPE", at.first, 1));
            assertThat(april.season()).isEqualTo(2020);
            assertThat(april.flags()).contains(Flag.EARLIER_SEASON);
        } finally {
            settings.set(OfficeSettings.FIRST_MONTH, "1");
        }
    }

    @Test
    void aClerkLogsAndCorrectsOnlyAtAssignedWaters() {
        LogFixture elsewhere = new LogFixture(jdbc, season, null);
        LandingRow theirs = stored(elsewhere.entry(LogFixture.key(), 1, today, "FPE", elsewhere.first, 1));
        LogFixture.signIn(jdbc, "clerk-" + at.lake, "CLERK", at.lake);
        String key = LogFixture.key();
        Outcome refused = log.log(key, List.of(elsewhere.entry(key, 1, today, "FPE", elsewhere.first, 2)));
        assertThat(refused.problems().get(0)).extracting(Problem::column).containsExactly("water_body");
        assertThat(log.withdraw(theirs, "no").result()).isEqualTo(Result.REFUSED);
        assertThat(log.correct(theirs, at.entry(LogFixture.key(), 1, today, "FPE", at.first, 2), "moved")
                        .result())
                .isEqualTo(Result.REFUSED);
        assertThat(stored("FPE", 3).recordedBy()).isEqualTo("clerk-" + at.lake);
        assertThat(elsewhere.rows()).hasSize(1);
    }

    @Test
    void recordsEndWhereStatedElseAtTheLastLandingAndTheSilentAreNamed() {
        // four months into a past season, so that silence does not hang on today's date
        int past = season - 1;
        LocalDate last = seasons.end(past);
        stored(at.entry(LogFixture.key(), 1, last.minusDays(3), "FPE", at.first, 7));
        UptakeView view = uptakes.of(at.perch, past).orElseThrow();
        assertThat(view.takenKg()).isEqualTo(7);
        assertThat(view.recordedUpTo()).isEqualTo(last.minusDays(3));
        assertThat(view.silentCooperatives()).singleElement().asString().startsWith("Second ");

        assertThat(statements.state(at.second, last.minusDays(10)).stored()).isTrue();
        UptakeView stated = uptakes.ofSeason(past).stream()
                .filter(u -> u.stockId() == at.perch)
                .findFirst()
                .orElseThrow();
        assertThat(stated.recordedUpTo()).isEqualTo(last.minusDays(10));
        assertThat(stated.silentCooperatives()).isEmpty();
        assertThat(statements.state(at.second, today.plusDays(1)).stored()).isFalse();
    }
}
