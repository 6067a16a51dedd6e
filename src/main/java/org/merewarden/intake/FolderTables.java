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
import java.util.Optional;
import java.util.TreeMap;
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
     * Reads every file {@code TABLE.csv} whose table is known, whatever the case of its name.
     *
     * @param foundations tables whose rows the others name, in this order: the first of them that is refused, or has a file
     *     without a row, is told alone, since what the others lack follows from it
     * @throws RefusedImport with every reason: file, line, column, value and rule
     */
    public static Content read(Path folder, Collection<CheckedTable> known, List<String> foundations) {
        if (!Files.isDirectory(folder)) {
            throw new RefusedImport(List.of(folder + ": there is no such folder"));
        }
        Tables tables = new Tables(known.stream().map(Storeless::new).toList());
        List<String> remarks = new ArrayList<>();
        List<ImportedFile> files = new ArrayList<>();
        for (Path file : filesByTable(folder, tables, remarks).values()) {
            files.addAll(ImportReader.read(tables, new Upload(name(file), bytes(file))));
        }
        Examiner examiner = new Examiner(tables);
        Examiner.Outcome outcome = examiner.examine(files);
        foundations.forEach(table -> needUsable(table, outcome.files()));
        if (outcome.refused()) {
            throw RefusedImport.of(outcome.files());
        }
        outcome.files()
                .forEach(f -> examiner.unknownColumns(f)
                        .forEach(c -> remarks.add(f.name() + ": the column " + c + " is unknown and passed over")));
        return new Content(outcome.toStore(), List.copyOf(remarks));
    }

    /** By the file's name: of a file that cannot be read the table is unknown. */
    private static void needUsable(String table, List<ImportedFile> files) {
        List<ImportedFile> own = files.stream()
                .filter(f -> f.fileName().equalsIgnoreCase(table + ".csv"))
                .toList();
        if (own.stream().anyMatch(ImportedFile::refused)) {
            throw RefusedImport.of(own);
        }
        if (!own.isEmpty() && own.stream().allMatch(f -> f.rows().isEmpty())) {
            throw new RefusedImport(List.of(
                    own.get(0).fileName() + ": there is no row below the header; the other tables name its rows"));
        }
    }

    /** The folder's file of a table, whatever the case of its name; empty where there is none. */
    public static Optional<Path> file(Path folder, String table) {
        return tableFiles(folder).stream()
                .filter(f -> tableName(f).equals(table))
                .findFirst();
    }

    /** Two files of one table are refused: which of them counts would hang on the case of their names. */
    private static Map<String, Path> filesByTable(Path folder, Tables tables, List<String> remarks) {
        Map<String, Path> files = new TreeMap<>();
        List<String> twice = new ArrayList<>();
        for (Path file : tableFiles(folder)) {
            String table = tableName(file);
            Path other = tables.find(table).isPresent() ? files.putIfAbsent(table, file) : null;
            if (tables.find(table).isEmpty()) {
                remarks.add(
                        name(file) + " is passed over: only the file TABLE.csv of a table that is needed here is read");
            } else if (other != null) {
                twice.add(name(other) + " and " + name(file) + ": both are the table " + table
                        + "; a folder has one file of each table");
            }
        }
        if (!twice.isEmpty()) {
            throw new RefusedImport(twice);
        }
        return files;
    }

    private static String name(Path file) {
        return file.getFileName().toString();
    }

    private static String tableName(Path file) {
        return name(file).toLowerCase(Locale.ROOT).replaceFirst("\\.csv$", "");
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
