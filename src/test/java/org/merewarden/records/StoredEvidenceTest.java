package org.merewarden.records;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;

import java.time.OffsetDateTime;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.web.NotFound;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

@WholeApplication
class StoredEvidenceTest {
    @Autowired
    private EvidenceReader reader;

    @Autowired
    private JdbcClient jdbc;

    @Test
    void rowsInForceBecomeEvidence() {
        TestRegion region = new TestRegion(jdbc);
        long lake = region.lake("evidence-rows", "Evidence Rows");
        long stock = region.stock(lake, "FPE");
        region.stock(lake, "FPI");
        region.catches(stock, 2020, List.of(12.0, 14.0));
        region.index(stock, 2020, List.of(3.0, 2.5));
        jdbc.sql("insert into catch_record (stock_id, season_year, sector, catch_t, cv, reported_fraction, recorded_at,"
                        + " recorded_by, current_mark) values (?, 2020, 'angling', 2, 0.4, 0.5, ?, 'test', true)")
                .params(stock, OffsetDateTime.now())
                .update();

        Evidence evidence = reader.evidence(stock);

        assertThat(evidence.habitat().stocksInLake()).isEqualTo(2);
        assertThat(evidence.habitat().areaHectares()).isEqualTo(1000);
        assertThat(evidence.habitat().conductivityMicrosiemensPerCm()).isNull();
        assertThat(evidence.traits().stockedOnly()).isFalse();
        assertThat(evidence.catches())
                .containsExactly(
                        new CatchRecord(2020, "angling", 2, 0.4, 0.5),
                        new CatchRecord(2020, "commercial", 12, null, 1),
                        new CatchRecord(2021, "commercial", 14, null, 1));
        assertThat(evidence.removals(2020)).hasValue(16);
        assertThat(evidence.surveys())
                .containsExactly(
                        new SurveyRecord(2020, "nets", 0.5, false, 3, null, null),
                        new SurveyRecord(2021, "nets", 0.5, false, 2.5, null, null));
    }

    /** Perch 12 t and pike 4 t a season: three quarters of the recorded catch and one; all as the full evidence has it. */
    @Test
    void theSubjectsOfALakeAreThoseOfItsStocksEvidence() {
        TestRegion region = new TestRegion(jdbc);
        long lake = region.lake("evidence-shares", "Evidence Shares");
        long perch = region.stock(lake, "FPE");
        long pike = region.stock(lake, "FPI");
        region.stock(region.lake("evidence-elsewhere", "Evidence Elsewhere"), "FPE");
        region.catches(perch, 2020, List.of(12.0, 12.0));
        region.catches(pike, 2020, List.of(4.0));
        jdbc.sql("update stock set share_of_lake_yield = 0.4 where id = ?")
                .param(pike)
                .update();

        Map<Long, EvidenceReader.Subject> subjects = reader.subjects(lake);

        assertThat(subjects).containsOnlyKeys(perch, pike);
        assertThat(subjects.get(perch).habitat().shareOfRecordedCatch()).isCloseTo(0.75, within(1e-9));
        assertThat(subjects.get(pike).traits().shareOfLakeYield()).isEqualTo(0.4);
        for (long stock : List.of(perch, pike)) {
            Evidence evidence = reader.evidence(stock);
            assertThat(subjects.get(stock))
                    .isEqualTo(new EvidenceReader.Subject(evidence.habitat(), evidence.traits()));
        }
    }

    @Test
    void earlierAndProvisionalRowsAreNotEvidence() {
        TestRegion region = new TestRegion(jdbc);
        long stock = region.stock(region.lake("evidence-past", "Evidence Past"), "FPE");
        region.catches(stock, 2020, List.of(12.0));
        jdbc.sql(
                        "insert into catch_record (stock_id, season_year, catch_t, provisional, recorded_at, recorded_by,"
                                + " current_mark) values (?, 2021, 9, true, ?, 'test', true), (?, 2020, 7, false, ?, 'test', null)")
                .params(stock, OffsetDateTime.now(), stock, OffsetDateTime.now())
                .update();

        assertThat(reader.evidence(stock).catches()).containsExactly(new CatchRecord(2020, "commercial", 12, null, 1));
    }

    @Test
    void eventsWithoutSpeciesCountForEveryStockOfTheWater() {
        TestRegion region = new TestRegion(jdbc);
        long lake = region.lake("evidence-events", "Evidence Events");
        long perch = region.stock(lake, "FPE");
        long pike = region.stock(lake, "FPI");
        event(lake, "ev-kill", "", 2019, "fish kill", 0.1, 0.2, 0.3);
        event(lake, "ev-shut", "FPI", 2021, "closure", null, 0.5, null);

        assertThat(reader.evidence(perch).events())
                .containsExactly(new EventRecord("ev-kill", 2019, "fish kill", 0.1, 0.2, 0.3, null, null));
        assertThat(reader.evidence(pike).events())
                .containsExactly(
                        new EventRecord("ev-kill", 2019, "fish kill", 0.1, 0.2, 0.3, null, null),
                        new EventRecord("ev-shut", 2021, "closure", null, 0.5, null, null, null));
    }

    @Test
    void aStockingEntersWhenItsFishRecruit() {
        TestRegion region = new TestRegion(jdbc);
        long lake = region.lake("evidence-stocking", "Evidence Stocking");
        long stock = region.stock(lake, "FPP");
        jdbc.sql(
                        "insert into event_record (event_key, water_body_id, species, season_year, kind, number_stocked, survival,"
                                + " delay_years, recruit_weight_kg, recorded_at, recorded_by, current_mark)"
                                + " values ('ev-fry', ?, 'FPP', 2018, 'stocking', 40000, 0.05, 2, 0.3, ?, 'test', true)")
                .params(lake, OffsetDateTime.now())
                .update();

        EventRecord stocking = reader.evidence(stock).events().get(0);

        // 40,000 fish × 0.05 × 0.3 kg = 600 kg
        assertThat(stocking.recruitedTonnes()).isCloseTo(0.6, within(1e-12));
        assertThat(stocking.recruitYear()).isEqualTo(2020);
        assertThat(EvidenceMapping.recruitedTonnes(40000.0, null, 0.3)).isNull();
    }

    @Test
    void anUnknownStockIsNotFound() {
        assertThatThrownBy(() -> reader.evidence(-1))
                .isInstanceOf(NotFound.class)
                .hasMessageContaining("-1");
    }

    private void event(
            long lake, String key, String species, int year, String kind, Double low, Double likely, Double high) {
        jdbc.sql(
                        "insert into event_record (event_key, water_body_id, species, season_year, kind, low_value, likely_value,"
                                + " high_value, recorded_at, recorded_by, current_mark)"
                                + " values (:key, :lake, :species, :year, :kind, :low, :likely, :high, :at, 'test', true)")
                .param("key", key)
                .param("lake", lake)
                .param("species", species)
                .param("year", year)
                .param("kind", kind)
                .param("low", low)
                .param("likely", likely)
                .param("high", high)
                .param("at", OffsetDateTime.now())
                .update();
    }
}
