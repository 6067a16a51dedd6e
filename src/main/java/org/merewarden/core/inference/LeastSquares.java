package org.merewarden.core.inference;

import java.util.Arrays;

/**
 * Nonlinear least squares: finds p that minimises Σ e_i(p)², and says whether it did.
 *
 * <pre>
 *   p̂ = argmin Σ e_i(p)²,   s² = RSS/(N − k),   cov(p̂) = s² (JᵀJ)⁻¹
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>e</td><td>residuals, N of them</td></tr>
 * <tr><td>p</td><td>parameters, k of them, each free or within bounds</td></tr>
 * <tr><td>J</td><td>∂e/∂p, from the caller or by central differences</td></tr>
 * <tr><td>s</td><td>residual standard deviation</td></tr>
 * </table>
 *
 * <p>A ladder, the rung reached being part of the answer: (1) Levenberg–Marquardt (Moré 1978) from the start; (2) a
 * Nelder–Mead simplex from the best point seen, then (1) again; (3) further starts, the given one scaled by powers of
 * ten and by seeded lognormal factors, each through (1), the converged one with the least RSS winning. Bounds go through
 * p = mid + half·sin u, so a bound is an ordinary stationary point.
 *
 * <p>Converged means, at the final point and apart from parameters on a bound: the residuals are orthogonal to each
 * column of J (cosine ≤ 30 √tolerance, 1e-5 if sharp, or RSS at rounding level), and J with columns scaled to length 1 has a condition number
 * ≤ 1e7. Otherwise the best point is returned with the reason. It is a check of a local optimum: a converged fit may
 * have a better one elsewhere. Accuracy: six digits on the certified sets of NIST's Statistical Reference Datasets.
 */
public final class LeastSquares {
    /** Relative fall of RSS at which the search stops: for parameters to six digits and more. */
    public static final double SHARP = 1e-13;

    /** The same for parameters to a small part of their standard error. */
    public static final double COARSE = 1e-8;

    private LeastSquares() {}

    /** Residuals as a function of the parameters. Non-finite residuals count as very bad ones. */
    public interface Residuals {
        int count();

        /** Writes the residuals at {@code parameters} to {@code residuals}; keeps neither array. */
        void at(double[] parameters, double[] residuals);

        /**
         * Writes ∂e/∂p at {@code parameters} to {@code jacobian} (a row per residual) where a closed form exists.
         *
         * @return false, the default, to have it taken by central differences
         */
        default boolean jacobian(double[] parameters, double[][] jacobian) {
            return false;
        }
    }

    /** How far up the ladder a fit went. */
    public enum Rung {
        LEVENBERG_MARQUARDT,
        SIMPLEX,
        FURTHER_STARTS
    }

    /**
     * The result of a fit.
     *
     * @param parameters best point
     * @param standardErrors of the parameters; NaN where not converged, 0 on a bound
     * @param covariance of the parameters, same convention
     * @param residualSumOfSquares at the best point
     * @param residualSd √(RSS/(N − k)); NaN where N ≤ k
     * @param atBound whether each parameter ended on one of its bounds
     * @param converged the verdict
     * @param reason why not converged; empty where converged
     * @param evaluations of the residual function
     * @param rung the last one climbed
     */
    public record Fit(
            double[] parameters,
            double[] standardErrors,
            double[][] covariance,
            double residualSumOfSquares,
            double residualSd,
            boolean[] atBound,
            boolean converged,
            String reason,
            int evaluations,
            Rung rung) {

        /** Whether any parameter ended on a bound. */
        public boolean anyAtBound() {
            for (boolean b : atBound) {
                if (b) {
                    return true;
                }
            }
            return false;
        }
    }

    /** Fit without bounds, climbing the whole ladder if need be. */
    public static Fit fit(Residuals residuals, double[] start) {
        double[] lower = new double[start.length];
        double[] upper = new double[start.length];
        Arrays.fill(lower, Double.NEGATIVE_INFINITY);
        Arrays.fill(upper, Double.POSITIVE_INFINITY);
        return fit(residuals, start, lower, upper, Rung.FURTHER_STARTS, SHARP);
    }

    /**
     * @param lower, upper bounds, both finite or both infinite for each parameter
     * @param last the highest rung that may be climbed
     * @param tolerance relative fall of RSS at which the search stops, e.g. {@link #SHARP}
     */
    public static Fit fit(
            Residuals residuals, double[] start, double[] lower, double[] upper, Rung last, double tolerance) {
        for (int j = 0; j < start.length; j++) {
            if (!(lower[j] < upper[j] && Double.isInfinite(lower[j]) == Double.isInfinite(upper[j]))) {
                throw new IllegalArgumentException(
                        "needs lower < upper, both finite or neither, got " + lower[j] + ", " + upper[j]);
            }
        }
        return new LeastSquaresSearch(residuals, lower, upper, tolerance).climb(start, last);
    }
}
