package org.merewarden.core.inference.statespace;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.evidence.Traits;

/** One folder of {@code src/test/reference/posteriors}: records in the project's own tables, and what others made of them. */
record ReferenceCase(String name, int lastClosedYear) {
    private static final Path ROOT = Path.of("src/test/reference/posteriors");

    static List<ReferenceCase> all() {
        return rows(ROOT.resolve("cases.csv")).stream()
                .map(row -> new ReferenceCase(text(row, "case"), Integer.parseInt(text(row, "last_closed_year"))))
                .toList();
    }

    @Override
    public String toString() {
        return name;
    }

    Evidence evidence() {
        Map<String, String> water = table("water-bodies").get(0);
        Habitat lake = new Habitat(text(water, "kind"), number(water, "area_ha"), null, null, null, null, 1);
        String species = text(table("stocks").get(0), "species");
        return new Evidence(
                lake,
                new Traits(species, false, null, null, null, null, null),
                table("catches").stream().map(ReferenceCase::taken).toList(),
                table("effort").stream().map(ReferenceCase::effort).toList(),
                table("surveys").stream().map(ReferenceCase::survey).toList(),
                table("events").stream().map(ReferenceCase::event).toList(),
                List.of(),
                table("priors").stream().map(ReferenceCase::prior).toList());
    }

    /** The rows of a table of the case, by column; none where the case has no such table. */
    List<Map<String, String>> table(String table) {
        Path file = ROOT.resolve(name).resolve(table + ".csv");
        return Files.exists(file) ? rows(file) : List.of();
    }

    private static CatchRecord taken(Map<String, String> row) {
        return new CatchRecord(year(row), text(row, "sector"), number(row, "catch_t"), known(row, "cv"), 1);
    }

    private static EffortRecord effort(Map<String, String> row) {
        return new EffortRecord(year(row), text(row, "series"), number(row, "effort"), text(row, "unit"));
    }

    private static SurveyRecord survey(Map<String, String> row) {
        return new SurveyRecord(
                year(row),
                text(row, "series"),
                number(row, "time_of_year"),
                text(row, "kind").equals("biomass"),
                number(row, "value"),
                known(row, "cv"),
                null);
    }

    private static EventRecord event(Map<String, String> row) {
        String kind = text(row, "kind");
        if (kind.equals("closure")) {
            return new EventRecord(text(row, "key"), year(row), kind, null, null, null, null, null);
        }
        double tonnes = number(row, "number") * number(row, "survival") * number(row, "recruit_weight_kg") / 1000;
        int into = year(row) + Integer.parseInt(text(row, "delay_years"));
        return new EventRecord(text(row, "key"), year(row), kind, null, null, null, tonnes, into);
    }

    private static PriorRecord prior(Map<String, String> row) {
        return new PriorRecord(
                text(row, "parameter"),
                text(row, "series"),
                number(row, "median"),
                number(row, "log_sd"),
                text(row, "reason"));
    }

    static String text(Map<String, String> row, String column) {
        String value = row.get(column);
        if (value == null) {
            throw new IllegalArgumentException("no column " + column + " in " + row.keySet());
        }
        return value;
    }

    static double number(Map<String, String> row, String column) {
        return Double.parseDouble(text(row, column));
    }

    private static @Nullable Double known(Map<String, String> row, String column) {
        return text(row, column).isEmpty() ? null : (Double) number(row, column);
    }

    private static int year(Map<String, String> row) {
        return Integer.parseInt(text(row, "year"));
    }

    /** Plain comma-separated lines; what follows the last column's comma, commas included, belongs to the last column. */
    private static List<Map<String, String>> rows(Path file) {
        try {
            List<String> lines = Files.readAllLines(file);
            String[] header = lines.get(0).split(",");
            return lines.stream()
                    .skip(1)
                    .map(line -> row(header, line.split(",", header.length)))
                    .toList();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    private static Map<String, String> row(String[] header, String[] cells) {
        Map<String, String> row = new HashMap<>();
        for (int i = 0; i < header.length; i++) {
            row.put(header[i], cells[i]);
        }
        return row;
    }
}
