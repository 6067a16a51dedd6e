package org.merewarden.core.outlook;

/**
 * Removals of a season between the assessment and the first season looked at: lognormal, ln C ~ N(ln median, sd).
 *
 * @param medianTonnes t, >= 0; 0 is exactly nothing
 * @param logSd >= 0
 */
public record SeasonBetween(double medianTonnes, double logSd) {
    public SeasonBetween {
        if (!(medianTonnes >= 0 && medianTonnes < Double.POSITIVE_INFINITY)) {
            throw new IllegalArgumentException("needs 0 <= median < infinity, got " + medianTonnes);
        }
        if (!(logSd >= 0 && logSd < Double.POSITIVE_INFINITY)) {
            throw new IllegalArgumentException("needs 0 <= log-sd < infinity, got " + logSd);
        }
    }

    /** From a coefficient of variation: sd² = ln(1 + cv²). */
    public static SeasonBetween ofCv(double medianTonnes, double cv) {
        return new SeasonBetween(medianTonnes, Math.sqrt(Math.log1p(cv * cv)));
    }
}
