package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.SplittableRandom;
import java.util.random.RandomGenerator;

/**
 * Weighted draws of the outer parameters from several proposals, weighted as draws from their mixture.
 *
 * <pre>
 *   w_i = p(u_i, data) / Σ_r (N_r/N) q_r(u_i)          ESS = (Σ w)²/Σ w²          ln evidence = ln mean w
 * </pre>
 *
 * <p>Two kinds of weight. With Laplace's p they are smooth, and proposals are adapted from them. The sample is judged and
 * resampled by corrected ones, with p = Laplace · min(ρ, c ρ̄): ρ = p̂/Laplace from the unbiased p̂ of
 * {@link StateMixture}, ρ̄ its weighted geometric mean. Where no ρ is cut the weights are exact; cutting (truncated
 * importance sampling, Ionides 2008, J. Comput. Graph. Stat. 17: 295–311, whose bound √N is recalled) trades the tails
 * that the states' proposals cannot reach for a bounded variance. c is √N, or less where {@link #tighten()} was called,
 * down to {@value #TIGHTEST} (our judgement); {@link #truncatedShare()} tells how much was cut away.
 * Draws more than {@value #NEGLIGIBLE} below the best in ln p are taken as impossible, like those whose drawn states are
 * beyond the arithmetic. Each other draw keeps one path of
 * its hidden states, from a generator seeded with the sample's seed and the draw's number.
 *
 * <p>Adaptive multiple importance sampling with deterministic-mixture weights: Cornuet et al. 2012, Scand. J. Stat. 39:
 * 798–812. Adding a proposal re-weights all earlier draws.
 */
final class ImportanceSample {
    private static final double PRIOR_COUNT = 20;

    private static final double NEGLIGIBLE = 20;
    private static final double LOWEST_CORRECTION = -20;
    private static final double TIGHTEST = 5;

    private final Marginal marginal;
    private final long seed;
    private final int dimension;
    private double[][] draws = new double[0][];
    private double[] logTarget = new double[0];
    private double[] correction = new double[0];
    private double[][] states = new double[0][];
    private double[] logMixture = new double[0];
    private double best = Double.NEGATIVE_INFINITY;
    private double worth = 1;
    private boolean evidenceKnown = true;
    private double tightness = 1;
    private final List<StudentT> proposals = new ArrayList<>();
    private final List<Integer> counts = new ArrayList<>();

    ImportanceSample(Marginal marginal, long seed) {
        this.marginal = marginal;
        this.seed = seed;
        dimension = marginal.dimension();
    }

    /**
     * Draws u that already follow Laplace's p, so that weights are corrections alone; the evidence stays unknown.
     *
     * @param independent how many independent draws they are worth
     */
    static ImportanceSample following(Marginal marginal, long seed, double[][] u, double independent) {
        ImportanceSample sample = new ImportanceSample(marginal, seed);
        sample.resize(u.length);
        for (int i = 0; i < u.length; i++) {
            sample.draws[i] = u[i];
            sample.evaluate(i);
            sample.logMixture[i] = sample.logTarget[i] == Double.NEGATIVE_INFINITY ? 0 : sample.logTarget[i];
        }
        sample.worth = Math.min(1, independent / Math.max(1, u.length));
        sample.evidenceKnown = false;
        return sample;
    }

    private void resize(int total) {
        draws = Arrays.copyOf(draws, total);
        logTarget = Arrays.copyOf(logTarget, total);
        correction = Arrays.copyOf(correction, total);
        states = Arrays.copyOf(states, total);
        logMixture = Arrays.copyOf(logMixture, total);
    }

    int size() {
        return draws.length;
    }

    double[] draw(int i) {
        return draws[i];
    }

    void add(StudentT proposal, int count, RandomGenerator random) {
        int old = draws.length;
        int total = old + count;
        resize(total);
        for (int i = 0; i < old; i++) {
            logMixture[i] = logSum(logMixture[i], Math.log(count) + proposal.logDensity(draws[i]));
        }
        proposals.add(proposal);
        counts.add(count);
        for (int i = old; i < total; i++) {
            double[] u = new double[dimension];
            proposal.draw(random, u);
            draws[i] = u;
            evaluate(i);
            double mixture = Double.NEGATIVE_INFINITY;
            for (int r = 0; r < proposals.size(); r++) {
                mixture = logSum(
                        mixture, Math.log(counts.get(r)) + proposals.get(r).logDensity(u));
            }
            logMixture[i] = mixture;
        }
    }

