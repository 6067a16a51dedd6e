package org.merewarden.command;

import java.io.BufferedWriter;
import java.io.IOException;
import java.io.InputStream;
import java.math.BigDecimal;
import java.math.MathContext;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVPrinter;
import org.jspecify.annotations.Nullable;

/** RESULTS.csv: RFC 4180 in UTF-8, numbers with a decimal point and {@value #DIGITS} significant digits. */
final class ResultsFile {
    static final int DIGITS = 9;
    static final String HEADER = "water_body,species,quantity,year,mean,sd,q05,q10,q25,q50,q75,q90,q95,ess,verdict";

    private static final MathContext ROUNDING = new MathContext(DIGITS);
    private static final int LEAST_PLAIN_EXPONENT = -7;
    private static final int GREATEST_PLAIN_EXPONENT = 14;

    private ResultsFile() {}

    /** Refuses, before anything is computed, a place where the results cannot stand or would destroy a table. */
    static void check(Path out, Path folder) throws UsageProblem {
        Path parent = parent(out);
        if (Files.isDirectory(out)) {
            throw new UsageProblem("--out " + out + " is a folder; name a file");
        }
        if (!Files.isDirectory(parent) || !Files.isWritable(parent)) {
            throw new UsageProblem("--out " + out + " cannot be written: " + parent + " is no folder to write in");
        }
        try {
            if (Files.exists(out) && Files.isSameFile(parent, folder) && !isResults(out)) {
                throw new UsageProblem(
                        "--out " + out + " is a file of FOLDER that holds no results; it is not replaced");
            }
        } catch (IOException e) {
            throw new UsageProblem("--out " + out + " cannot be read: " + e);
        }
    }

    private static Path parent(Path out) {
        return Objects.requireNonNullElse(out.toAbsolutePath().getParent(), out.toAbsolutePath());
    }

    private static boolean isResults(Path out) throws IOException {
        try (InputStream in = Files.newInputStream(out)) {
            byte[] start = in.readNBytes(HEADER.length());
            return new String(start, StandardCharsets.UTF_8).equals(HEADER);
        }
    }

    /** Written beside its place and then put there at once: a reader sees the old results or the new ones. */
    static void write(Path out, List<StockResult> results) throws IOException {
        Path beside = parent(out)
                .resolve(out.getFileName() + "." + ProcessHandle.current().pid() + ".part");
        try {
            try (BufferedWriter writer = Files.newBufferedWriter(beside, StandardCharsets.UTF_8);
                    CSVPrinter printer = new CSVPrinter(writer, CSVFormat.RFC4180)) {
                printer.printRecord((Object[]) HEADER.split(","));
                for (StockResult result : results) {
                    for (Line line : result.lines()) {
                        printer.printRecord(cells(result, line));
                    }
                }
            }
            Files.move(beside, out, StandardCopyOption.REPLACE_EXISTING, StandardCopyOption.ATOMIC_MOVE);
        } finally {
            Files.deleteIfExists(beside);
        }
    }

    private static List<String> cells(StockResult result, Line line) {
        List<String> cells = new ArrayList<>(List.of(result.waterBody(), result.speciesKey(), line.quantity()));
        cells.add(line.year() == null ? "" : line.year().toString());
        for (int i = 0; i < Line.COLUMNS; i++) {
            cells.add(i < line.numbers().length ? number(line.numbers()[i]) : "");
        }
        cells.add(number(result.effectiveDraws()));
        cells.add(result.verdictWord());
        return cells;
    }

    /** Empty where it is not known; with an exponent only beyond usual sizes. */
    static String number(@Nullable Double value) {
        if (value == null || !Double.isFinite(value)) {
            return "";
        }
        BigDecimal rounded = new BigDecimal(value).round(ROUNDING).stripTrailingZeros();
        int exponent = rounded.precision() - rounded.scale() - 1;
        boolean plain = exponent >= LEAST_PLAIN_EXPONENT && exponent <= GREATEST_PLAIN_EXPONENT;
        return plain ? rounded.toPlainString() : rounded.toString();
    }
}
