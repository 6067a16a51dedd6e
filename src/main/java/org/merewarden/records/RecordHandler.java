package org.merewarden.records;

import java.time.ZoneOffset;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.stream.Collectors;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Problem;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableDefinition;
import org.merewarden.intake.TableHandler;
import org.merewarden.intake.TableRow;
import org.merewarden.records.RecordStore.Entry;
import org.merewarden.records.RecordStore.Owned;
import org.merewarden.records.RecordStore.Wanted;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockReferences;
import org.merewarden.waterbody.StockView;
import org.merewarden.waterbody.WaterBodyView;

/** A table of evidence in the importer, and behind the forms: both obey the same rules. */
class RecordHandler implements TableHandler {
    private final RecordTable table;
    private final RecordStore store;
    private final Register register;

    RecordHandler(RecordTable table, RecordStore store, Register register) {
        this.table = table;
        this.store = store;
        this.register = register;
    }

    @Override
    public TableDefinition definition() {
        return table.definition();
    }

    @Override
    public List<Fate> examine(List<TableRow> rows, Batch batch) {
        StockReferences references = StockReferences.of(register);
        Map<String, Owned> inForce = inForce(rows, references);
        return rows.stream()
                .map(row -> fate(whole(row, references, inForce), references, inForce, batch))
                .toList();
    }

    /** The row together with what is in force of the columns that its file does not have. */
    private TableRow whole(TableRow row, StockReferences references, Map<String, Owned> inForce) {
        Owned before = inForce.get(table.key(owner(row, references).orElse(-1L), table.cells(row)));
        return before == null ? row : row.over(before.row().cells());
    }

    private Fate fate(TableRow row, StockReferences references, Map<String, Owned> inForce, Batch batch) {
        Problem[] problems = table.problems(row, references, batch).toArray(Problem[]::new);
        if (problems.length > 0) {
            return Fate.refused(problems);
        }
        // a stock that only the same import brings has no rows yet, but an event may move to a new water
        long owner = owner(row, references).orElse(-1L);
        Wanted wanted = new Wanted(owner, table.cells(row));
        String changes = RecordStore.changes(inForce.get(table.key(owner, wanted.cells())), wanted);
        if (changes == null) {
            return Fate.NEW;
        }
        return changes.isEmpty() ? Fate.SAME : Fate.changed(changes);
    }

    @Override
    public void store(List<TableRow> rows, Provenance provenance) {
        store(
                rows,
                new Entry(
                        provenance.importId(), provenance.by(), provenance.at().atOffset(ZoneOffset.UTC)));
    }

    void store(List<TableRow> rows, Entry entry) {
        StockReferences references = StockReferences.of(register);
        Map<String, Owned> inForce = inForce(rows, references);
        List<Wanted> wanted = rows.stream()
                .map(row -> whole(row, references, inForce))
                .map(row -> new Wanted(owner(row, references).orElseThrow(), table.cells(row)))
                .toList();
        store.write(table, wanted, inForce, entry);
    }

    private Map<String, Owned> inForce(List<TableRow> rows, StockReferences references) {
        if (table == RecordTables.EVENTS) {
            return store.eventsInForce(rows.stream().map(row -> row.need("key")).collect(Collectors.toSet()));
        }
        return store.inForce(
                table,
                rows.stream()
                        .map(row -> owner(row, references))
                        .flatMap(Optional::stream)
                        .collect(Collectors.toSet()));
    }

    private Optional<Long> owner(TableRow row, StockReferences references) {
        return table.ofStock()
                ? references.stock(row).map(StockView::id)
                : references.lake(row).map(WaterBodyView::id);
    }

    /** The rows' rule problems and changes, as the forms ask for them. */
    Fate examineOne(TableRow row) {
        return Objects.requireNonNull(
                examine(List.of(row), (otherTable, keys) -> false).get(0));
    }
}
