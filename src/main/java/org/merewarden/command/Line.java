package org.merewarden.command;

import java.util.stream.DoubleStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Quantiles;

/**
 * One quantity of a stock.
 *
 * @param year the season that it is of, or at whose start a biomass stands; null for a quantity of no season
 * @param numbers mean, standard deviation and the quantiles of the draws; the mean alone for a number that is none of
 *     draws; empty where it is not known
 */
record Line(String quantity, @Nullable Integer year, double[] numbers) {
    static final double[] PROBABILITIES = {0.05, 0.1, 0.25, 0.5, 0.75, 0.9, 0.95};
    static final int COLUMNS = 2 + PROBABILITIES.length;

    /** The spread of draws; unknown without any. */
    static Line of(String quantity, @Nullable Integer year, double[] draws) {
        if (draws.length == 0) {
            return unknown(quantity, year);
        }
        double mean = DoubleStream.of(draws).average().orElseThrow();
        double squares =
                DoubleStream.of(draws).map(d -> (d - mean) * (d - mean)).sum();
        double sd = draws.length == 1 ? 0 : Math.sqrt(squares / (draws.length - 1));
        return new Line(
                quantity,
                year,
                DoubleStream.concat(DoubleStream.of(mean, sd), DoubleStream.of(Quantiles.of(draws, PROBABILITIES)))
                        .toArray());
    }

    /** A number that is no draw's, such as a probability. */
    static Line single(String quantity, @Nullable Integer year, @Nullable Double value) {
        return value == null ? unknown(quantity, year) : new Line(quantity, year, new double[] {value});
    }

    static Line unknown(String quantity, @Nullable Integer year) {
        return new Line(quantity, year, new double[0]);
    }

    /** The p-quantile, p one of {@link #PROBABILITIES}; NaN where it is not known. */
    double quantile(double p) {
        for (int i = 0; i < PROBABILITIES.length; i++) {
            if (PROBABILITIES[i] == p && numbers.length == COLUMNS) {
                return numbers[2 + i];
            }
        }
        return Double.NaN;
    }
}
