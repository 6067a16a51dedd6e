package org.merewarden.command;

import java.io.BufferedWriter;
import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import java.util.List;
import java.util.Objects;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVPrinter;

/**
 * A file of results: RFC 4180 in UTF-8.
 *
 * @param header names of its columns, separated by commas
 */
record OutputFile(Path out, String header) {

    /** Refuses, before anything is computed, a place where the results cannot stand or would destroy a table. */
    void check(Path folder) throws UsageProblem {
        Path parent = parent();
        if (Files.isDirectory(out)) {
            throw new UsageProblem("--out " + out + " is a folder; name a file");
        }
        if (!Files.isDirectory(parent) || !Files.isWritable(parent)) {
            throw new UsageProblem("--out " + out + " cannot be written: " + parent + " is no folder to write in");
        }
        try {
            if (Files.exists(out) && Files.isSameFile(parent, folder) && !holdsResults()) {
                throw new UsageProblem(
                        "--out " + out + " is a file of FOLDER that holds no results; it is not replaced");
            }
        } catch (IOException e) {
            throw new UsageProblem("--out " + out + " cannot be read: " + e);
        }
    }

    /** Refuses a name under which the folder's next run would take the results for a table. */
    void checkNotATable(Path folder, String table) throws UsageProblem {
        if (out.getFileName().toString().equalsIgnoreCase(table + ".csv")
                && parent().equals(folder.toAbsolutePath().normalize())) {
            throw new UsageProblem("--out " + out + " would be read as the table " + table
                    + " of FOLDER; choose another name or folder");
        }
    }

    private Path parent() {
        return Objects.requireNonNullElse(out.toAbsolutePath().normalize().getParent(), out.toAbsolutePath());
    }

    private boolean holdsResults() throws IOException {
        try (InputStream in = Files.newInputStream(out)) {
            byte[] start = in.readNBytes(header.length());
            return new String(start, StandardCharsets.UTF_8).equals(header);
        }
    }

    /** Written beside its place and then put there at once: a reader sees the old results or the new ones. */
    void write(List<List<String>> rows) throws IOException {
        Path beside = parent().resolve(
                        out.getFileName() + "." + ProcessHandle.current().pid() + ".part");
        try {
            try (BufferedWriter writer = Files.newBufferedWriter(beside, StandardCharsets.UTF_8);
                    CSVPrinter printer = new CSVPrinter(writer, CSVFormat.RFC4180)) {
                printer.printRecord((Object[]) header.split(","));
                for (List<String> row : rows) {
                    printer.printRecord(row);
                }
            }
            Files.move(beside, out, StandardCopyOption.REPLACE_EXISTING, StandardCopyOption.ATOMIC_MOVE);
        } finally {
            Files.deleteIfExists(beside);
        }
    }
}
