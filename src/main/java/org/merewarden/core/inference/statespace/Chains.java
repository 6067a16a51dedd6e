package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.random.RandomGenerator;
import java.util.stream.IntStream;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.CholeskyDecomposition;

/**
 * Adaptive Metropolis chains on the outer parameters, for posteriors that weighting does not reach.
 *
 * <pre>
 *   u′ ~ N(u, (2.38²/d) (C + ε I)),  C the covariance of the chain so far;  taken with probability min(1, p(u′)/p(u))
 * </pre>
 *
 * <p>p: Laplace's ln p(u, data) of {@link Marginal}. The chains follow this smooth target and the draws kept of them are
 * weighted afterwards by p̂/Laplace as those of the other rungs ({@link ImportanceSample}); a chain on p̂ itself would
 * stick wherever p̂ happens to be large. Four chains start apart and grow by half until R̂ &lt; {@value #LARGEST_R_HAT} and
 * bulk ESS ≥ {@value #WANTED_EFFECTIVE} for every parameter and for ln p, without their first {@value #FIRST_STEPS} steps
 * (or their first half if that is shorter; {@link ChainDiagnostics}), or until the work is used up: {@value #MOST_WORK}
 * evaluations × hidden states, about a second, three with the shape estimated.
 *
 * <p>Source: Haario, Saksman &amp; Tamminen 2001, Bernoulli 7: 223–242.
 */
final class Chains {
    static final double LARGEST_R_HAT = 1.01;
    static final long MOST_WORK = 6_000_000;
    static final int MOST_STEPS = 16_000;
    private static final int COUNT = 4;
    private static final double WANTED_EFFECTIVE = 600;
    private static final int FIRST_STEPS = 1000;
    private static final int LEAST_STEPS = 500;
    private static final int KEPT = 2000;
    private static final int ADAPTED_EVERY = 100;
    private static final int TRIES = 50;
    private static final double JITTER = 1e-6;

    private final Marginal marginal;
    private final RandomGenerator random;
    private final int d;
    private final long lastEvaluation;
    private final List<List<double[]>> paths = new ArrayList<>();
    private double rHat = Double.POSITIVE_INFINITY;
    private double effective;

    /** {@code start}: wider than the posterior is thought to be; {@code covariance}: of the first steps. */
    Chains(Marginal marginal, StudentT start, double[][] covariance, RandomGenerator random) {
        this.marginal = marginal;
        this.random = random;
        d = marginal.dimension();
        lastEvaluation = marginal.innerEvaluations() + MOST_WORK / marginal.density().size;
        List<Walker> walkers = IntStream.range(0, COUNT)
                .mapToObj(c -> new Walker(start, covariance))
                .toList();
        walkers.forEach(walker -> paths.add(walker.path));
        int steps = 0;
        for (int to = FIRST_STEPS; to <= MOST_STEPS && !agreed() && work(); to += to / 2) {
            for (; steps < to; steps += ADAPTED_EVERY) {
                walkers.forEach(Walker::walk);
            }
            judge();
        }
    }

    private boolean work() {
        return marginal.innerEvaluations() < lastEvaluation;
    }

    private boolean agreed() {
        return rHat < LARGEST_R_HAT && effective >= WANTED_EFFECTIVE;
    }

    /** The largest R̂ of any parameter and ln p. */
    double rHat() {
        return rHat;
    }

    /** The smallest bulk ESS of any parameter and ln p. */
    double effectiveSize() {
        return effective;
    }

    int steps() {
        return paths.stream().mapToInt(List::size).sum();
    }

    /** Draws of u at equal distances along what is kept of the chains. */
    double[][] draws() {
        List<double[]> kept = new ArrayList<>();
        for (List<double[]> path : paths) {
            int from = warmUp(path.size());
            int each = Math.min(KEPT / COUNT, path.size() - from);
            for (int k = 0; k < each; k++) {
                double[] state = path.get(from + (int) ((long) k * (path.size() - from) / each));
                kept.add(Arrays.copyOf(state, d));
            }
        }
        return kept.toArray(double[][]::new);
    }

    private static int warmUp(int steps) {
        return Math.min(steps / 2, FIRST_STEPS);
    }

    private void judge() {
        int shortest = paths.stream().mapToInt(List::size).min().orElse(0);
        int from = warmUp(shortest);
        rHat = 0;
        effective = Double.POSITIVE_INFINITY;
        for (int k = 0; k <= d; k++) {
            double[][] values = new double[COUNT][shortest - from];
            for (int c = 0; c < COUNT; c++) {
                for (int i = 0; i < values[c].length; i++) {
                    values[c][i] = paths.get(c).get(from + i)[k];
                }
            }
            rHat = Math.max(rHat, ChainDiagnostics.rHat(values));
            effective = Math.min(effective, ChainDiagnostics.bulkEffectiveSize(values));
        }
    }

    /** One chain; a state is u with ln p behind it. */
    private final class Walker {
        private final List<double[]> path = new ArrayList<>();
        private final double[] sum = new double[d];
        private final double[][] products = new double[d][d];
        private double[][] factor;
        private double[] state;

        Walker(StudentT start, double[][] covariance) {
            factor = factor(covariance);
            state = start(start);
        }

        /** The first possible of a few draws; the prior's middle where none is. */
        private double[] start(StudentT from) {
            double[] u = new double[d];
            for (int k = 0; k < TRIES; k++) {
                from.draw(random, u);
                double value = marginal.evaluate(u, InnerMode.COARSE);
                if (Double.isFinite(value)) {
                    return state(u, value);
                }
            }
            double[] middle = new double[d];
            return state(middle, marginal.evaluate(middle, InnerMode.COARSE));
        }

        private double[] state(double[] u, double value) {
            double[] result = Arrays.copyOf(u, d + 1);
            result[d] = value;
            return result;
        }

        /** A few steps and an adaptation; none once the work is used up. */
        void walk() {
            if (work() || path.size() < LEAST_STEPS) {
                for (int k = 0; k < ADAPTED_EVERY; k++) {
                    step();
                    path.add(state);
                    remember();
                }
                factor = factor(covariance());
            }
        }

        private void step() {
            double[] u = Arrays.copyOf(state, d);
            double scale = 2.38 / Math.sqrt(d);
            for (int k = 0; k < d; k++) {
                double g = scale * random.nextGaussian();
                for (int i = k; i < d; i++) {
                    u[i] += factor[i][k] * g;
                }
            }
            double value = marginal.evaluate(u, InnerMode.COARSE);
            if (Math.log(random.nextDouble()) < value - state[d]) {
                state = state(u, value);
            }
        }

        private void remember() {
            for (int k = 0; k < d; k++) {
                sum[k] += state[k];
                for (int i = 0; i < d; i++) {
                    products[k][i] += state[k] * state[i];
                }
            }
        }

        private double[][] covariance() {
            double[][] c = new double[d][d];
            int n = path.size();
            for (int k = 0; k < d; k++) {
                for (int i = 0; i < d; i++) {
                    c[k][i] = products[k][i] / n - sum[k] / n * (sum[i] / n);
                }
            }
            return c;
        }

        private double[][] factor(double[][] covariance) {
            double[][] c = new double[d][d];
            for (int k = 0; k < d; k++) {
                for (int i = 0; i < d; i++) {
                    c[k][i] = 0.5 * (covariance[k][i] + covariance[i][k]);
                }
                c[k][k] += JITTER;
            }
            return new CholeskyDecomposition(new Array2DRowRealMatrix(c), 1e-9, 0)
                    .getL()
                    .getData();
        }
    }
}
