package org.merewarden.core.inference;

import java.util.Arrays;

/**
 * Residuals of the observation-error model at (ln r, ln K).
 *
 * <pre>
 *   B(first) = β K;   B(t+1) from {@link AnnualStep}
 *   ln B(t, τ) = (1 − τ) ln B⁺(t) + τ ln B(t+1)
 *   e_i = ln I_i − ln q_j − ln B(t_i, τ_i),   ln q_j = mean of ln I_i − ln B(t_i, τ_i) over series j
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>β</td><td>biomass at the start of the first season as a fraction of K, fixed</td></tr>
 * <tr><td>τ</td><td>time of the season, 0 start … 1 end: biomass in between is the geometric interpolation</td></tr>
 * <tr><td>I, q</td><td>index and its catchability (1 for absolute biomass), profiled out</td></tr>
 * </table>
 *
 * <p>Source: Polacheck, Hilborn &amp; Punt 1993, Can. J. Fish. Aquat. Sci. 50: 2597–2607 (τ = 0). Edge case: where the
 * removals exceed the biomass, the biomass is held above zero by a smooth floor at 0.1 % of K, and one more residual,
 * the last, grows with what was lacking; it is 0 at any admissible fit. Confined to one thread; the residuals are
 * computed without allocation.
 */
final class ObservationErrorModel implements LeastSquares.Residuals {
    private static final double FLOOR = 0.001;
    private static final double LACK_WEIGHT = 30;

    private final SeasonSeries seasons;
    private final IndexData data;
    private final double startFraction;
    private final double shape;
    private final double[] logValue;
    private final double[] biomass;
    private final double[] afterEvents;
    private final double[] logQ;
    private final double[] meanSlope;
    private final double[][] slope;
    private final double[] lackSlope = new double[2];
    private final int[] perSeries;
    private double lack;

    ObservationErrorModel(SeasonSeries seasons, IndexData data, double startFraction, double shape) {
        this.seasons = seasons;
        this.data = data;
        this.startFraction = startFraction;
        this.shape = shape;
        logValue = data.logValue().clone();
        biomass = new double[seasons.seasons() + 1];
        afterEvents = new double[seasons.seasons()];
        logQ = new double[data.seriesNames().size()];
        meanSlope = new double[logQ.length];
        slope = new double[biomass.length][2];
        perSeries = new int[logQ.length];
        for (int series : data.series()) {
            if (series >= 0) {
                perSeries[series]++;
            }
        }
    }

    @Override
    public int count() {
        return data.count() + 1;
    }

    @Override
    public void at(double[] parameters, double[] residuals) {
        run(Math.exp(parameters[0]), Math.exp(parameters[1]));
        Arrays.fill(logQ, 0);
        for (int i = 0; i < logValue.length; i++) {
            residuals[i] = logValue[i] - logBiomass(i);
            int series = data.series()[i];
            if (series >= 0) {
                logQ[series] += residuals[i] / perSeries[series];
            }
        }
        for (int i = 0; i < logValue.length; i++) {
            int series = data.series()[i];
            residuals[i] -= series >= 0 ? logQ[series] : 0;
        }
        residuals[logValue.length] = LACK_WEIGHT * lack;
    }

    /** Exact derivatives: near a collapse the path bends too sharply for differences. */
    @Override
    public boolean jacobian(double[] parameters, double[][] jacobian) {
        run(Math.exp(parameters[0]), Math.exp(parameters[1]));
        for (int j = 0; j < 2; j++) {
            Arrays.fill(meanSlope, 0);
            for (int i = 0; i < logValue.length; i++) {
                int t = data.season()[i];
                double tau = data.timeOfYear()[i];
                double start = slope[t][j] * (1 - seasons.killed()[t]) / afterEvents[t];
                jacobian[i][j] = -(1 - tau) * start - tau * slope[t + 1][j] / biomass[t + 1];
                int series = data.series()[i];
                if (series >= 0) {
                    meanSlope[series] += jacobian[i][j] / perSeries[series];
                }
            }
            for (int i = 0; i < logValue.length; i++) {
                int series = data.series()[i];
                jacobian[i][j] -= series >= 0 ? meanSlope[series] : 0;
            }
            jacobian[logValue.length][j] = LACK_WEIGHT * lackSlope[j];
        }
        return true;
    }

