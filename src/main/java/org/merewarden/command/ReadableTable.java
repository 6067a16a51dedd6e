package org.merewarden.command;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.ArrayList;
import java.util.List;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import java.util.stream.Stream;

/** The results as people read them: one row per stock, three significant digits. */
final class ReadableTable {
    private static final String UNKNOWN = "-";
    private static final String GAP = "   ";
    private static final MathContext THREE_DIGITS = new MathContext(3);
    private static final List<String> HEADER =
            List.of("stock", "verdict", "MSY, t", "B/BMSY", "margin to the fold", "on a collapse course");

    private ReadableTable() {}

    static String of(List<StockResult> results) {
        List<List<String>> rows = new ArrayList<>(List.of(HEADER));
        results.forEach(r -> rows.add(row(r)));
        return aligned(rows) + notSettled(results) + """

                In brackets: the middle 80 % of the draws. B/BMSY at the start of the coming season. Margin and collapse course:
                if the last assessed season's removals were taken for ever.
                Model estimates; to be reviewed by a qualified fisheries scientist before any limit rests on them.
                """;
    }

    /** Columns as wide as their widest cell; the first row is the header. */
    static String aligned(List<List<String>> rows) {
        int[] widths = IntStream.range(0, rows.get(0).size())
                .mapToObj(i -> rows.stream().mapToInt(r -> r.get(i).length()))
                .mapToInt(lengths -> lengths.max().orElse(0))
                .toArray();
        return rows.stream().map(r -> aligned(r, widths)).collect(Collectors.joining("\n")) + "\n";
    }

    private static List<String> row(StockResult result) {
        Line collapse = result.line(Quantities.COLLAPSE_COURSE);
        return List.of(
                result.waterBody() + " " + result.speciesKey(),
                result.verdictWord(),
                interval(result.line(Quantities.MSY)),
                interval(result.line(Quantities.B_OVER_BMSY)),
                interval(result.line(Quantities.FOLD_MARGIN)),
                collapse.numbers().length == 0 ? UNKNOWN : chance(collapse.numbers()[0]));
    }

    private static String aligned(List<String> cells, int[] widths) {
        return IntStream.range(0, cells.size())
                .mapToObj(
                        i -> cells.get(i) + " ".repeat(widths[i] - cells.get(i).length()))
                .collect(Collectors.joining(GAP))
                .stripTrailing();
    }

    private static String interval(Line line) {
        String middle = digits(line.quantile(0.5));
        return middle.equals(UNKNOWN)
                ? UNKNOWN
                : middle + " (" + digits(line.quantile(0.1)) + " to " + digits(line.quantile(0.9)) + ")";
    }

    private static String digits(double value) {
        return Double.isFinite(value)
                ? new BigDecimal(value).round(THREE_DIGITS).stripTrailingZeros().toPlainString()
                : UNKNOWN;
    }

    /** In words; "none" and "all" only where it is exactly that. */
    static String chance(double probability) {
        if (probability <= 0) {
            return "no draw";
        }
        if (probability >= 1) {
            return "every draw";
        }
        long ofHundred = Math.round(100 * probability);
        if (ofHundred == 0) {
            return "fewer than 1 draw of 100";
        }
        if (ofHundred == 100) {
            return "more than 99 draws of 100";
        }
        return "about " + ofHundred + (ofHundred == 1 ? " draw of 100" : " draws of 100");
    }

    private static String notSettled(List<StockResult> results) {
        return results.stream()
                .filter(r -> !r.verdict().settled())
                .flatMap(r -> Stream.of(
                        "\nNot settled: " + r.waterBody() + " " + r.speciesKey(),
                        "  " + r.verdict().reasons().stream().findFirst().orElse("")))
                .map(line -> line + "\n")
                .collect(Collectors.joining());
    }
}
