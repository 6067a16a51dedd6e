package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import org.merewarden.core.prior.Prior;

/**
 * The outer parameters θ and their priors.
 *
 * <pre>
 *   θ = (ln MSY, ln FMSY, ln σ_p, ln σ_F, ln n, ln σ_1, …, ln σ_J),   θ_k = m_k + s_k u_k,   u_k ~ N(0, 1)
 * </pre>
 *
 * <p>MSY in the data's unit, so m_0 = 0; m, s: logarithm of the prior's median and its log-sd. A parameter with s = 0 is
 * fixed and has no u; where all are, MSY is left a log-sd of 1e-9. Everything outside works with u: there the prior is a standard normal.
 */
final class OuterParameters {
    static final int MSY = 0;
    static final int FMSY = 1;
    static final int PROCESS_SD = 2;
    static final int HARVEST_SD = 3;
    static final int SHAPE = 4;
    static final int FIRST_SCATTER = 5;
    private static final double LEAST_SPREAD = 1e-9;
    private static final double HALF_LOG_TWO_PI = 0.5 * Math.log(2 * Math.PI);

    private final double[] middle;
    private final double[] spread;
    private final int[] free;

    OuterParameters(ModelPriors priors, SeasonData data) {
        List<Prior> all = new ArrayList<>(
                List.of(priors.msy(), priors.fmsy(), priors.processSd(), priors.harvestSd(), priors.shape()));
        data.series().forEach(series -> all.add(series.scatter()));
        middle = all.stream().mapToDouble(p -> Math.log(p.median())).toArray();
        middle[MSY] -= Math.log(data.unitTonnes());
        spread = all.stream().mapToDouble(Prior::logSd).toArray();
        if (IntStream.range(0, spread.length).noneMatch(k -> spread[k] > 0)) {
            spread[MSY] = LEAST_SPREAD;
        }
        free = IntStream.range(0, spread.length).filter(k -> spread[k] > 0).toArray();
    }

    /** Number of free parameters. */
    int dimension() {
        return free.length;
    }

    /** Number of all parameters, fixed ones included. */
    int size() {
        return middle.length;
    }

    void natural(double[] u, double[] theta) {
        System.arraycopy(middle, 0, theta, 0, middle.length);
        for (int k = 0; k < free.length; k++) {
            theta[free[k]] += spread[free[k]] * u[k];
        }
    }

    /** The u of these θ; what is fixed does not matter. */
    double[] standard(double[] theta) {
        double[] u = new double[free.length];
        for (int k = 0; k < free.length; k++) {
            u[k] = (theta[free[k]] - middle[free[k]]) / spread[free[k]];
        }
        return u;
    }

    /** ln of the prior density of u. */
    double logPrior(double[] u) {
        double sum = 0;
        for (double each : u) {
            sum += each * each;
        }
        return -0.5 * sum - u.length * HALF_LOG_TWO_PI;
    }
}
