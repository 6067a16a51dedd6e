package org.merewarden.core.inference.statespace;

import java.util.random.RandomGenerator;

/**
 * Draws of the hidden states at one θ from the proposals at its modes, and the exact weight of each draw.
 *
 * <pre>
 *   z = z_m ± δ from g_m ({@link StateProposal}),   v(z) = p(data, z | θ) / Σ_k π_k g_k(z)
 *   p̂(data | θ) = Σ_m π_m ½ (v(z_m + δ_m) + v(z_m − δ_m))
 * </pre>
 *
 * <p>π: the modes' Laplace terms, scaled to 1. p̂ is unbiased for the integral that Laplace's term approximates, so
 * weights of θ that use it are exact (Andrieu &amp; Roberts 2009, Ann. Stat. 37: 697–725; as importance weights Tran et
 * al. 2013, arXiv 1309.3339), and the states of a draw are one of its z by weight. A pair ±δ cancels the odd orders of
 * Laplace's error. Nothing is allocated after construction.
 */
final class StateMixture {
    private final StateDensity density;
    private final StateProposal[] proposals;
    private final double[] logTerms;
    private final double[] logShare;
    private final double[][] draws;
    private final double[] logWeights;
    private int modes;

    StateMixture(StateDensity density, int mostModes) {
        this.density = density;
        proposals = new StateProposal[mostModes];
        for (int m = 0; m < mostModes; m++) {
            proposals[m] = new StateProposal(density);
        }
        logTerms = new double[mostModes];
        logShare = new double[mostModes];
        draws = new double[2 * mostModes][density.size];
        logWeights = new double[2 * mostModes];
    }

    void clear() {
        modes = 0;
    }

    /** A mode with its Laplace term; the density's matrix holds the factored Hessian next to it. */
    void add(double[] centre, double logTerm) {
        proposals[modes].keep(centre, density.matrix);
        logTerms[modes++] = logTerm;
    }

    /** Draws one pair per mode for the density's present parameters; returns ln p̂(data | θ), −∞ without modes. */
    double draw(RandomGenerator random) {
        normalise();
        for (int m = 0; m < modes; m++) {
            proposals[m].prepare();
        }
        double total = Double.NEGATIVE_INFINITY;
        for (int m = 0; m < modes; m++) {
            proposals[m].draw(random, draws[2 * m], draws[2 * m + 1]);
            for (int side = 2 * m; side <= 2 * m + 1; side++) {
                double weight = logShare[m] + Math.log(0.5) - logMixture(draws[side], m) - density.value(draws[side]);
                logWeights[side] = Double.isNaN(weight) ? Double.NEGATIVE_INFINITY : weight;
                total = logSum(total, logWeights[side]);
            }
        }
        return total;
    }

    private void normalise() {
        double sum = Double.NEGATIVE_INFINITY;
        for (int m = 0; m < modes; m++) {
            sum = logSum(sum, logTerms[m]);
        }
        for (int m = 0; m < modes; m++) {
            logShare[m] = logTerms[m] - sum;
        }
    }

    private double logMixture(double[] z, int own) {
        double sum = Double.NEGATIVE_INFINITY;
        for (int k = 0; k < modes; k++) {
            sum = logSum(sum, logShare[k] + (k == own ? proposals[k].logDensity() : proposals[k].logDensity(z)));
        }
        return sum;
    }

    private static double logSum(double a, double b) {
        double high = Math.max(a, b);
        return high == Double.NEGATIVE_INFINITY ? high : high + Math.log1p(Math.exp(Math.min(a, b) - high));
    }

    /** One of the last drawn states, by weight; not to be changed. */
    double[] choose(RandomGenerator random) {
        double total = Double.NEGATIVE_INFINITY;
        for (int k = 0; k < 2 * modes; k++) {
            total = logSum(total, logWeights[k]);
        }
        double point = random.nextDouble();
        for (int k = 0; k < 2 * modes - 1; k++) {
            point -= Math.exp(logWeights[k] - total);
            if (point < 0) {
                return draws[k];
            }
        }
        return draws[2 * modes - 1];
    }
}
