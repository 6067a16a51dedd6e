package org.merewarden.waterbody;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Problem;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableHandler;
import org.merewarden.intake.TableRow;
import org.merewarden.web.Cells;
import org.springframework.data.jpa.repository.JpaRepository;

/**
 * The register's side of the importer. The register is small (hundreds of rows), so each table is read whole. A file that
 * leaves a cell empty says that the value is unknown; the preview shows what would be lost. About a column that the file
 * does not have it says nothing, and what is stored stays.
 *
 * @param <E> the entity behind the table
 */
abstract class RegisterHandler<E> implements TableHandler {
    private final JpaRepository<E, Long> repository;
    private final Register register;
    private final ActivityLog log;

    RegisterHandler(JpaRepository<E, Long> repository, Register register, ActivityLog log) {
        this.repository = repository;
        this.register = register;
        this.log = log;
    }

    /** Stored entities by the same key as {@link #key(TableRow)}. */
    abstract Map<String, E> stored();

    abstract String key(TableRow row);

    abstract Map<String, @Nullable Object> cells(E stored);

    abstract Map<String, @Nullable Object> cells(TableRow row);

    /** What speaks against the row; nulls are skipped. */
    abstract Stream<@Nullable Problem> problems(TableRow row, StockReferences references, Batch batch);

    abstract E make(TableRow row, StockReferences references);

    abstract void change(E stored, TableRow row);

    @Override
    public List<Fate> examine(List<TableRow> rows, Batch batch) {
        StockReferences references = StockReferences.of(register);
        Map<String, E> stored = stored();
        return rows.stream()
                .map(row -> {
                    E before = stored.get(key(row));
                    return fate(before == null ? row : row.over(cells(before)), before, references, batch);
                })
                .toList();
    }

    private Fate fate(TableRow row, @Nullable E stored, StockReferences references, Batch batch) {
        Problem[] problems =
                problems(row, references, batch).filter(Objects::nonNull).toArray(Problem[]::new);
        if (problems.length > 0) {
            return Fate.refused(problems);
        }
        if (stored == null) {
            return Fate.NEW;
        }
        String changes = Cells.changes(cells(stored), cells(row));
        return changes.isEmpty() ? Fate.SAME : Fate.changed(changes);
    }

    @Override
    public void store(List<TableRow> rows, Provenance provenance) {
        StockReferences references = StockReferences.of(register);
        Map<String, E> stored = stored();
        List<E> fresh = new ArrayList<>();
        for (TableRow row : rows) {
            E before = stored.get(key(row));
            if (before == null) {
                fresh.add(make(row, references));
            } else {
                replace(before, row.over(cells(before)), provenance);
            }
        }
        repository.saveAll(fresh);
        repository.flush();
    }

    private void replace(E stored, TableRow row, Provenance provenance) {
        Map<String, @Nullable Object> before = cells(stored);
        if (Cells.changes(before, cells(row)).isEmpty()) {
            return;
        }
        change(stored, row);
        repository.save(stored);
        log.record(
                "changed by import " + provenance.importId(),
                definition().name() + ", " + key(row),
                Cells.describe(before),
                Cells.describe(cells(row)));
    }
}
