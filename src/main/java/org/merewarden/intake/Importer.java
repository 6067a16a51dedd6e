package org.merewarden.intake;

import java.time.Clock;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.function.Supplier;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.web.NotFound;
import org.merewarden.web.Who;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.dao.DataIntegrityViolationException;
import org.springframework.stereotype.Service;
import org.springframework.transaction.support.TransactionTemplate;

/** Files in: examined when they come, mended or left out row by row, then stored all at once or not at all. */
@Service
class Importer {
    private static final Logger LOG = LoggerFactory.getLogger(Importer.class);

    private final Tables tables;
    private final Examiner examiner;
    private final ImportStore store;
    private final ActivityLog activity;
    private final TransactionTemplate transaction;
    private final Clock clock;

    Importer(
            Tables tables,
            Examiner examiner,
            ImportStore store,
            ActivityLog activity,
            TransactionTemplate transaction,
            Clock clock) {
        this.tables = tables;
        this.examiner = examiner;
        this.store = store;
        this.activity = activity;
        this.transaction = transaction;
        this.clock = clock;
    }

    enum Result {
        COMMITTED,
        /** Rows are refused; nothing was stored. */
        REFUSED,
        /** The store changed since the preview; nothing was stored, the preview is new. */
        OVERTAKEN
    }

    /** Reads and examines the files and keeps what was found as a new import; nothing reaches the register. */
    long upload(List<Upload> uploads, @Nullable String note) {
        List<ImportedFile> read = new ArrayList<>();
        uploads.forEach(u -> read.addAll(ImportReader.read(tables, u)));
        return inTransaction(() -> {
            long id = store.insert(note);
            for (ImportedFile file : examiner.examine(read).files()) {
                store.insert(id, file, examiner.unknownColumns(file));
            }
            String names =
                    String.join(", ", read.stream().map(ImportedFile::name).toList());
            activity.record("uploaded import", "import " + id, null, Excerpt.of(names, 2000));
            return id;
        });
    }

    void chooseTable(long id, int version, long file, String table) {
        String name = tables.find(table)
                .orElseThrow(() -> new NotFound("table " + table))
                .name();
        change(id, version, () -> {
            store.chooseTable(id, file, name);
            activity.record("chose table of import", subject(id, "file " + file), null, name);
        });
    }

    void leaveFile(long id, int version, long file, boolean out) {
        change(id, version, () -> {
            store.leaveFile(id, file, out);
            activity.record(out ? "left file out of import" : "put file back", subject(id, "file " + file), null, null);
        });
    }

    void leaveRow(long id, int version, long row, boolean out) {
        change(id, version, () -> {
            store.leaveRow(id, row, out);
            activity.record(out ? "left row out of import" : "put row back", subject(id, "row " + row), null, null);
        });
    }

    /** @param mended the new texts of the row's cells; cells that are not named stay as they are */
    void mend(long id, int version, long row, Map<String, String> mended) {
        change(id, version, () -> {
            Map<String, String> before = store.cells(id, row);
            Map<String, String> after = new LinkedHashMap<>(before);
            after.putAll(mended);
            after.values().removeIf(String::isBlank);
            store.mend(id, row, after);
            activity.record(
                    "mended row of import",
                    subject(id, "row " + row),
                    Excerpt.of(before.toString(), 5000),
                    Excerpt.of(after.toString(), 5000));
        });
    }

    private static String subject(long id, String part) {
        return "import " + id + ", " + part;
    }

    private void change(long id, int version, Runnable change) {
        inTransaction(() -> {
            store.claim(id, version);
            change.run();
            reexamine(id);
            return true;
        });
    }

    private Examiner.Outcome reexamine(long id) {
        List<ImportedFile> before = store.files(id);
        Examiner.Outcome outcome = examiner.examine(before);
        store.update(before, outcome.files(), examiner);
        return outcome;
    }

    void discard(long id, int version) {
        inTransaction(() -> {
            store.claim(id, version);
            store.decide(id, "DISCARDED");
            activity.record("discarded import", "import " + id, null, null);
            return true;
        });
    }

    /** Stores all tables in one transaction, after examining everything once more within it. */
    Result commit(long id, int version) {
        try {
            return inTransaction(() -> commitNow(id, version));
        } catch (DataIntegrityViolationException e) {
            LOG.warn("import {} met rows stored meanwhile", id, e);
            inTransaction(() -> reexamine(id));
            return Result.OVERTAKEN;
        }
    }

    private Result commitNow(long id, int version) {
        store.claim(id, version);
        List<ImportedFile> before = store.files(id);
        Examiner.Outcome now = examiner.examine(before);
        if (!now.files().equals(before)) {
            store.update(before, now.files(), examiner);
            return Result.OVERTAKEN;
        }
        if (now.refused()) {
            return Result.REFUSED;
        }
        Provenance provenance = new Provenance(id, Who.name(), clock.instant());
        for (TableHandler handler : tables.handlers()) {
            List<TableRow> rows = now.toStore().get(handler.definition().name());
            if (rows != null) {
                handler.store(rows, provenance);
            }
        }
        store.decide(id, "COMMITTED");
        activity.record("committed import", "import " + id, null, counts(now.toStore()));
        return Result.COMMITTED;
    }

    private static String counts(Map<String, List<TableRow>> stored) {
        return String.join(
                ", ",
                stored.entrySet().stream()
                        .map(e -> e.getKey() + " " + e.getValue().size())
                        .toList());
    }

    private <T> T inTransaction(Supplier<T> work) {
        return Objects.requireNonNull(transaction.execute(status -> work.get()));
    }
}
