package org.merewarden.intake;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.HashSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Set;
import org.jspecify.annotations.Nullable;
import org.springframework.stereotype.Component;

/** Works out what would become of every row of an import, table by table. Stores nothing. */
@Component
class Examiner {
    private static final int LONGEST_REMARK = 2000;
    private static final int MOST_PROBLEMS = 30;

    private final Tables tables;

    Examiner(Tables tables) {
        this.tables = tables;
    }

    /** @param toStore new and changed rows by table, in the order in which the tables are stored */
    record Outcome(List<ImportedFile> files, Map<String, List<TableRow>> toStore) {
        boolean refused() {
            return files.stream().anyMatch(ImportedFile::refused);
        }
    }

    Outcome examine(List<ImportedFile> files) {
        Work work = new Work(files);
        Map<String, List<TableRow>> toStore = new LinkedHashMap<>();
        for (TableHandler handler : tables.handlers()) {
            List<TableRow> rows = work.examine(handler);
            if (!rows.isEmpty()) {
                toStore.put(handler.definition().name(), rows);
            }
        }
        return new Outcome(work.result(), toStore);
    }

    /** The columns of the file that its table does not know. */
    List<String> unknownColumns(ImportedFile file) {
        return tables.find(file.table())
                .map(t -> file.header().stream()
                        .filter(c -> !c.isEmpty() && !t.columnNames().contains(c))
                        .toList())
                .orElse(List.of());
    }

    private @Nullable String problem(ImportedFile file) {
        if (!file.readable()) {
            return file.problem();
        }
        List<String> missing = tables.find(file.table()).map(TableDefinition::requiredNames).orElse(List.of()).stream()
                .filter(c -> !file.header().contains(c))
                .toList();
        return missing.isEmpty()
                ? null
                : file.name() + ", line 1: the table " + file.table() + " needs the columns "
                        + String.join(", ", missing) + ", which are missing";
    }

    private record Place(int file, int row) {}

    private final class Work implements Batch {
        private final List<ImportedFile> files;
        private final List<@Nullable String> problems;
        private final List<Fate[]> fates;
        private final Map<String, Set<List<String>>> broughtKeys = new HashMap<>();
        private final Map<String, List<TableRow>> broughtRows = new HashMap<>();

        Work(List<ImportedFile> files) {
            this.files = files;
            this.problems = new ArrayList<>();
            this.fates = new ArrayList<>();
            for (ImportedFile file : files) {
                problems.add(problem(file));
                Fate[] unknown = new Fate[file.rows().size()];
                Arrays.fill(unknown, Fate.refused());
                fates.add(unknown);
            }
        }

        /** Reads and examines all rows of one table; returns those to store. */
        List<TableRow> examine(TableHandler handler) {
            TableDefinition table = handler.definition();
            List<TableRow> rows = new ArrayList<>();
            List<Place> places = new ArrayList<>();
            read(table, rows, places);
            List<Fate> found = rows.isEmpty() ? List.of() : handler.examine(List.copyOf(rows), this);
            if (found.size() != rows.size()) {
                throw new IllegalStateException(
                        "the handler of " + table.name() + " gave " + found.size() + " fates for " + rows.size());
            }
            List<TableRow> toStore = new ArrayList<>();
            Set<List<String>> keys = broughtKeys.computeIfAbsent(table.name(), t -> new HashSet<>());
            List<TableRow> accepted = broughtRows.computeIfAbsent(table.name(), t -> new ArrayList<>());
            for (int i = 0; i < rows.size(); i++) {
                Fate fate = shortened(found.get(i));
                fates.get(places.get(i).file())[places.get(i).row()] = fate;
                if (fate.kind() != Fate.Kind.REFUSED) {
                    keys.add(key(table, rows.get(i)));
                    accepted.add(rows.get(i));
                }
                if (fate.kind() == Fate.Kind.NEW || fate.kind() == Fate.Kind.CHANGED) {
                    toStore.add(rows.get(i));
                }
            }
            return toStore;
        }

