package org.merewarden.waterbody;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.LocalDate;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

@WholeApplication
class StoredRegisterTest {
    @Autowired
    private Register register;

    @Autowired
    private JdbcClient jdbc;

    @Test
    void aLakeIsReadWithItsLimnologyAndUnknownStaysUnknown() {
        new TestRegion(jdbc).lake("register-lake", "Register Lake");

        WaterBodyView lake = register.waterBody("register-lake").orElseThrow();

        assertThat(lake.areaHectares()).isEqualTo(1000);
        assertThat(lake.meanDepthMetres()).isEqualTo(8);
        assertThat(lake.maxDepthMetres()).isNull();
        assertThat(lake.conductivityMicrosiemensPerCm()).isNull();
        assertThat(register.waterBodies()).contains(lake);
        assertThat(register.waterBody("no-such-lake")).isEmpty();
    }

    @Test
    void aStockIsFoundByNumberAndByAddress() {
        TestRegion region = new TestRegion(jdbc);
        long lake = region.lake("register-stocks", "Register Stocks");
        long perch = region.stock(lake, "FPE");
        jdbc.sql(
                        "insert into stock (water_body_id, species, population, local_name) values (?, 'FPE', 'north', 'reef perch')")
                .param(lake)
                .update();

        StockView plain = register.stock("register-stocks", "FPE").orElseThrow();
        StockView north = register.stock("register-stocks", "FPE.north").orElseThrow();

        assertThat(plain.id()).isEqualTo(perch);
        assertThat(plain.title()).isEqualTo("European perch in Register Stocks");
        assertThat(north.title()).isEqualTo("Reef perch (north) in Register Stocks");
        assertThat(north.speciesKey()).isEqualTo("FPE.north");
        assertThat(register.stock(perch)).contains(plain);
        assertThat(register.stocks()).containsSubsequence(plain, north);
        assertThat(register.stock("register-stocks", "FPI")).isEmpty();
    }

    @Test
    void rightsAreFoundFromBothSides() {
        TestRegion region = new TestRegion(jdbc);
        long stock = region.stock(region.lake("register-rights", "Register Rights"), "FPE");
        long east = region.cooperative("register-east", "East");
        region.right(east, stock, 60);
        region.right(region.cooperative("register-west", "West"), stock, 40);

        assertThat(register.rightsOfStock(stock))
                .extracting(RightView::cooperativeName, RightView::sharePercent)
                .containsExactly(
                        org.assertj.core.groups.Tuple.tuple("East", 60.0),
                        org.assertj.core.groups.Tuple.tuple("West", 40.0));
        assertThat(register.rightsOfCooperative(east))
                .containsExactly(new RightView(east, "register-east", "East", stock, 60));
        assertThat(register.rights()).containsAll(register.rightsOfStock(stock));
        assertThat(register.cooperative("register-east")).contains(new CooperativeView(east, "register-east", "East"));
    }

    @Test
    void theFactorIsTheLatestThatAppliesOnTheDay() {
        jdbc.sql("insert into weight_conversion (species, presentation, valid_from, factor) values"
                        + " ('HUC', 'gutted', ?, 1.1), ('HUC', 'gutted', ?, 1.2)")
                .params(LocalDate.of(2020, 1, 1), LocalDate.of(2022, 1, 1))
                .update();

        assertThat(register.conversionFactor("HUC", "gutted", LocalDate.of(2019, 12, 31)))
                .isEmpty();
        assertThat(register.conversionFactor("HUC", "gutted", LocalDate.of(2021, 12, 31)))
                .contains(1.1);
        assertThat(register.conversionFactor("HUC", "gutted", LocalDate.of(2022, 1, 1)))
                .contains(1.2);
        assertThat(register.conversionFactor("HUC", "whole", LocalDate.of(2019, 1, 1)))
                .contains(1.0);
        assertThat(register.presentations()).startsWith("whole").contains("gutted");
    }

    @Test
    void speciesComeByEnglishNameWithTheirCodes() {
        assertThat(register.species("FPI")).contains(new Species("FPI", "Esox lucius", "northern pike"));
        assertThat(register.species("XXX")).isEmpty();
        assertThat(register.species())
                .hasSize(70)
                .isSortedAccordingTo(
                        java.util.Comparator.comparing(Species::englishName, String.CASE_INSENSITIVE_ORDER));
    }
}
