package org.merewarden.command;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.ArrayList;
import java.util.List;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;

/** RESULTS.csv: numbers with a decimal point and {@value #DIGITS} significant digits. */
final class ResultsFile {
    static final int DIGITS = 9;
    static final String HEADER = "water_body,species,quantity,year,mean,sd,q05,q10,q25,q50,q75,q90,q95,ess,verdict";

    private static final MathContext ROUNDING = new MathContext(DIGITS);
    private static final int LEAST_PLAIN_EXPONENT = -7;
    private static final int GREATEST_PLAIN_EXPONENT = 14;

    private ResultsFile() {}

    static Stream<List<String>> rows(StockResult result) {
        return result.lines().stream().map(line -> cells(result, line));
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
