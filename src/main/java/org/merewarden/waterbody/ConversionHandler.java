package org.merewarden.waterbody;

import static org.merewarden.intake.Column.code;
import static org.merewarden.intake.Column.date;
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
class ConversionHandler extends RegisterHandler<WeightConversion> {
    private static final TableDefinition DEFINITION = new TableDefinition(
            "conversions",
            "Factors from landed to live weight",
            50,
            List.of(
                    code("species", "FAO three-letter code of the species")
                            .between(0, 3)
                            .asKey(),
                    StockReferences.population(),
                    text("presentation", "how the fish is landed: gutted, fillet, box …")
                            .between(0, 60)
                            .asKey(),
                    date("valid_from", "first day on which the factor applies").asKey(),
                    number("factor", "live weight / landed weight").mandatory().between(1, 10)));

    private final WeightConversions conversions;
    private final Register register;

    ConversionHandler(WeightConversions conversions, Register register, ActivityLog log) {
        super(conversions, register, log);
        this.conversions = conversions;
        this.register = register;
    }

    @Override
    public TableDefinition definition() {
        return DEFINITION;
    }

    @Override
    Map<String, WeightConversion> stored() {
        return conversions.findAll().stream().collect(Collectors.toMap(c -> c.details.key(), Function.identity()));
    }

    @Override
    String key(TableRow row) {
        return ConversionDetails.of(row).key();
    }

    @Override
    Map<String, @Nullable Object> cells(WeightConversion stored) {
        return stored.details.cells();
    }

    @Override
    Map<String, @Nullable Object> cells(TableRow row) {
        return ConversionDetails.of(row).cells();
    }

    @Override
    Stream<@Nullable Problem> problems(TableRow row, StockReferences references, Batch batch) {
        return Stream.of(
                RegisterRules.species(row, code -> register.species(code).isPresent()), population(row), whole(row));
    }

    private static @Nullable Problem population(TableRow row) {
        String population = row.textOrEmpty("population");
        return population.isEmpty()
                ? null
                : new Problem(
                        "population",
                        population,
                        "a factor counts for all populations of its species; leave the cell empty");
    }

    private static @Nullable Problem whole(TableRow row) {
        return "whole".equals(row.text("presentation"))
                ? new Problem("presentation", "whole", "a whole fish weighs what it weighs: its factor is always 1")
                : null;
    }

    @Override
    WeightConversion make(TableRow row, StockReferences references) {
        WeightConversion made = new WeightConversion();
        change(made, row);
        return made;
    }

    @Override
    void change(WeightConversion stored, TableRow row) {
        stored.details = ConversionDetails.of(row);
    }
}
