package org.merewarden.core.inference.statespace;

import java.util.random.RandomGenerator;

/**
 * Equally weighted draws of outer parameters and hidden states, in tonnes.
 *
 * @param theta [draw][parameter] as {@link OuterParameters} orders them, MSY in the data's unit
 * @param biomassTonnes [draw][T + 1] at the season's start
 * @param fishing [draw][T], 1/yr; of a closed season the F that yields its known catch
 * @param removals [draw][T], t in the season
 * @param firstRate [draw], F of the walk in the first season, 1/yr, also where it was closed
 * @param logQ [draw][series] hidden ln q
 */
record StateDraws(
        double[][] theta,
        double[][] biomassTonnes,
        double[][] fishing,
        double[][] removals,
        double[] firstRate,
        double[][] logQ) {

    /** {@code chosen}: indices of the sample. */
    static StateDraws at(
            int[] chosen, ImportanceSample sample, Marginal marginal, OuterParameters outer, RandomGenerator random) {
        StateDensity density = marginal.density();
        int draws = chosen.length;
        StateDraws result = empty(draws, outer.size(), density);
        for (int k = 0; k < draws; k++) {
            double[] u = sample.draw(chosen[k]);
            double[] z = sample.states(chosen[k]);
            marginal.parameters(u);
            outer.natural(u, result.theta[k]);
            result.put(k, z, density, random.nextGaussian());
        }
        return result;
    }

    /** The one path of these states, without noise in its last step. */
    static StateDraws of(double[] theta, double[] z, StateDensity density) {
        StateDraws result = empty(1, theta.length, density);
        System.arraycopy(theta, 0, result.theta[0], 0, theta.length);
        density.parameters(theta, 0);
        result.put(0, z, density, 0);
        return result;
    }

    private static StateDraws empty(int draws, int parameters, StateDensity density) {
        return new StateDraws(
                new double[draws][parameters],
                new double[draws][density.seasons + 1],
                new double[draws][density.seasons],
                new double[draws][density.seasons],
                new double[draws],
                new double[draws][density.matrix.borders]);
    }

    private void put(int k, double[] z, StateDensity density, double noise) {
        double unit = density.data.unitTonnes();
        firstRate[k] = Math.exp(z[1]);
        System.arraycopy(z, 2 * density.seasons, logQ[k], 0, logQ[k].length);
        int last = density.seasons - 1;
        for (int t = 0; t <= last; t++) {
            biomassTonnes[k][t] = unit * Math.exp(z[2 * t] + density.logCapacity(t));
            fishing[k][t] = Math.exp(density.beginSeason(t, z[2 * t], z[2 * t + 1]));
            density.step.biomassAt(1);
            if (fishing[k][t] > 0) {
                density.step.removals();
                removals[k][t] = unit * Math.exp(density.step.c + density.logCapacity(t));
            }
        }
        double next = density.step.y + density.logCapacity(last) + noise * Math.sqrt(density.stepVariance(last));
        biomassTonnes[k][last + 1] = unit * Math.exp(next);
    }
}
