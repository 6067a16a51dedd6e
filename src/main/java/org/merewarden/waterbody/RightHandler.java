package org.merewarden.waterbody;

import static org.merewarden.intake.Column.code;
import static org.merewarden.intake.Column.number;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Set;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Column;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Problem;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableDefinition;
import org.merewarden.intake.TableHandler;
import org.merewarden.intake.TableRow;
import org.merewarden.web.Cells;
import org.springframework.stereotype.Component;

/** Rights: the shares of one stock, those of the import and those it leaves alone, add up to 100 per cent at most. */
@Component
class RightHandler implements TableHandler {
    private static final String SHARE = "share_percent";
    private static final TableDefinition DEFINITION =
            new TableDefinition("rights", "Shares of cooperatives in a stock's limit", 40, columns());

    private final FishingRights rights;
    private final Register register;
    private final ActivityLog log;

    RightHandler(FishingRights rights, Register register, ActivityLog log) {
        this.rights = rights;
        this.register = register;
        this.log = log;
    }

    private static List<Column> columns() {
        List<Column> columns = new ArrayList<>();
        columns.add(
                code("cooperative", "code of the cooperative").between(0, 60).asKey());
        columns.addAll(StockReferences.columns());
        columns.add(number(SHARE, "share of the limit in per cent").mandatory().between(0.01, 100));
        return columns;
    }

    @Override
    public TableDefinition definition() {
        return DEFINITION;
    }

    @Override
    public List<Fate> examine(List<TableRow> rows, Batch batch) {
        StockReferences references = StockReferences.of(register);
        Set<String> cooperatives =
                register.cooperatives().stream().map(CooperativeView::code).collect(Collectors.toSet());
        Map<String, Double> stored = storedShares();
        Map<String, Double> totals = totals(rows, stored);
        return rows.stream()
                .map(row -> {
                    Problem[] problems = Stream.of(
                                    cooperativeProblem(row, cooperatives, batch),
                                    references.stockProblem(row, batch),
                                    totalProblem(row, totals))
                            .filter(Objects::nonNull)
                            .toArray(Problem[]::new);
                    return problems.length > 0 ? Fate.refused(problems) : fate(row, stored.get(key(row)));
                })
                .toList();
    }

    private static Fate fate(TableRow row, @Nullable Double before) {
        double share = share(row);
        if (before == null) {
            return Fate.NEW;
        }
        return before == share
                ? Fate.SAME
                : Fate.changed(SHARE + " " + Cells.plain(before) + " → " + Cells.plain(share));
    }

    @Override
    public void store(List<TableRow> rows, Provenance provenance) {
        StockReferences references = StockReferences.of(register);
        Map<String, Long> cooperatives =
                register.cooperatives().stream().collect(Collectors.toMap(CooperativeView::code, CooperativeView::id));
        Map<String, FishingRight> stored = rights.findAll().stream()
                .collect(Collectors.toMap(r -> r.cooperativeId + "/" + r.stockId, Function.identity()));
        List<FishingRight> changed = new ArrayList<>();
        for (TableRow row : rows) {
            long cooperative = Objects.requireNonNull(cooperatives.get(row.need("cooperative")), "cooperative");
            StockView stock = references.stock(row).orElseThrow();
            FishingRight right = stored.getOrDefault(cooperative + "/" + stock.id(), new FishingRight());
            if (right.id != null && right.sharePercent != share(row)) {
                log.record(
                        "changed by import " + provenance.importId(),
                        "right of " + row.need("cooperative") + " to " + stock.title(),
                        Cells.plain(right.sharePercent) + " %",
                        Cells.plain(share(row)) + " %");
            }
            right.cooperativeId = cooperative;
            right.stockId = stock.id();
            right.sharePercent = share(row);
            changed.add(right);
        }
        rights.saveAllAndFlush(changed);
    }

    private Map<String, Double> storedShares() {
        Map<Long, String> keys = register.stocks().stream().collect(Collectors.toMap(StockView::id, StockView::key));
        return register.rights().stream()
                .collect(Collectors.toMap(
                        r -> r.cooperativeCode() + " " + keys.get(r.stockId()), RightView::sharePercent));
    }

    /** Sum of shares by stock, as it would stand after the import. */
    private static Map<String, Double> totals(List<TableRow> rows, Map<String, Double> stored) {
        Map<String, Double> after = new HashMap<>(stored);
        rows.forEach(row -> after.put(key(row), share(row)));
        Map<String, Double> totals = new HashMap<>();
        after.forEach((key, share) -> totals.merge(key.substring(key.indexOf(' ') + 1), share, Double::sum));
        return totals;
    }

    private static @Nullable Problem totalProblem(TableRow row, Map<String, Double> totals) {
        double total = totals.getOrDefault(StockReferences.key(row), 0.0);
        return Shares.tooMuch(total)
                ? new Problem(
                        SHARE,
                        Cells.plain(share(row)),
                        "the shares of " + StockReferences.key(row) + " would add up to " + Shares.percent(total)
                                + " %, more than 100 %")
                : null;
    }

    private static @Nullable Problem cooperativeProblem(TableRow row, Set<String> cooperatives, Batch batch) {
        String code = row.need("cooperative");
        return cooperatives.contains(code) || batch.brings("cooperatives", code)
                ? null
                : new Problem(
                        "cooperative",
                        code,
                        "no cooperative has the code “" + code + "”; import cooperatives first or mend the code");
    }

    private static double share(TableRow row) {
        return Objects.requireNonNull(row.number(SHARE), SHARE);
    }

    private static String key(TableRow row) {
        return row.need("cooperative") + " " + StockReferences.key(row);
    }
}
