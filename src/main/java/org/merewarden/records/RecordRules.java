package org.merewarden.records;

import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Problem;
import org.merewarden.intake.TableRow;
import org.merewarden.web.Cells;

/** Rules between the cells of one row, beyond what the columns say of themselves. */
interface RecordRules {
    RecordRules NONE = row -> Stream.empty();
    List<String> FRACTIONS = List.of("low", "likely", "high");

    Stream<Problem> problems(TableRow row);

    /** A biomass needs its uncertainty and cannot be nothing: its logarithm is what is observed. */
    static Stream<Problem> survey(TableRow row) {
        List<Problem> problems = new ArrayList<>();
        if ("biomass".equals(row.text("kind"))) {
            if (row.number("cv") == null) {
                problems.add(new Problem("cv", "", "a biomass needs its cv: how sure is it?"));
            }
            Double value = row.number("value");
            if (value != null && value <= 0) {
                problems.add(new Problem("value", Cells.plain(value), "a biomass in t needs a value above 0"));
            }
        }
        return problems.stream();
    }

    static Stream<Problem> event(TableRow row) {
        Stream<Problem> ofKind = switch (row.need("kind")) {
            case "fish kill" -> fishKill(row);
            case "closure" -> closure(row);
            default -> Stream.<Problem>empty();
        };
        return Stream.concat(ofKind, population(row));
    }

    private static Stream<Problem> population(TableRow row) {
        String population = row.textOrEmpty("population");
        return row.textOrEmpty("species").isEmpty() && !population.isEmpty()
                ? Stream.of(new Problem("population", population, "a population needs its species beside it"))
                : Stream.empty();
    }

    private static Stream<Problem> fishKill(TableRow row) {
        List<Problem> problems = new ArrayList<>();
        int known = 0;
        for (String column : FRACTIONS) {
            Double fraction = row.number(column);
            known += fraction == null ? 0 : 1;
            if (fraction != null && (fraction < 0 || fraction > 1)) {
                problems.add(new Problem(
                        column, Cells.plain(fraction), "a fraction of the biomass lost lies between 0 and 1"));
            }
        }
        if (known > 0 && known < FRACTIONS.size()) {
            problems.add(new Problem(
                    "likely",
                    "",
                    "a fish kill needs low, likely and high together, or none where the loss is unknown"));
        }
        return !problems.isEmpty() || known == 0 ? problems.stream() : ordered(row);
    }

    private static Stream<Problem> ordered(TableRow row) {
        double low = need(row.number("low"));
        double likely = need(row.number("likely"));
        double high = need(row.number("high"));
        return low <= likely && likely <= high
                ? Stream.empty()
                : Stream.of(new Problem(
                        "likely",
                        Cells.plain(likely),
                        "needs low ≤ likely ≤ high, got " + Cells.plain(low) + ", " + Cells.plain(likely) + ", "
                                + Cells.plain(high)));
    }

    private static Stream<Problem> closure(TableRow row) {
        Double residual = row.number("likely");
        return residual != null && residual < 0
                ? Stream.of(new Problem(
                        "likely", Cells.plain(residual), "the catch that remains in a closure is 0 t or more"))
                : Stream.empty();
    }

    private static double need(@Nullable Double value) {
        return Objects.requireNonNull(value);
    }
}
