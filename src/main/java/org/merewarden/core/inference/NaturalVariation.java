package org.merewarden.core.inference;

import java.util.random.RandomGenerator;

/**
 * Natural variation of biomass about a fitted path, for resampled observations.
 *
 * <pre>
 *   d(first) = 0;   d(t+1) = ρ(t) d(t) + N(0, σ_p);     at time τ of a season: (1 − τ) d(t) + τ d(t+1)
 *   v = mean of Var d over the observations
 *   a draw:  w · d,   w = min(1, s/√v)
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>d</td><td>deviation of ln B from the fitted path</td></tr>
 * <tr><td>ρ</td><td>persistence from one season's start to the next, in [0, 1]</td></tr>
 * <tr><td>σ_p</td><td>natural variation from year to year, assumed</td></tr>
 * <tr><td>s²</td><td>variance of the residuals, which contain both natural variation and observation error</td></tr>
 * </table>
 *
 * <p>The weight w keeps natural variation from being larger than all that the residuals show. It is added to resampled
 * residuals, which contain it already, because the fit itself takes up a part of it: with the residuals reduced by as
 * much, intervals for MSY meant to hold 90 % of simulated stocks held 52 of 80; as it is they hold 62. Our own
 * construction.
 */
final class NaturalVariation {
    private final double processSd;
    private final double[] persistence;
    private final int[] season;
    private final double[] timeOfYear;
    private final double weight;
    private final double[] deviation;

    /**
     * @param persistence ρ by season
     * @param residualVariance s², >= 0
     */
    NaturalVariation(double processSd, double[] persistence, IndexData data, double residualVariance) {
        this.processSd = processSd;
        this.persistence = persistence;
        season = data.season();
        timeOfYear = data.timeOfYear();
        deviation = new double[persistence.length + 1];
        double variance = meanVariance();
        weight = variance > residualVariance ? Math.sqrt(residualVariance / variance) : 1;
    }

    private double meanVariance() {
        double[] variance = new double[deviation.length];
        for (int t = 0; t < persistence.length; t++) {
            variance[t + 1] = persistence[t] * persistence[t] * variance[t] + processSd * processSd;
        }
        double sum = 0;
        for (int i = 0; i < season.length; i++) {
            int t = season[i];
            double tau = timeOfYear[i];
            double covariance = persistence[t] * variance[t];
            sum += (1 - tau) * (1 - tau) * variance[t] + 2 * tau * (1 - tau) * covariance + tau * tau * variance[t + 1];
        }
        return sum / season.length;
    }

    /** Draws one course of deviations. */
    void draw(RandomGenerator random) {
        for (int t = 0; t < persistence.length; t++) {
            deviation[t + 1] = persistence[t] * deviation[t] + processSd * random.nextGaussian();
        }
    }

    /** w · d at observation i on the course last drawn. */
    double at(int i) {
        double tau = timeOfYear[i];
        return weight * ((1 - tau) * deviation[season[i]] + tau * deviation[season[i] + 1]);
    }
}
