package org.merewarden.core.dynamics;

/** Quotients whose limit at 0 is known, computed without cancellation. */
final class Stable {
    /** Below this the next term of the series is under half a unit in the last place. */
    private static final double NEGLIGIBLE = 1e-17;

    private Stable() {}

    /** (e^(n x) − 1)/n, which tends to x as n → 0. */
    static double expm1Over(double n, double x) {
        if (n == 0 || Math.abs(n * x) < NEGLIGIBLE) {
            return x;
        }
        return Math.expm1(n * x) / n;
    }

    /** ln(1 + n w)/n, which tends to w as n → 0. */
    static double log1pOver(double n, double w) {
        if (n == 0 || Math.abs(n * w) < NEGLIGIBLE) {
            return w;
        }
        return Math.log1p(n * w) / n;
    }

    /** ln(e^p + e^q) without overflow; −infinity stands for ln 0. */
    static double logSum(double p, double q) {
        double high = Math.max(p, q);
        if (Double.isInfinite(high)) {
            return high;
        }
        return high + Math.log1p(Math.exp(Math.min(p, q) - high));
    }
}
