package org.merewarden.records;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.Instant;
import java.time.LocalDate;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.core.evidence.AreaRecord;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Column;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Problem;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableRow;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.transaction.annotation.Transactional;

/** Rows as the importer hands them over; rolled back after each test. */
@WholeApplication
@Transactional
class RecordHandlersTest {
    private static final Batch ALONE = (table, keys) -> false;

    @Autowired
    private RecordHandler catchHandler;

    @Autowired
    private RecordHandler surveyHandler;

    @Autowired
    private RecordHandler eventHandler;

    @Autowired
    private RecordHandler areaHandler;

    @Autowired
    private RecordHandler priorHandler;

    @Autowired
    private RecordHandler effortHandler;

    @Autowired
    private EvidenceReader reader;

    @Autowired
    private JdbcClient jdbc;

    private long stock;
    private Provenance provenance;

    @BeforeEach
    void aStockAndAnImport() {
        TestRegion region = new TestRegion(jdbc);
        stock = region.stock(region.lake("kept-lake", "Kept Lake"), "FPE");
        jdbc.sql("insert into import_batch (state, uploaded_at, uploaded_by) values ('EXAMINED', ?, 'importer')")
                .param(java.time.OffsetDateTime.now())
                .update();
        long batch =
                jdbc.sql("select max(id) from import_batch").query(Long.class).single();
        provenance = new Provenance(batch, "importer", Instant.parse("2026-03-01T10:00:00Z"));
    }

    @Test
    void aChangeSupersedesAndTheEarlierRowStays() {
        store(catchHandler, catchRow(2020, 12.4), catchRow(2021, 8.0));
        assertThat(catchHandler.examine(List.of(catchRow(2020, 12.4)), ALONE)).containsExactly(Fate.SAME);
        assertThat(catchHandler.examine(List.of(catchRow(2020, 12.9), catchRow(2022, 1.0)), ALONE))
                .containsExactly(Fate.changed("catch_t 12.4 → 12.9"), Fate.NEW);

        store(catchHandler, catchRow(2020, 12.9), catchRow(2021, 8.0));

        assertThat(reader.evidence(stock).catches())
                .containsExactly(
                        new CatchRecord(2020, "commercial", 12.9, null, 1),
                        new CatchRecord(2021, "commercial", 8, null, 1));
        assertThat(jdbc.sql("select catch_t, superseded_by, current_mark, recorded_by, import_id from catch_record"
                                + " where stock_id = ? and season_year = 2020 order by id")
                        .param(stock)
                        .query()
                        .listOfRows())
                .hasSize(2)
                .first()
                .satisfies(old -> {
                    assertThat(old.get("catch_t")).isEqualTo(12.4);
                    assertThat(old.get("superseded_by")).isEqualTo("importer");
                    assertThat(old.get("current_mark")).isNull();
                    assertThat(old.get("import_id")).isEqualTo(provenance.importId());
                });
        assertThat(count("catch_record where season_year = 2021")).isEqualTo(1);
    }

    @Test
    void aColumnThatTheFileDoesNotHaveLeavesWhatIsStored() {
        Map<String, Object> told = Map.of(
                "water_body",
                "kept-lake",
                "species",
                "FPE",
                "year",
                2020,
                "sector",
                "commercial",
                "catch_t",
                12.4,
                "cv",
                0.2,
                "source",
                "ledger");
        store(catchHandler, new TableRow(2, told));
        Map<String, Object> less = new HashMap<>(told);
        less.keySet().removeAll(Set.of("cv", "source"));
        TableRow emptied = new TableRow(2, less);
        TableRow without = new TableRow(2, less, Set.of("cv", "source", "reported_fraction"));
        assertThat(catchHandler.examine(List.of(emptied), ALONE))
                .containsExactly(Fate.changed("cv 0.2 → unknown; source ledger → unknown"));
        assertThat(catchHandler.examine(List.of(without), ALONE)).containsExactly(Fate.SAME);
        less.put("catch_t", 13.0);
        TableRow changed = new TableRow(2, less, Set.of("cv", "source", "reported_fraction"));
        assertThat(catchHandler.examine(List.of(changed), ALONE)).containsExactly(Fate.changed("catch_t 12.4 → 13"));
        store(catchHandler, changed);
        assertThat(reader.evidence(stock).catches()).containsExactly(new CatchRecord(2020, "commercial", 13, 0.2, 1));
    }

