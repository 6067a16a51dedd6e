package org.merewarden.waterbody;

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
import org.merewarden.intake.Column;
import org.merewarden.intake.Problem;
import org.merewarden.intake.TableDefinition;
import org.merewarden.intake.TableRow;
import org.springframework.stereotype.Component;

@Component
class StockHandler extends RegisterHandler<Stock> {
    private static final List<Column> DETAILS = List.of(
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

    private static final TableDefinition DEFINITION = new TableDefinition(
            "stocks",
            "Stocks: a species in a water body",
            20,
            Stream.concat(StockReferences.columns().stream(), DETAILS.stream()).toList());

    private final Stocks stocks;
    private final Register register;

    StockHandler(Stocks stocks, Register register, ActivityLog log) {
        super(stocks, register, log);
        this.stocks = stocks;
        this.register = register;
    }

    @Override
    public TableDefinition definition() {
        return DEFINITION;
    }

    @Override
    Map<String, Stock> stored() {
        Map<Long, Stock> byId = stocks.findAll().stream()
                .collect(Collectors.toMap(s -> s.id == null ? -1L : s.id, Function.identity()));
        return register.stocks().stream()
                .filter(view -> byId.containsKey(view.id()))
                .collect(Collectors.toMap(StockView::key, view -> byId.get(view.id())));
    }

    @Override
    String key(TableRow row) {
        return StockReferences.key(row);
    }

    @Override
    Map<String, @Nullable Object> cells(Stock stored) {
        return stored.details.cells();
    }

    @Override
    Map<String, @Nullable Object> cells(TableRow row) {
        return StockDetails.of(row).cells();
    }

    @Override
    Stream<@Nullable Problem> problems(TableRow row, StockReferences references, Batch batch) {
        return Stream.of(references.lakeProblem(row, batch), speciesProblem(row), population(row));
    }

    private static @Nullable Problem population(TableRow row) {
        String population = row.textOrEmpty("population");
        return population.matches("[a-z0-9-]{0,40}")
                ? null
                : new Problem(
                        "population",
                        population,
                        "stands in addresses and needs lower-case letters, digits and hyphens, 40 at most");
    }

    @Override
    Stock make(TableRow row, StockReferences references) {
        Stock made = new Stock();
        made.waterBodyId = references.lake(row).orElseThrow().id();
        change(made, row);
        return made;
    }

    @Override
    void change(Stock stored, TableRow row) {
        stored.details = StockDetails.of(row);
    }
}
