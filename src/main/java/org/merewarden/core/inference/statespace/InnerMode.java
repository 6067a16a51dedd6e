package org.merewarden.core.inference.statespace;

/**
 * Newton's method to a mode of the hidden states at given outer parameters, and Laplace's approximation there.
 *
 * <pre>
 *   δ = −H⁻¹ g,   λ² = gᵀ H⁻¹ g;   done when H is positive definite and λ² &lt; tolerance
 *   ln ∫ e^(−U) dz ≈ −(U − λ²/2) + (N/2) ln 2π − ½ ln det H
 * </pre>
 *
 * <p>H: exact Hessian of U ({@link StateDensity}), the Gauss–Newton matrix where the exact one is not positive definite;
 * N: number of states. A step moves no biomass or harvest state by more than {@value #LONGEST_STEP}, and is halved until
 * U falls (or stays, to the {@value #SLACK} by which a change of {@link Quadrature} may move it). Without a mode after the given number of steps the result is "not found", never an exception.
 */
final class InnerMode {
    /** Of λ², for values whose differences matter. */
    static final double SHARP = 1e-6;

    /** Of λ², for draws: their weights are made exact afterwards. */
    static final double COARSE = 0.05;

    private static final double SLACK = 1e-6;
    private static final double LONGEST_STEP = 2;

    /** From a start that may be far, and from an anchor, whose prediction is near or useless. */
    static final int MANY_STEPS = 50;

    static final int FEW_STEPS = 20;
    private static final int MOST_HALVINGS = 20;
    private static final double HALF_LOG_TWO_PI = 0.5 * Math.log(2 * Math.PI);

    private final StateDensity density;
    private final double[] step;
    private final double[] trial;
    private double logTerm;
    private long evaluations;

    InnerMode(StateDensity density) {
        this.density = density;
        step = new double[density.size];
        trial = new double[density.size];
    }

    /** Laplace's ln ∫ e^(−U) dz at the mode found last. */
    double logTerm() {
        return logTerm;
    }

    /** Number of evaluations of the density so far. */
    long evaluations() {
        return evaluations;
    }

    /**
     * Moves z to a mode. On success the density's matrix holds the factor of the exact Hessian next to the mode.
     *
     * @param tolerance of λ²
     * @param mostSteps of Newton's method
     */
    boolean find(double[] z, double tolerance, int mostSteps) {
        double u = evaluate(z);
        for (int k = 0; k < mostSteps && Double.isFinite(u); k++) {
            density.addCurvature(1);
            boolean exact = density.matrix.factor();
            if (!exact) {
                density.addCurvature(-1);
                if (!density.matrix.factor()) {
                    return false;
                }
            }
            double decrement = direction();
            if (decrement < tolerance) {
                if (exact) {
                    finish(z, u, decrement);
                }
                return exact;
            }
            u = advance(z, u, decrement);
        }
        return false;
    }

    private double evaluate(double[] z) {
        evaluations++;
        return density.evaluate(z);
    }

    private double direction() {
        density.matrix.solve(density.gradient, step);
        double decrement = 0;
        for (int i = 0; i < step.length; i++) {
            decrement += step[i] * density.gradient[i];
        }
        return decrement;
    }

    private void finish(double[] z, double u, double decrement) {
        for (int i = 0; i < z.length; i++) {
            z[i] -= step[i];
        }
        logTerm = -(u - decrement / 2) + z.length * HALF_LOG_TWO_PI - 0.5 * density.matrix.logDeterminant();
    }

    /** The new U; NaN where no step makes it fall. */
    private double advance(double[] z, double u, double decrement) {
        double longest = 0;
        for (int i = 0; i < density.matrix.band; i++) {
            longest = Math.max(longest, Math.abs(step[i]));
        }
        double share = longest > LONGEST_STEP ? LONGEST_STEP / longest : 1;
        for (int halving = 0; halving < MOST_HALVINGS; halving++) {
            for (int i = 0; i < z.length; i++) {
                trial[i] = z[i] - share * step[i];
            }
            double next = evaluate(trial);
            if (next <= u - 1e-4 * share * decrement + SLACK) {
                System.arraycopy(trial, 0, z, 0, z.length);
                return next;
            }
            share /= 2;
        }
        return Double.NaN;
    }
}
