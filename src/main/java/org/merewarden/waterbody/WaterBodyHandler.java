package org.merewarden.waterbody;

import static org.merewarden.intake.Column.code;
import static org.merewarden.intake.Column.number;
import static org.merewarden.intake.Column.text;

import java.util.List;
import java.util.Map;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Problem;
import org.merewarden.intake.TableDefinition;
import org.merewarden.intake.TableRow;
import org.springframework.stereotype.Component;

@Component
class WaterBodyHandler extends RegisterHandler<WaterBody> {
    private static final TableDefinition DEFINITION = new TableDefinition(
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

    private final WaterBodies waterBodies;

    WaterBodyHandler(WaterBodies waterBodies, Register register, ActivityLog log) {
        super(waterBodies, register, log);
        this.waterBodies = waterBodies;
    }

    @Override
    public TableDefinition definition() {
        return DEFINITION;
    }

    @Override
    Map<String, WaterBody> stored() {
        return waterBodies.findAll().stream().collect(Collectors.toMap(w -> w.details.code, Function.identity()));
    }

    @Override
    String key(TableRow row) {
        return row.need("code");
    }

    @Override
    Map<String, @Nullable Object> cells(WaterBody stored) {
        return stored.details.cells();
    }

    @Override
    Map<String, @Nullable Object> cells(TableRow row) {
        return WaterBodyDetails.of(row).cells();
    }

    @Override
    Stream<@Nullable Problem> problems(TableRow row, StockReferences references, Batch batch) {
        return Stream.of(Slug.problem("code", row.need("code")), depths(WaterBodyDetails.of(row)));
    }

    private static @Nullable Problem depths(WaterBodyDetails details) {
        return details.depthsDisagree()
                ? new Problem(
                        "mean_depth_m",
                        String.valueOf(details.meanDepthMetres),
                        "the mean depth may not exceed max_depth_m, " + details.maxDepthMetres + " m")
                : null;
    }

    @Override
    WaterBody make(TableRow row, StockReferences references) {
        WaterBody made = new WaterBody();
        change(made, row);
        return made;
    }

    @Override
    void change(WaterBody stored, TableRow row) {
        stored.details = WaterBodyDetails.of(row);
    }
}
