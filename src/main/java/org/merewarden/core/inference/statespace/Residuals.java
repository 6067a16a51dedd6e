package org.merewarden.core.inference.statespace;

import java.util.Arrays;

/**
 * Observation residuals: the posterior mean of each value's standardised residual.
 *
 * <pre>
 *   e_i = mean over draws of (ln observed − ln expected)/√(σ_j² + cv_i²)
 * </pre>
 *
 * <p>Over {@value #MOST_DRAWS} evenly spaced draws at most. The states are drawn given all data and lean towards each
 * value, so the residuals' standard deviation is under 1 even where the model is right. A value below detection has no residual, nor has effort in a closed season.
 */
final class Residuals {
    static final int MOST_DRAWS = 250;

    private final StateSpaceFit fit;
    private final StateDensity density;
    private final Expected expected;
    private final double[] residuals;

    private Residuals(StateSpaceFit fit) {
        this.fit = fit;
        density = new StateDensity(fit.data(), fit.priors());
        expected = new Expected(density);
        residuals = new double[fit.data().observations().count()];
    }

    /** One by value; NaN where there is none. */
    static double[] of(StateSpaceFit fit) {
        Residuals all = new Residuals(fit);
        int draws = fit.draws().theta().length;
        int every = Math.max(1, draws / MOST_DRAWS);
        int used = 0;
        for (int k = 0; k < draws; k += every) {
            all.add(k);
            used++;
        }
        double share = used;
        return Arrays.stream(all.residuals).map(sum -> sum / share).toArray();
    }

    private void add(int k) {
        density.parameters(fit.draws().theta()[k], 0);
        Observations o = fit.data().observations();
        for (int t = 0; t < fit.data().seasons(); t++) {
            if (o.firstOf()[t] == o.firstOf()[t + 1]) {
                continue;
            }
            double logBiomass =
                    Math.log(fit.draws().biomassTonnes()[k][t] / fit.data().unitTonnes());
            expected.season(
                    t, logBiomass - density.logCapacity(t), Math.log(fit.draws().fishing()[k][t]));
            for (int i = o.firstOf()[t]; i < o.firstOf()[t + 1]; i++) {
                residuals[i] += Expected.comparable(fit.data(), i, t) ? standardised(k, i) : Double.NaN;
            }
        }
    }

    private double standardised(int k, int i) {
        Observations o = fit.data().observations();
        int j = o.series()[i];
        double logQ = j < 0 ? 0 : fit.draws().logQ()[k][j];
        double scatter = j < 0 ? 0 : Math.exp(fit.draws().theta()[k][OuterParameters.FIRST_SCATTER + j]);
        return (o.value()[i] - expected.log(i, logQ)) / Math.sqrt(o.variance()[i] + scatter * scatter);
    }
}
