package org.merewarden.core.inference;

import java.util.Arrays;

/**
 * Sample quantiles by linear interpolation between order statistics: h = (N − 1)p, type 7 of Hyndman & Fan 1996, The
 * American Statistician 50: 361–365.
 *
 * <p>Edge cases: one value is every quantile of itself; no value, NaN or p outside [0, 1] are rejected.
 */
public final class Quantiles {
    private Quantiles() {}

    /** The p-quantile of the values, which are left as they are. */
    public static double of(double[] values, double p) {
        return of(values, new double[] {p})[0];
    }

    /** Several quantiles for one sort. */
    public static double[] of(double[] values, double[] p) {
        if (values.length == 0) {
            throw new IllegalArgumentException("needs at least 1 value, got 0");
        }
        double[] sorted = values.clone();
        Arrays.sort(sorted);
        if (Double.isNaN(sorted[sorted.length - 1])) {
            throw new IllegalArgumentException("needs values, got NaN");
        }
        return Arrays.stream(p).map(each -> ofSorted(sorted, each)).toArray();
    }

    /** The p-quantile of values that are in ascending order. */
    public static double ofSorted(double[] sorted, double p) {
        if (!(p >= 0 && p <= 1)) {
            throw new IllegalArgumentException("needs 0 <= p <= 1, got " + p);
        }
        double h = (sorted.length - 1) * p;
        int below = (int) h;
        double low = sorted[below];
        double high = sorted[Math.min(below + 1, sorted.length - 1)];
        return low == high ? low : low + (h - below) * (high - low);
    }
}