    private void evaluate(int i) {
        double value = marginal.evaluate(draws[i], InnerMode.COARSE);
        best = Double.isNaN(value) ? best : Math.max(best, value);
        if (!(value > best - NEGLIGIBLE)) {
            logTarget[i] = Double.NEGATIVE_INFINITY;
            return;
        }
        RandomGenerator random = new SplittableRandom(seed + i);
        double exact = marginal.logPrior(draws[i]) + marginal.mixture().draw(random);
        if (exact == Double.NEGATIVE_INFINITY) {
            logTarget[i] = exact;
            return;
        }
        logTarget[i] = value;
        correction[i] = Math.max(LOWEST_CORRECTION, exact - value);
        states[i] = marginal.mixture().choose(random).clone();
    }

    /** One path of the hidden states of draw i; not to be changed. */
    double[] states(int i) {
        return states[i];
    }

    private static double logSum(double a, double b) {
        double high = Math.max(a, b);
        return high == Double.NEGATIVE_INFINITY ? high : high + Math.log1p(Math.exp(Math.min(a, b) - high));
    }

    /** Corrected ln w_i; their mean weight estimates the evidence. */
    double[] logWeights() {
        double bound = largestCorrection();
        double[] corrected = logTarget.clone();
        for (int i = 0; i < corrected.length; i++) {
            corrected[i] += Math.min(bound, correction[i]);
        }
        return logWeights(corrected);
    }

    private double largestCorrection() {
        double[] smooth = smoothWeights();
        double mean = 0;
        for (int i = 0; i < smooth.length; i++) {
            mean += smooth[i] * correction[i];
        }
        return mean + Math.log(bound());
    }

    private double bound() {
        return Math.max(TIGHTEST, Math.sqrt(correction.length) * tightness);
    }

    /** Halves the bound at which corrections are cut; false where it is at its tightest. */
    boolean tighten() {
        boolean possible = bound() > TIGHTEST;
        tightness /= 2;
        return possible;
    }

    /** Cuts corrections at the usual bound again. */
    void loosen() {
        tightness = 1;
    }

    /** Share of the exact weight that cutting took away, 0–1. */
    double truncatedShare() {
        double bound = largestCorrection();
        double[] exact = logTarget.clone();
        for (int i = 0; i < exact.length; i++) {
            exact[i] += correction[i];
        }
        double[] weights = scaled(logWeights(exact));
        double share = 0;
        for (int i = 0; i < weights.length; i++) {
            share += correction[i] > bound ? weights[i] * -Math.expm1(bound - correction[i]) : 0;
        }
        return share;
    }

    private double[] logWeights(double[] target) {
        double[] result = new double[draws.length];
        for (int i = 0; i < result.length; i++) {
            result[i] = target[i] - logMixture[i] + Math.log(draws.length);
        }
        return result;
    }

    /** Corrected weights that add up to 1; all 0 where no draw is possible. */
    double[] weights() {
        return scaled(logWeights());
    }

    private double[] smoothWeights() {
        return scaled(logWeights(logTarget));
    }

    private static double[] scaled(double[] w) {
        double largest = Arrays.stream(w).max().orElse(Double.NEGATIVE_INFINITY);
        double sum = 0;
        for (int i = 0; i < w.length; i++) {
            w[i] = largest == Double.NEGATIVE_INFINITY ? 0 : Math.exp(w[i] - largest);
            sum += w[i];
        }
        for (int i = 0; i < w.length && sum > 0; i++) {
            w[i] /= sum;
        }
        return w;
    }

    /** ESS of the corrected weights, times what a draw is worth where draws are not independent. */
    double effectiveSize() {
        return worth * effectiveSize(weights());
    }

    private static double effectiveSize(double[] weights) {
        double squares = 0;
        for (double w : weights) {
            squares += w * w;
        }
        return squares > 0 ? 1 / squares : 0;
    }

