package org.merewarden.core.inference.statespace;

import java.util.SplittableRandom;

/**
 * One stock's evidence, its priors, how far the ladder went, and equally weighted draws (none where nothing is possible).
 */
record StateSpaceFit(
        SeasonData data,
        ModelPriors priors,
        OuterParameters outer,
        Marginal marginal,
        Ladder ladder,
        StateDraws draws) {
    static final int DRAWS = 1000;

    static StateSpaceFit of(SeasonData data, ModelPriors priors, long seed) {
        OuterParameters outer = new OuterParameters(priors, data);
        Marginal marginal = new Marginal(data, priors, outer);
        SplittableRandom random = new SplittableRandom(seed);
        Ladder ladder = new Ladder(marginal, random);
        boolean possible = ladder.sample().effectiveSize() > 0;
        int[] chosen = possible ? ladder.sample().resample(DRAWS, random) : new int[0];
        StateDraws draws = StateDraws.at(chosen, ladder.sample(), marginal, outer, random);
        return new StateSpaceFit(data, priors, outer, marginal, ladder, draws);
    }

    /** One outer parameter on its natural scale by draw; MSY in t. */
    double[] parameter(int index) {
        double unit = index == OuterParameters.MSY ? data.unitTonnes() : 1;
        double[] values = new double[draws.theta().length];
        for (int k = 0; k < values.length; k++) {
            values[k] = unit * Math.exp(draws.theta()[k][index]);
        }
        return values;
    }

    /** Catchability of a series by draw: index per t; of an effort series effort = F/catchability. */
    double[] catchability(int series) {
        Series of = data.series().get(series);
        double shift = of.effort() ? -of.logMean() : of.logMean() - Math.log(data.unitTonnes());
        double[] values = new double[draws.logQ().length];
        for (int k = 0; k < values.length; k++) {
            values[k] = Math.exp(draws.logQ()[k][series] + shift);
        }
        return values;
    }
}
