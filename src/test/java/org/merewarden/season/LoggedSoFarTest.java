package org.merewarden.season;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.util.UUID;
import org.jspecify.annotations.Nullable;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.merewarden.records.SeasonInProgress;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

/** Where a season's landings lead, worked by hand. */
@WholeApplication
class LoggedSoFarTest {
    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private SeasonInProgress log;

    @Autowired
    private Seasons seasons;

    private LogFixture fixture;
    private int season;

    @BeforeEach
    void register() {
        season = seasons.current();
        fixture = new LogFixture(jdbc, season, 16.0);
    }

    private void landed(int inSeason, LocalDate date, @Nullable String cooperative, double kg) {
        jdbc.sql("insert into landing (entry_key, entry_kind, season_year, landed_on, water_body_id, stock_id, species,"
                        + " cooperative_id, sector, weight_kg, live_weight_kg, presentation, conversion_factor, fate,"
                        + " recorded_at, recorded_by) select ?, 'landing', ?, ?, water_body_id, id, 'FPE',"
                        + " (select id from cooperative where code = ?), 'commercial', ?, ?, 'whole', 1, 'kept', ?, 'test'"
                        + " from stock where id = ?")
                .params(
                        UUID.randomUUID().toString(),
                        inSeason,
                        date,
                        String.valueOf(cooperative),
                        kg,
                        kg,
                        OffsetDateTime.now(),
                        fixture.perch)
                .update();
    }

    private double daysOf(LocalDate last) {
        return last.getDayOfYear();
    }

    @Test
    void withoutLandingsThereIsNothing() {
        assertThat(log.logged(fixture.perch, season)).isEmpty();
    }

    /** One lands 100 kg in January and falls silent; the other 1.2 t a month. Each goes on at its own pace. */
    @Test
    void aSilentCooperativeSaysNothingOfTheOthersPace() {
        landed(season, LocalDate.of(season, 1, 20), fixture.first, 100);
        for (int month = 2; month <= 11; month++) {
            landed(season, LocalDate.of(season, month, 28), fixture.second, 1200);
        }
        double year = daysOf(LocalDate.of(season, 12, 31));
        double expected = 0.1 * year / 20 + 12 * year / daysOf(LocalDate.of(season, 11, 28));
        SeasonInProgress.Logged logged = log.logged(fixture.perch, season).orElseThrow();
        assertThat(logged.loggedTonnes()).isCloseTo(12.1, within(1e-9));
        assertThat(logged.finalTonnes()).isCloseTo(expected, within(1e-9)).isLessThan(16);
        assertThat(logged.recordedUpTo()).isEqualTo(LocalDate.of(season, 11, 28));
        assertThat(logged.over()).isFalse();
    }

    @Test
    void tooFewDaysTellNoPaceButWhatIsLogged() {
        landed(season, LocalDate.of(season, 1, 10), fixture.first, 9000);
        SeasonInProgress.Logged logged = log.logged(fixture.perch, season).orElseThrow();
        assertThat(logged.paced()).isFalse();
        assertThat(logged.loggedTonnes()).isEqualTo(9);
    }

    /** A latecomer of a few days counts as two weeks, so that one landing is no 365 of them. */
    @Test
    void aLatecomersFewDaysCountAsTwoWeeks() {
        landed(season, LocalDate.of(season, 6, 30), fixture.first, 6000);
        landed(season, LocalDate.of(season, 1, 2), fixture.second, 140);
        double year = daysOf(LocalDate.of(season, 12, 31));
        double expected = 6 * year / daysOf(LocalDate.of(season, 6, 30)) + 0.14 * year / 14;
        assertThat(log.logged(fixture.perch, season).orElseThrow().finalTonnes())
                .isCloseTo(expected, within(1e-9));
    }

    /** Nothing more is landed once the season's last day has passed. */
    @Test
    void aSeasonThatIsOverEndsWithWhatIsLogged() {
        landed(season - 1, LocalDate.of(season - 1, 8, 31), fixture.first, 15000);
        SeasonInProgress.Logged logged = log.logged(fixture.perch, season - 1).orElseThrow();
        assertThat(logged.over()).isTrue();
        assertThat(logged.finalTonnes()).isEqualTo(15);
        assertThat(logged.cv()).isEqualTo(0.05);
    }

    @Test
    void theSpreadShrinksTowardsTheSeasonsEnd() {
        landed(season, LocalDate.of(season, 3, 31), null, 4000);
        double passed = daysOf(LocalDate.of(season, 3, 31)) / daysOf(LocalDate.of(season, 12, 31));
        assertThat(log.logged(fixture.perch, season).orElseThrow().cv())
                .isCloseTo(0.05 + 0.3 * (1 - passed), within(1e-12));
        assertThat(log.loggedKilograms(fixture.perch, season)).isEmpty();
    }
}