    double paretoShape() {
        return ParetoTail.shape(logWeights());
    }

    /** NaN where unknown. */
    double logEvidence() {
        if (!evidenceKnown) {
            return Double.NaN;
        }
        double[] w = logWeights();
        double largest = Arrays.stream(w).max().orElse(Double.NEGATIVE_INFINITY);
        double sum = 0;
        for (double each : w) {
            sum += Math.exp(each - largest);
        }
        return largest == Double.NEGATIVE_INFINITY ? largest : largest + Math.log(sum / w.length);
    }

    private double[] mean(double[] weights) {
        double[] mean = new double[dimension];
        for (int i = 0; i < draws.length; i++) {
            for (int k = 0; k < dimension; k++) {
                mean[k] += weights[i] * draws[i][k];
            }
        }
        return mean;
    }

    /** Weighted covariance, mixed with another by how far the weights can be trusted. */
    double[][] covariance(double[][] other) {
        double[] weights = smoothWeights();
        double trust = effectiveSize(weights);
        return covariance(weights, mean(weights), other, trust / (trust + PRIOR_COUNT), 1);
    }

    /** A proposal from the weighted mean and covariance, which few effective draws hardly move from the given one. */
    StudentT adapted(double[] otherMean, double[][] otherCovariance) {
        return widened(otherMean, otherCovariance, 1);
    }

    StudentT widened(double[] otherMean, double[][] otherCovariance, double widening) {
        double[] weights = smoothWeights();
        double trust = effectiveSize(weights);
        double share = trust / (trust + PRIOR_COUNT);
        double[] mean = mean(weights);
        for (int k = 0; k < dimension; k++) {
            mean[k] = share * mean[k] + (1 - share) * otherMean[k];
        }
        return new StudentT(mean, covariance(weights, mean, otherCovariance, share, widening));
    }

    /** A proposal from the draws on one side (sign) of the weighted mean along an axis, widened. */
    StudentT half(double[] axis, double sign, double[][] otherCovariance, double widening) {
        double[] weights = smoothWeights();
        double[] centre = mean(weights);
        double kept = 0;
        double squares = 0;
        for (int i = 0; i < draws.length; i++) {
            double along = 0;
            for (int k = 0; k < dimension; k++) {
                along += axis[k] * (draws[i][k] - centre[k]);
            }
            weights[i] = along * sign > 0 ? weights[i] : 0;
            kept += weights[i];
            squares += weights[i] * weights[i];
        }
        for (int i = 0; i < weights.length && kept > 0; i++) {
            weights[i] /= kept;
        }
        double trust = squares > 0 ? kept * kept / squares : 0;
        double[] mean = kept > 0 ? mean(weights) : centre;
        return new StudentT(mean, covariance(weights, mean, otherCovariance, trust / (trust + PRIOR_COUNT), widening));
    }

    private double[][] covariance(double[] weights, double[] mean, double[][] other, double share, double widening) {
        double[][] c = new double[dimension][dimension];
        for (int i = 0; i < draws.length; i++) {
            for (int k = 0; k < dimension && weights[i] > 0; k++) {
                for (int m = 0; m < dimension; m++) {
                    c[k][m] += weights[i] * (draws[i][k] - mean[k]) * (draws[i][m] - mean[m]);
                }
            }
        }
        for (int k = 0; k < dimension; k++) {
            for (int m = 0; m < dimension; m++) {
                c[k][m] = widening * (share * c[k][m] + (1 - share) * other[k][m]);
            }
        }
        return c;
    }

    /** Systematic resampling: indices of {@code count} equally weighted draws, in ascending order. */
    int[] resample(int count, RandomGenerator random) {
        double[] weights = weights();
        int[] chosen = new int[count];
        double point = random.nextDouble() / count;
        double sum = 0;
        int i = -1;
        for (int k = 0; k < count; k++) {
            while (point > sum && i < weights.length - 1) {
                sum += weights[++i];
            }
            chosen[k] = Math.max(0, i);
            point += 1.0 / count;
        }
        return chosen;
    }
}
