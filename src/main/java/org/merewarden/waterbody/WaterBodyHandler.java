package org.merewarden.waterbody;

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
    private final WaterBodies waterBodies;

    WaterBodyHandler(WaterBodies waterBodies, Register register, ActivityLog log) {
        super(waterBodies, register, log);
        this.waterBodies = waterBodies;
    }

    @Override
    public TableDefinition definition() {
        return RegisterTables.WATER_BODIES;
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
        return RegisterRules.waterBody(row);
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