    /** The path and its derivatives with respect to ln r and ln K. */
    private void run(double r, double capacity) {
        lack = 0;
        lackSlope[0] = 0;
        lackSlope[1] = 0;
        biomass[0] = startFraction * capacity;
        slope[0][0] = 0;
        slope[0][1] = biomass[0];
        for (int t = 0; t < afterEvents.length; t++) {
            double kept = 1 - seasons.killed()[t];
            double plus = AnnualStep.afterEvents(biomass[t], seasons.stocked()[t], seasons.killed()[t]);
            double steepness = 1 + AnnualStep.growthByBiomass(plus, r, capacity, shape);
            afterEvents[t] = plus;
            biomass[t + 1] = AnnualStep.next(plus, seasons.removals()[t], r, capacity, shape);
            slope[t + 1][0] = steepness * kept * slope[t][0] + AnnualStep.growth(plus, r, capacity, shape);
            slope[t + 1][1] = steepness * kept * slope[t][1] + AnnualStep.growthByLogCapacity(plus, r, capacity, shape);
            if (biomass[t + 1] < FLOOR * capacity) {
                hold(t + 1, capacity);
            }
        }
    }

    /** Replaces a biomass y below the floor f by f/(2 − y/f), which is positive and joins smoothly. */
    private void hold(int t, double capacity) {
        double floor = FLOOR * capacity;
        double y = biomass[t];
        double shrink = 1 / (2 - y / floor);
        lack += (floor - y) / capacity;
        lackSlope[0] -= slope[t][0] / capacity;
        lackSlope[1] -= (slope[t][1] - y) / capacity;
        biomass[t] = floor * shrink;
        slope[t][0] *= shrink * shrink;
        slope[t][1] = biomass[t] + shrink * shrink * (slope[t][1] - y);
    }

    /** Whether the removals could be taken on the last path that was run. */
    boolean admissible() {
        return lack == 0;
    }

    /**
     * How strongly a deviation of ln biomass at a season's start is still there at its end, on the last path that was run:
     * ∂ ln B(t+1)/∂ ln B⁺(t), held in [0, 1]. The bound is there because below its tipping biomass a path runs away from
     * itself, so that paths simulated anew under the same removals would end at many fates and speak of other stocks.
     */
    double[] persistence(double[] parameters) {
        double r = Math.exp(parameters[0]);
        double capacity = Math.exp(parameters[1]);
        double[] persistence = new double[afterEvents.length];
        for (int t = 0; t < persistence.length; t++) {
            double response = (1 + AnnualStep.growthByBiomass(afterEvents[t], r, capacity, shape))
                    * afterEvents[t]
                    / biomass[t + 1];
            persistence[t] = Math.max(0, Math.min(1, response));
        }
        return persistence;
    }

    /** ln biomass at observation i on the last path that was run. */
    double logBiomass(int i) {
        int t = data.season()[i];
        double tau = data.timeOfYear()[i];
        return (1 - tau) * Math.log(afterEvents[t]) + tau * Math.log(biomass[t + 1]);
    }

    /** Replaces the logarithms of the observations, for a refit to resampled data. */
    void observe(int i, double newLogValue) {
        logValue[i] = newLogValue;
    }

    /** ln q of a series on the last path that was run. */
    double logQ(int series) {
        return logQ[series];
    }

    /** Biomass at the seasons' starts of the last path, T + 1 of them, t. */
    double[] biomass() {
        return biomass.clone();
    }

    /** F by season of the last path, 1/yr. */
    double[] fishing() {
        double[] f = new double[afterEvents.length];
        for (int t = 0; t < f.length; t++) {
            f[t] = AnnualStep.fishing(seasons.removals()[t], afterEvents[t], biomass[t + 1]);
        }
        return f;
    }
}
