package org.merewarden.waterbody;

import static org.merewarden.intake.Column.code;
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
class CooperativeHandler extends RegisterHandler<Cooperative> {
    private static final TableDefinition DEFINITION = new TableDefinition(
            "cooperatives",
            "Cooperatives",
            30,
            List.of(
                    code("code", "short name in addresses: lower-case letters, digits, hyphens")
                            .between(0, 60)
                            .asKey(),
                    text("name", "name of the cooperative").between(0, 120).mandatory(),
                    text("note", "anything else; no person's name").between(0, 2000)));

    private final Cooperatives cooperatives;

    CooperativeHandler(Cooperatives cooperatives, Register register, ActivityLog log) {
        super(cooperatives, register, log);
        this.cooperatives = cooperatives;
    }

    @Override
    public TableDefinition definition() {
        return DEFINITION;
    }

    @Override
    Map<String, Cooperative> stored() {
        return cooperatives.findAll().stream().collect(Collectors.toMap(c -> c.details.code, Function.identity()));
    }

    @Override
    String key(TableRow row) {
        return row.need("code");
    }

    @Override
    Map<String, @Nullable Object> cells(Cooperative stored) {
        return stored.details.cells();
    }

    @Override
    Map<String, @Nullable Object> cells(TableRow row) {
        return CooperativeDetails.of(row).cells();
    }

    @Override
    Stream<@Nullable Problem> problems(TableRow row, StockReferences references, Batch batch) {
        return Stream.of(Slug.problem("code", row.need("code")));
    }

    @Override
    Cooperative make(TableRow row, StockReferences references) {
        Cooperative made = new Cooperative();
        change(made, row);
        return made;
    }

    @Override
    void change(Cooperative stored, TableRow row) {
        stored.details = CooperativeDetails.of(row);
    }
}