        List<ImportedFile> result() {
            List<ImportedFile> result = new ArrayList<>();
            for (int f = 0; f < files.size(); f++) {
                List<ImportedFile.Row> rows = new ArrayList<>();
                for (int r = 0; r < files.get(f).rows().size(); r++) {
                    ImportedFile.Row row = files.get(f).rows().get(r);
                    rows.add(row.leftOut() ? row : row.with(fates.get(f)[r]));
                }
                result.add(files.get(f).with(problems.get(f), rows));
            }
            return result;
        }

        @Override
        public boolean brings(String table, String... keys) {
            return broughtKeys.getOrDefault(table, Set.of()).contains(List.of(keys));
        }

        @Override
        public List<TableRow> rows(String table) {
            return List.copyOf(broughtRows.getOrDefault(table, List.of()));
        }

        private void read(TableDefinition table, List<TableRow> rows, List<Place> places) {
            Map<List<String>, String> seen = new HashMap<>();
            for (int f = 0; f < files.size(); f++) {
                ImportedFile file = files.get(f);
                if (file.leftOut() || problems.get(f) != null || !table.name().equals(file.table())) {
                    continue;
                }
                for (int r = 0; r < file.rows().size(); r++) {
                    ImportedFile.Row row = file.rows().get(r);
                    if (row.leftOut()) {
                        continue;
                    }
                    List<Problem> broken = new ArrayList<>();
                    TableRow typed = typed(table, file, row, broken);
                    if (broken.isEmpty()) {
                        refuseRepeated(table, file, typed, seen, broken);
                    }
                    if (broken.isEmpty()) {
                        rows.add(typed);
                        places.add(new Place(f, r));
                    } else {
                        fates.get(f)[r] = shortened(new Fate(Fate.Kind.REFUSED, broken, ""));
                    }
                }
            }
        }
    }

    static TableRow typed(TableDefinition table, ImportedFile file, ImportedFile.Row row, List<Problem> broken) {
        Map<String, Object> values = new HashMap<>();
        if (row.readingProblem() != null) {
            broken.add(row.readingProblem());
        } else {
            for (Column column : table.columns()) {
                String cell = row.cells().get(column.name());
                try {
                    Object value = CellReader.read(column, cell, file.decimalMark());
                    if (value != null) {
                        values.put(column.name(), value);
                    }
                } catch (CellReader.Broken e) {
                    broken.add(new Problem(column.name(), cell == null ? "" : cell, e.rule()));
                }
            }
        }
        return new TableRow(row.line(), values, absent(table, file, row));
    }

    /** A cell that was typed when the row was mended speaks, also where the file has no such column. */
    private static Set<String> absent(TableDefinition table, ImportedFile file, ImportedFile.Row row) {
        Set<String> absent = new HashSet<>(table.columnNames());
        file.header().forEach(absent::remove);
        absent.removeAll(row.cells().keySet());
        return absent;
    }

    /** Keys that differ in case only count as the same: one of the two would be a slip of the pen. */
    private static void refuseRepeated(
            TableDefinition table,
            ImportedFile file,
            TableRow row,
            Map<List<String>, String> seen,
            List<Problem> broken) {
        if (table.keys().isEmpty()) {
            return;
        }
        List<String> key =
                key(table, row).stream().map(k -> k.toLowerCase(Locale.ROOT)).toList();
        String earlier = seen.putIfAbsent(key, "line " + row.line() + " of " + file.name());
        if (earlier != null) {
            String columns =
                    String.join(", ", table.keys().stream().map(Column::name).toList());
            String value = String.join(", ", key(table, row));
            broken.add(
                    new Problem(columns, value, "the same key as " + earlier + "; a key may occur once in an import"));
        }
    }

    private static List<String> key(TableDefinition table, TableRow row) {
        return table.keys().stream()
                .map(c -> String.valueOf(row.values().getOrDefault(c.name(), "")))
                .toList();
    }

    private static Fate shortened(Fate fate) {
        List<Problem> problems = fate.problems().size() <= MOST_PROBLEMS
                ? fate.problems()
                : fate.problems().subList(0, MOST_PROBLEMS);
        return new Fate(fate.kind(), problems, Excerpt.of(fate.remark(), LONGEST_REMARK));
    }
}
