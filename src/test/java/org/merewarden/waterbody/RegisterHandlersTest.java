package org.merewarden.waterbody;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.Instant;
import java.time.LocalDate;
import java.util.Arrays;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableRow;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.transaction.annotation.Transactional;

/** Rows as the importer hands them over; rolled back after each test. */
@WholeApplication
@Transactional
class RegisterHandlersTest {
    private static final Batch ALONE = (table, keys) -> false;
    private static final Provenance IMPORT = new Provenance(7, "test", Instant.parse("2026-01-01T00:00:00Z"));

    @Autowired
    private WaterBodyHandler waterBodies;

    @Autowired
    private StockHandler stocks;

    @Autowired
    private CooperativeHandler cooperatives;

    @Autowired
    private RightHandler rights;

    @Autowired
    private ConversionHandler conversions;

    @Autowired
    private Register register;

    @Autowired
    private JdbcClient jdbc;

    @Test
    void aWaterBodyIsNewThenSameThenChanged() {
        TableRow row = row("code", "handled-lake", "name", "Handled Lake", "kind", "lake", "area_ha", 120.0);

        assertThat(waterBodies.examine(List.of(row), ALONE)).containsExactly(Fate.NEW);
        waterBodies.store(List.of(row), IMPORT);
        assertThat(waterBodies.examine(List.of(row), ALONE)).containsExactly(Fate.SAME);

        TableRow larger = row("code", "handled-lake", "name", "Handled Lake", "kind", "lake", "area_ha", 125.5);
        assertThat(waterBodies.examine(List.of(larger), ALONE)).containsExactly(Fate.changed("area_ha 120 → 125.5"));
        waterBodies.store(List.of(larger), IMPORT);
        assertThat(register.waterBody("handled-lake").orElseThrow().areaHectares())
                .isEqualTo(125.5);
        assertThat(jdbc.sql("select before_text from activity_entry where subject = 'water-bodies, handled-lake'")
                        .query(String.class)
                        .single())
                .contains("area_ha 120");
    }

    @Test
    void aColumnThatTheFileDoesNotHaveLeavesWhatIsStored() {
        TableRow whole = row("code", "part-lake", "name", "Part Lake", "kind", "lagoon", "area_ha", 120.0);
        waterBodies.store(List.of(whole), IMPORT);
        // a default stands in the cell of a column that is not there, too
        Map<String, Object> told = Map.of("code", "part-lake", "name", "Part Lake", "kind", "lake", "area_ha", 90.0);
        TableRow part = new TableRow(2, told, Set.of("kind", "note"));

        assertThat(waterBodies.examine(List.of(part), ALONE)).containsExactly(Fate.changed("area_ha 120 → 90"));
        waterBodies.store(List.of(part), IMPORT);
        assertThat(register.waterBody("part-lake").orElseThrow())
                .satisfies(lake -> assertThat(lake.kind()).isEqualTo("lagoon"))
                .satisfies(lake -> assertThat(lake.areaHectares()).isEqualTo(90));
    }

    @Test
    void aCodeThatCannotStandInAnAddressIsRefused() {
        Fate fate = waterBodies
                .examine(List.of(row("code", "Mill Pond", "name", "Mill Pond", "area_ha", 3.0)), ALONE)
                .get(0);

        assertThat(fate.kind()).isEqualTo(Fate.Kind.REFUSED);
        assertThat(fate.problems()).singleElement().satisfies(p -> {
            assertThat(p.column()).isEqualTo("code");
            assertThat(p.value()).isEqualTo("Mill Pond");
        });
    }

    @Test
    void aMeanDepthBelowTheDeepestPointIsRequired() {
        Fate fate = waterBodies
                .examine(
                        List.of(row(
                                "code",
                                "deep",
                                "name",
                                "Deep",
                                "area_ha",
                                3.0,
                                "mean_depth_m",
                                9.0,
                                "max_depth_m",
                                4.0)),
                        ALONE)
                .get(0);

        assertThat(fate.problems())
                .singleElement()
                .satisfies(p -> assertThat(p.rule()).contains("4.0 m"));
    }

    @Test
    void aStockNeedsItsLakeFromTheStoreOrTheSameImport() {
        TableRow row = row("water_body", "brought-lake", "species", "FPE", "population", "");
        Batch bringsLake = (table, keys) -> table.equals("water-bodies") && keys[0].equals("brought-lake");

        assertThat(stocks.examine(List.of(row), bringsLake)).containsExactly(Fate.NEW);
        Fate alone = stocks.examine(List.of(row), ALONE).get(0);
        assertThat(alone.problems())
                .singleElement()
                .satisfies(p -> assertThat(p.rule())
                        .isEqualTo(
                                "no water body has the code “brought-lake”; add the water body or mend the" + " code"));
    }

