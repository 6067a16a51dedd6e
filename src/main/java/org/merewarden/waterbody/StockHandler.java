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
class StockHandler extends RegisterHandler<Stock> {
    private final Stocks stocks;
    private final Register register;

    StockHandler(Stocks stocks, Register register, ActivityLog log) {
        super(stocks, register, log);
        this.stocks = stocks;
        this.register = register;
    }

    @Override
    public TableDefinition definition() {
        return RegisterTables.STOCKS;
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
        return RegisterRules.stock(
                row, references, batch, code -> register.species(code).isPresent());
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
