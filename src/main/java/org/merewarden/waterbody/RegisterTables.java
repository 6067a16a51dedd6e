package org.merewarden.waterbody;

import static org.merewarden.intake.Column.code;
import static org.merewarden.intake.Column.number;
import static org.merewarden.intake.Column.text;

import java.util.List;
import java.util.Objects;
import java.util.stream.Stream;
import org.merewarden.intake.CheckedTable;
import org.merewarden.intake.Column;
import org.merewarden.intake.TableDefinition;

/** The tables of water bodies and stocks. */
public final class RegisterTables {
    static final TableDefinition WATER_BODIES = new TableDefinition(
            "water-bodies",
            "Water bodies with their limnology",
            10,
            List.of(
                    code("code", "short name in addresses: lower-case letters, digits, hyphens")
                            .between(0, 60)
                            .asKey(),
                    text("name", "name of the water").between(0, 120).mandatory(),
                    text("district", "district of the office").between(0, 120),
                    text("kind", "lake, reservoir, lagoon or river")
                            .oneOf("lake", "reservoir", "lagoon", "river")
                            .orElse("lake"),
                    number("area_ha", "surface in hectares").mandatory().between(0.001, 1e8),
                    number("mean_depth_m", "mean depth in metres").between(0.01, 2000),
                    number("max_depth_m", "greatest depth in metres").between(0.01, 2000),
                    number("elevation_m", "height above the sea in metres").between(-500, 6000),
                    number("latitude", "degrees north").between(-90, 90),
                    number("longitude", "degrees east").between(-180, 180),
                    number("dissolved_solids_mg_l", "total dissolved solids in mg/L")
                            .between(0.1, 100000),
                    number("conductivity_us_cm", "conductivity in µS/cm").between(0.1, 200000),
                    number("mean_air_temperature_c", "mean annual air temperature in °C")
                            .between(-30, 40),
                    text("note", "anything else; no person's name").between(0, 2000)));

    private static final List<Column> STOCK_DETAILS = List.of(
            text("local_name", "the office's own name of the fish").between(0, 120),
            text("recruitment", "where young fish come from")
                    .oneOf("natural", "mixed", "stocked only")
                    .orElse("natural"),
            text("productivity", "how fast the stock renews itself").oneOf("very slow", "slow", "moderate", "fast"),
            number("max_age_years", "oldest age seen").between(0.1, 300),
            number("growth_k_per_year", "von Bertalanffy K, 1/year").between(0.001, 10),
            number("growth_linf_cm", "von Bertalanffy asymptotic length in cm").between(1, 600),
            number("mean_weight_kg", "mean weight of a fish caught, kg").between(0.0001, 1000),
            number("share_of_lake_yield", "share of the lake's whole yield, 0 to 1")
                    .between(0.0001, 1),
            number("price_per_kg", "price at landing per kg").between(0, 1e6),
            number("effort_cost", "cost of a unit of effort").between(0, 1e9),
            text("note", "anything else; no person's name").between(0, 2000));

    static final TableDefinition STOCKS = new TableDefinition(
            "stocks",
            "Stocks: a species in a water body",
            20,
            Stream.concat(StockReferences.columns().stream(), STOCK_DETAILS.stream())
                    .toList());

    private RegisterTables() {}

    /** Both with their rules, for reading without a store. */
    public static List<CheckedTable> withoutStore() {
        StockReferences references = StockReferences.NONE;
        SpeciesList species = new SpeciesList();
        return List.of(
                new CheckedTable(
                        WATER_BODIES,
                        (row, batch) -> RegisterRules.waterBody(row).filter(Objects::nonNull)),
                new CheckedTable(
                        STOCKS,
                        (row, batch) -> RegisterRules.stock(
                                        row,
                                        references,
                                        batch,
                                        code -> species.find(code).isPresent())
                                .filter(Objects::nonNull)));
    }
}
