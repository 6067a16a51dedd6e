package org.merewarden.records;

import static org.merewarden.intake.Column.date;
import static org.merewarden.intake.Column.number;
import static org.merewarden.intake.Column.text;
import static org.merewarden.intake.Column.year;

import java.time.LocalDate;
import java.util.Objects;
import java.util.Optional;
import java.util.stream.Stream;
import org.merewarden.intake.Problem;
import org.merewarden.intake.TableDefinition;
import org.merewarden.intake.TableRow;
import org.merewarden.waterbody.StockReferences;

/** The table of limits issued on paper, and what each of its rows must hold whatever is stored. */
public final class PaperLimits {
    public static final TableDefinition DEFINITION = new TableDefinition(
            "limits",
            "Limits issued on paper",
            120,
            Stream.concat(
                            StockReferences.columns().stream(),
                            Stream.of(
                                    year("season", "season for which the limit holds")
                                            .asKey(),
                                    date("issued_on", "day of the decision").asKey(),
                                    text("kind", "what is limited")
                                            .orElse("catch")
                                            .oneOf("catch", "effort", "measures only"),
                                    number("amount", "total removals in t, or effort in its unit")
                                            .between(0, 1e7),
                                    text("unit", "t for a catch limit").atMost(60),
                                    number("set_aside_t", "kept for subsistence, angling, research and others, t")
                                            .between(0, 1e7),
                                    date("valid_from", "first day; empty: the season's first"),
                                    date("valid_to", "last day; empty: the season's last"),
                                    text("measures", "sizes, mesh, closed times, as text")
                                            .atMost(4000),
                                    text("legal_basis", "law or ordinance").atMost(1000),
                                    text("reason", "why this limit").atMost(4000)))
                    .toList());

    private PaperLimits() {}

    public static int season(TableRow row) {
        return Objects.requireNonNull(row.integer("season"));
    }

    /** The first rule that the row breaks, its dates left aside. */
    public static Optional<Problem> problem(TableRow row) {
        String kind = row.need("kind");
        Double amount = row.number("amount");
        Double setAside = row.number("set_aside_t");
        if (amount == null && !kind.equals("measures only")) {
            return Optional.of(new Problem("amount", "", "a limit of kind " + kind + " needs an amount"));
        }
        String unit = row.text("unit");
        if (kind.equals("catch") && unit != null && !unit.equals("t")) {
            return Optional.of(new Problem("unit", unit, "a catch limit is in t"));
        }
        if (kind.equals("effort") && unit == null) {
            return Optional.of(new Problem("unit", "", "an effort limit needs its unit, e.g. net-nights"));
        }
        if (kind.equals("catch") && amount != null && setAside != null && setAside > amount) {
            return Optional.of(
                    new Problem("set_aside_t", setAside.toString(), "set-asides are at most the limit, " + amount));
        }
        return Optional.empty();
    }

    /** @param from first day of validity, given or the season's */
    public static Optional<Problem> problem(TableRow row, LocalDate from, LocalDate to, LocalDate today) {
        LocalDate issuedOn = Objects.requireNonNull(row.date("issued_on"));
        if (issuedOn.isAfter(today)) {
            return Optional.of(new Problem("issued_on", issuedOn.toString(), "lies in the future; today is " + today));
        }
        Optional<Problem> content = problem(row);
        return content.isPresent() || !from.isAfter(to)
                ? content
                : Optional.of(new Problem("valid_to", to.toString(), "the last day is not before the first, " + from));
    }
}
