package org.merewarden.portfolio;

import org.merewarden.core.inference.Quantiles;

/** The 10, 25, 50, 75 and 90 % quantiles of a quantity over the draws: the middle, the 50 % and the 80 % range. */
record Spread(double low80, double low50, double mid, double high50, double high80) {
    private static final double[] LEVELS = {0.1, 0.25, 0.5, 0.75, 0.9};

    static Spread of(double[] values) {
        double[] q = Quantiles.of(values, LEVELS);
        return new Spread(q[0], q[1], q[2], q[3], q[4]);
    }

    Spread times(double factor) {
        return new Spread(low80 * factor, low50 * factor, mid * factor, high50 * factor, high80 * factor);
    }
}
