package org.merewarden.core.inference.statespace;

import org.apache.commons.math3.special.Erf;

/**
 * ln Φ(u) and the inverse Mills ratio φ(u)/Φ(u) of the standard normal, far into the lower tail.
 *
 * <pre>
 *   u &lt; −8:  Φ(u) = φ(u)/(−u) · (1 − 1/u² + 3/u⁴ − 15/u⁶ + 105/u⁸ − 945/u¹⁰ + 10395/u¹²)
 * </pre>
 *
 * <p>The asymptotic series (Abramowitz &amp; Stegun 1964, 26.2.12) errs by under 3e-8 relative at −8 and less beyond.
 */
final class NormalTail {
    private static final double FAR = -8;
    private static final double HALF_LOG_TWO_PI = 0.5 * Math.log(2 * Math.PI);

    private NormalTail() {}

    static double logCdf(double u) {
        return u < FAR
                ? logDensity(u) - Math.log(-u) + Math.log(series(u))
                : Math.log(0.5 * Erf.erfc(-u / Math.sqrt(2)));
    }

    static double mills(double u) {
        return u < FAR ? -u / series(u) : Math.exp(logDensity(u)) / (0.5 * Erf.erfc(-u / Math.sqrt(2)));
    }

    private static double logDensity(double u) {
        return -0.5 * u * u - HALF_LOG_TWO_PI;
    }

    private static double series(double u) {
        double s = 1 / (u * u);
        return 1 - s * (1 - s * (3 - s * (15 - s * (105 - s * (945 - s * 10395)))));
    }
}