    @Test
    void anUnknownSpeciesIsRefusedByName() {
        new TestRegion(jdbc).lake("species-lake", "Species Lake");

        Fate fate = stocks.examine(List.of(row("water_body", "species-lake", "species", "fpe")), ALONE)
                .get(0);

        assertThat(fate.problems()).singleElement().satisfies(p -> {
            assertThat(p.column()).isEqualTo("species");
            assertThat(p.value()).isEqualTo("fpe");
        });
    }

    @Test
    void aStoredStockIsReadBackAndComparedByEveryColumn() {
        new TestRegion(jdbc).lake("stock-lake", "Stock Lake");
        TableRow row = row(
                "water_body",
                "stock-lake",
                "species",
                "FPE",
                "population",
                "north",
                "recruitment",
                "mixed",
                "max_age_years",
                12.0,
                "share_of_lake_yield",
                0.3);

        stocks.store(List.of(row), IMPORT);

        assertThat(stocks.examine(List.of(row), ALONE)).containsExactly(Fate.SAME);
        assertThat(register.stock("stock-lake", "FPE.north").orElseThrow().shareOfLakeYield())
                .isEqualTo(0.3);
    }

    @Test
    void sharesOfAStockBeyondTheWholeAreRefusedWithTheirSum() {
        TestRegion region = new TestRegion(jdbc);
        long stock = region.stock(region.lake("share-lake", "Share Lake"), "FPE");
        region.right(region.cooperative("share-old", "Old"), stock, 50);
        region.cooperative("share-new", "New");
        TableRow tooMuch =
                row("cooperative", "share-new", "water_body", "share-lake", "species", "FPE", "share_percent", 50.5);
        TableRow fits =
                row("cooperative", "share-new", "water_body", "share-lake", "species", "FPE", "share_percent", 50.0);
        TableRow less =
                row("cooperative", "share-old", "water_body", "share-lake", "species", "FPE", "share_percent", 49.5);

        assertThat(rights.examine(List.of(tooMuch), ALONE).get(0).problems())
                .singleElement()
                .satisfies(p -> assertThat(p.rule()).contains("100.5 %"));
        assertThat(rights.examine(List.of(fits), ALONE)).containsExactly(Fate.NEW);
        assertThat(rights.examine(List.of(tooMuch, less), ALONE))
                .containsExactly(Fate.NEW, Fate.changed("share_percent 50 → 49.5"));

        rights.store(List.of(tooMuch, less), IMPORT);
        assertThat(register.rightsOfStock(stock))
                .extracting(RightView::sharePercent)
                .containsExactlyInAnyOrder(50.5, 49.5);
    }

    @Test
    void aRightNamesAKnownCooperative() {
        TestRegion region = new TestRegion(jdbc);
        region.stock(region.lake("right-lake", "Right Lake"), "FPE");

        Fate fate = rights.examine(
                        List.of(row(
                                "cooperative",
                                "nobody",
                                "water_body",
                                "right-lake",
                                "species",
                                "FPE",
                                "share_percent",
                                10.0)),
                        ALONE)
                .get(0);

        assertThat(fate.problems())
                .singleElement()
                .satisfies(p -> assertThat(p.value()).isEqualTo("nobody"));
    }

    @Test
    void cooperativesAndConversionsAreStoredOnce() {
        TableRow cooperative = row("code", "handled-coop", "name", "Handled");
        TableRow factor = row(
                "species",
                "HUC",
                "population",
                "",
                "presentation",
                "fillet",
                "valid_from",
                LocalDate.of(2020, 1, 1),
                "factor",
                2.1);

        cooperatives.store(List.of(cooperative), IMPORT);
        conversions.store(List.of(factor), IMPORT);

        assertThat(cooperatives.examine(List.of(cooperative), ALONE)).containsExactly(Fate.SAME);
        assertThat(conversions.examine(List.of(factor), ALONE)).containsExactly(Fate.SAME);
        assertThat(register.conversionFactor("HUC", "fillet", LocalDate.of(2021, 1, 1)))
                .contains(2.1);
    }

    private static TableRow row(Object... namesAndValues) {
        Map<String, Object> values = new HashMap<>();
        List<Object> all = Arrays.asList(namesAndValues);
        for (int i = 0; i < all.size(); i += 2) {
            values.put((String) all.get(i), all.get(i + 1));
        }
        return new TableRow(2, values);
    }
}