    @Test
    void aProvisionalCatchIsReplacedByTheSameFigure() {
        jdbc.sql("insert into catch_record (stock_id, season_year, catch_t, provisional, recorded_at, recorded_by,"
                        + " current_mark) values (?, 2024, 5, true, ?, 'test', true)")
                .params(stock, java.time.OffsetDateTime.now())
                .update();

        assertThat(catchHandler.examine(List.of(catchRow(2024, 5)), ALONE))
                .containsExactly(Fate.changed("provisional → final"));
        store(catchHandler, catchRow(2024, 5));

        assertThat(reader.evidence(stock).catches()).containsExactly(new CatchRecord(2024, "commercial", 5, null, 1));
    }

    @Test
    void unknownLakesAndStocksAreRefusedUnlessTheImportBringsThem() {
        TableRow lake = row("water_body", "nowhere", "species", "FPE", "year", 2020, "catch_t", 1.0);
        TableRow species = row("water_body", "kept-lake", "species", "FPI", "year", 2020, "catch_t", 1.0);
        Batch brings = (table, keys) -> table.equals("water-bodies") || table.equals("stocks");

        assertThat(problem(catchHandler, lake).rule())
                .isEqualTo("no water body has the code “nowhere”; add the water body or mend the code");
        assertThat(problem(catchHandler, species).column()).isEqualTo("species");
        assertThat(catchHandler.examine(List.of(lake, species), brings)).containsExactly(Fate.NEW, Fate.NEW);
    }

    @Test
    void aBiomassNeedsItsCvAndMoreThanNothing() {
        TableRow bare = survey("biomass", 12.0, null);
        TableRow nothing = survey("biomass", 0.0, 0.3);
        TableRow emptyNets = survey("index", 0.0, null);

        assertThat(problem(surveyHandler, bare).column()).isEqualTo("cv");
        assertThat(problem(surveyHandler, nothing))
                .isEqualTo(new Problem("value", "0", "a biomass in t needs a value above 0"));
        store(surveyHandler, emptyNets);
        assertThat(reader.evidence(stock).surveys())
                .containsExactly(new SurveyRecord(2020, "echo", 0.5, false, 0, null, null));
    }

    @Test
    void aFishKillIsThreeOrderedFractions() {
        assertThat(problem(eventHandler, kill(0.1, 0.5, 1.2)).column()).isEqualTo("high");
        assertThat(problem(eventHandler, kill(0.6, 0.5, 0.7)).rule())
                .isEqualTo("needs low ≤ likely ≤ high, got 0.6, 0.5, 0.7");
        assertThat(problem(
                                eventHandler,
                                row(
                                        "key",
                                        "k",
                                        "water_body",
                                        "kept-lake",
                                        "year",
                                        2019,
                                        "kind",
                                        "fish kill",
                                        "low",
                                        0.1))
                        .rule())
                .contains("together");
        assertThat(eventHandler.examine(List.of(kill(0.1, 0.1, 0.1)), ALONE)).containsExactly(Fate.NEW);
    }

    @Test
    void anEventIsCorrectedByItsKeyAlsoToAnotherWater() {
        new TestRegion(jdbc).lake("other-lake", "Other Lake");
        store(eventHandler, kill(0.1, 0.2, 0.3));
        TableRow moved = row(
                "key",
                "k",
                "water_body",
                "other-lake",
                "species",
                "",
                "population",
                "",
                "year",
                2019,
                "kind",
                "fish kill",
                "low",
                0.1,
                "likely",
                0.2,
                "high",
                0.3);

        assertThat(eventHandler.examine(List.of(kill(0.1, 0.2, 0.3)), ALONE)).containsExactly(Fate.SAME);
        assertThat(eventHandler.examine(List.of(moved), ALONE).get(0).remark()).contains("another water body");
        store(eventHandler, moved);

        assertThat(reader.evidence(stock).events()).isEmpty();
        assertThat(count("event_record where event_key = 'k'")).isEqualTo(2);
    }

