package org.merewarden.intake;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Collection;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.stream.Stream;

/** Reads the tables of a folder without any store: for the command line. */
public final class FolderTables {
    private FolderTables() {}

    /**
     * @param rows by table; a table without a file, or without a row, is absent
     * @param remarks what was passed over: files of unknown names, unknown columns
     */
    public record Content(Map<String, List<TableRow>> rows, List<String> remarks) {
        public List<TableRow> of(String table) {
            return rows.getOrDefault(table, List.of());
        }
    }

    /**
     * Reads every file {@code TABLE.csv} whose table is known.
     *
     * @throws RefusedImport with every reason: file, line, column, value and rule
     */
    public static Content read(Path folder, Collection<CheckedTable> known) {
        if (!Files.isDirectory(folder)) {
            throw new RefusedImport(List.of(folder + ": there is no such folder"));
        }
        Tables tables = new Tables(known.stream().map(Storeless::new).toList());
        List<String> remarks = new ArrayList<>();
        List<ImportedFile> files = new ArrayList<>();
        for (Path file : tableFiles(folder)) {
            String name = file.getFileName().toString();
            if (tables.find(name.replaceFirst("\\.csv$", "")).isPresent()) {
                files.addAll(ImportReader.read(tables, new Upload(name, bytes(file))));
            } else {
                remarks.add(name + " is passed over: no table that is needed here has this name");
            }
        }
        Examiner examiner = new Examiner(tables);
        Examiner.Outcome outcome = examiner.examine(files);
        if (outcome.refused()) {
            throw RefusedImport.of(outcome.files());
        }
        outcome.files()
                .forEach(f -> examiner.unknownColumns(f)
                        .forEach(c -> remarks.add(f.name() + ": the column " + c + " is unknown and passed over")));
        return new Content(outcome.toStore(), List.copyOf(remarks));
    }

    private static List<Path> tableFiles(Path folder) {
        try (Stream<Path> all = Files.list(folder)) {
            return all.filter(Files::isRegularFile)
                    .filter(f -> f.toString().toLowerCase(Locale.ROOT).matches("(?s).*\\.(csv|xlsx)"))
                    .sorted()
                    .toList();
        } catch (IOException e) {
            throw new UncheckedIOException("cannot read " + folder, e);
        }
    }

    private static byte[] bytes(Path file) {
        try {
            return Files.readAllBytes(file);
        } catch (IOException e) {
            throw new UncheckedIOException("cannot read " + file, e);
        }
    }

    /** Every row that breaks no rule is new where nothing is stored. */
    private record Storeless(CheckedTable table) implements TableHandler {
        @Override
        public TableDefinition definition() {
            return table.definition();
        }

        @Override
        public List<Fate> examine(List<TableRow> rows, Batch batch) {
            return rows.stream()
                    .map(row -> table.rules().problems(row, batch).toArray(Problem[]::new))
                    .map(problems -> problems.length == 0 ? Fate.NEW : Fate.refused(problems))
                    .toList();
        }

        @Override
        public void store(List<TableRow> rows, Provenance provenance) {
            throw new UnsupportedOperationException("nothing is stored from the command line");
        }
    }
}