    @Test
    void areasPriorsAndEffortAreKept() {
        TableRow area = row("water_body", "kept-lake", "year", 2003, "area_ha", 940.0);
        TableRow prior = row(
                "water_body",
                "kept-lake",
                "species",
                "FPE",
                "parameter",
                "fmsy",
                "median",
                0.2,
                "log_sd",
                0.3,
                "reason",
                "scales");
        TableRow effort = row(
                "water_body",
                "kept-lake",
                "species",
                "FPE",
                "year",
                2020,
                "series",
                "nets",
                "effort",
                100.0,
                "unit",
                "net-nights");

        store(areaHandler, area);
        store(priorHandler, prior);
        store(effortHandler, effort);

        assertThat(reader.evidence(stock).areas()).containsExactly(new AreaRecord(2003, 940));
        assertThat(reader.evidence(stock).priors()).containsExactly(new PriorRecord("fmsy", "", 0.2, 0.3, "scales"));
        assertThat(areaHandler.examine(List.of(area), ALONE)).containsExactly(Fate.SAME);
        assertThat(priorHandler.examine(List.of(prior), ALONE)).containsExactly(Fate.SAME);
        assertThat(effortHandler.examine(List.of(effort), ALONE)).containsExactly(Fate.SAME);
    }

    @Test
    void definitionsHoldTheColumnsOfTheFormats() {
        assertThat(names(eventHandler))
                .containsExactly(
                        "key",
                        "water_body",
                        "species",
                        "population",
                        "year",
                        "date",
                        "kind",
                        "low",
                        "likely",
                        "high",
                        "stage",
                        "number",
                        "mean_weight_g",
                        "survival",
                        "delay_years",
                        "recruit_weight_kg",
                        "source");
        assertThat(names(catchHandler))
                .containsExactly(
                        "water_body",
                        "species",
                        "population",
                        "year",
                        "sector",
                        "catch_t",
                        "cv",
                        "reported_fraction",
                        "source");
        assertThat(names(surveyHandler))
                .containsExactly(
                        "water_body",
                        "species",
                        "population",
                        "year",
                        "series",
                        "time_of_year",
                        "kind",
                        "value",
                        "cv",
                        "nets",
                        "design",
                        "unit",
                        "source");
    }

    private static List<String> names(RecordHandler handler) {
        return handler.definition().columns().stream().map(Column::name).toList();
    }

    private void store(RecordHandler handler, TableRow... rows) {
        handler.store(List.of(rows), provenance);
    }

    private static Problem problem(RecordHandler handler, TableRow row) {
        Fate fate = handler.examine(List.of(row), ALONE).get(0);
        assertThat(fate.kind()).isEqualTo(Fate.Kind.REFUSED);
        assertThat(fate.problems()).hasSize(1);
        return fate.problems().get(0);
    }

    private int count(String from) {
        return jdbc.sql("select count(*) from " + from).query(Integer.class).single();
    }

    private static TableRow catchRow(int year, double tonnes) {
        return row(
                "water_body",
                "kept-lake",
                "species",
                "FPE",
                "population",
                "",
                "year",
                year,
                "sector",
                "commercial",
                "catch_t",
                tonnes);
    }

    private static TableRow survey(String kind, Double value, Double cv) {
        return row(
                "water_body",
                "kept-lake",
                "species",
                "FPE",
                "year",
                2020,
                "series",
                "echo",
                "time_of_year",
                0.5,
                "kind",
                kind,
                "value",
                value,
                "cv",
                cv);
    }

    private static TableRow kill(double low, double likely, double high) {
        return row(
                "key",
                "k",
                "water_body",
                "kept-lake",
                "species",
                "",
                "population",
                "",
                "year",
                2019,
                "date",
                LocalDate.of(2019, 7, 2),
                "kind",
                "fish kill",
                "low",
                low,
                "likely",
                likely,
                "high",
                high);
    }

    private static TableRow row(Object... namesAndValues) {
        Map<String, Object> values = new HashMap<>();
        List<Object> all = Arrays.asList(namesAndValues);
        for (int i = 0; i < all.size(); i += 2) {
            if (all.get(i + 1) != null) {
                values.put((String) all.get(i), all.get(i + 1));
            }
        }
        return new TableRow(2, values);
    }
}
