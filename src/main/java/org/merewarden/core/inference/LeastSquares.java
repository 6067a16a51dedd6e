package org.merewarden.core.inference;

import java.util.Arrays;
import java.util.SplittableRandom;
import org.apache.commons.math3.exception.MathIllegalArgumentException;
import org.apache.commons.math3.exception.MathIllegalStateException;
import org.apache.commons.math3.fitting.leastsquares.LeastSquaresFactory;
import org.apache.commons.math3.fitting.leastsquares.LevenbergMarquardtOptimizer;
import org.apache.commons.math3.fitting.leastsquares.MultivariateJacobianFunction;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.ArrayRealVector;
import org.apache.commons.math3.linear.RealMatrix;
import org.apache.commons.math3.linear.RealVector;
import org.apache.commons.math3.linear.SingularValueDecomposition;
import org.apache.commons.math3.optim.InitialGuess;
import org.apache.commons.math3.optim.MaxEval;
import org.apache.commons.math3.optim.nonlinear.scalar.GoalType;
import org.apache.commons.math3.optim.nonlinear.scalar.ObjectiveFunction;
import org.apache.commons.math3.optim.nonlinear.scalar.noderiv.NelderMeadSimplex;
import org.apache.commons.math3.optim.nonlinear.scalar.noderiv.SimplexOptimizer;
import org.apache.commons.math3.util.Pair;

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
 * <tr><td>J</td><td>∂e/∂p, by central differences</td></tr>
 * <tr><td>s</td><td>residual standard deviation</td></tr>
 * </table>
 *
 * <p>A ladder, the rung reached being part of the answer: (1) Levenberg–Marquardt (Moré 1978) from the start; (2) a
 * Nelder–Mead simplex from the best point seen, then (1) again; (3) further starts, the given one scaled by powers of
 * ten and by seeded lognormal factors, each through (1), the converged one with the least RSS winning. Bounds go through
 * p = mid + half·sin u, so a bound is an ordinary stationary point.
 *
 * <p>Converged means, at the final point and apart from parameters on a bound: the residuals are orthogonal to each
 * column of J (cosine ≤ 1e-5, or RSS at rounding level), and J with columns scaled to length 1 has a condition number
 * ≤ 1e7. Otherwise the best point is returned with the reason. It is a check of a local optimum: a converged fit may
 * have a better one elsewhere. Accuracy: six digits on the certified sets of NIST's Statistical Reference Datasets.
 */
public final class LeastSquares {
    private static final double LARGEST_COSINE = 1e-5;
    private static final double LARGEST_CONDITION = 1e7;
    private static final double AT_BOUND = 1e-5;
    private static final double NOT_A_VALUE = 1e100;
    private static final double STEP = Math.cbrt(Math.ulp(1.0));
    private static final int EVALUATIONS = 1000;
    private static final int SIMPLEX_EVALUATIONS = 4000;
    private static final int FURTHER_STARTS = 24;

    private LeastSquares() {}

    /** Residuals as a function of the parameters. Non-finite residuals count as very bad ones. */
    public interface Residuals {
        int count();

        /** Writes the residuals at {@code parameters} to {@code residuals}; keeps neither array. */
        void at(double[] parameters, double[] residuals);
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
        return fit(residuals, start, lower, upper, Rung.FURTHER_STARTS);
    }

    /**
     * @param lower, upper bounds, both finite or both infinite for each parameter
     * @param last the highest rung that may be climbed
     */
    public static Fit fit(Residuals residuals, double[] start, double[] lower, double[] upper, Rung last) {
        for (int j = 0; j < start.length; j++) {
            if (!(lower[j] < upper[j] && Double.isInfinite(lower[j]) == Double.isInfinite(upper[j]))) {
                throw new IllegalArgumentException(
                        "needs lower < upper, both finite or neither, got " + lower[j] + ", " + upper[j]);
            }
        }
        return new Search(residuals, lower, upper).climb(start, last);
    }

    /** One fit's working space; u are the unbounded coordinates of the parameters. */
    private static final class Search implements MultivariateJacobianFunction {
        private final Residuals residuals;
        private final double[] lower;
        private final double[] upper;
        private final int k;
        private final int n;
        private final double[] p;
        private final double[] e;
        private final double[] ePlus;
        private final double[] eMinus;
        private final double[] scale;
        private double[] best = {};
        private double bestRss = Double.POSITIVE_INFINITY;
        private int evaluations;

        Search(Residuals residuals, double[] lower, double[] upper) {
            this.residuals = residuals;
            this.lower = lower;
            this.upper = upper;
            k = lower.length;
            n = residuals.count();
            p = new double[k];
            e = new double[n];
            ePlus = new double[n];
            eMinus = new double[n];
            scale = new double[k];
        }

        Fit climb(double[] start, Rung last) {
            double[] u = inward(start);
            marquardt(u);
            Fit fit = judge(Rung.LEVENBERG_MARQUARDT);
            if (fit.converged() || last == Rung.LEVENBERG_MARQUARDT) {
                return fit;
            }
            simplex();
            marquardt(best.clone());
            fit = judge(Rung.SIMPLEX);
            return fit.converged() || last == Rung.SIMPLEX ? fit : furtherStarts(u, fit);
        }

        private Fit furtherStarts(double[] u, Fit soFar) {
            SplittableRandom random = new SplittableRandom(0x5ea5L);
            Fit chosen = soFar;
            for (int i = 0; i < FURTHER_STARTS; i++) {
                bestRss = Double.POSITIVE_INFINITY;
                marquardt(further(u, i, random));
                Fit fit = judge(Rung.FURTHER_STARTS);
                boolean better = fit.residualSumOfSquares() < chosen.residualSumOfSquares();
                if (fit.converged() ? better || !chosen.converged() : better && !chosen.converged()) {
                    chosen = fit;
                }
            }
            return new Fit(
                    chosen.parameters(),
                    chosen.standardErrors(),
                    chosen.covariance(),
                    chosen.residualSumOfSquares(),
                    chosen.residualSd(),
                    chosen.atBound(),
                    chosen.converged(),
                    chosen.reason(),
                    evaluations,
                    Rung.FURTHER_STARTS);
        }

        /** Powers of ten first (a start in the wrong unit is the commonest bad start), then lognormal factors. */
        private double[] further(double[] u, int i, SplittableRandom random) {
            double[] powers = {0.1, 0.01, 10, 0.001, 100, 1000};
            double[] next = new double[k];
            for (int j = 0; j < k; j++) {
                double factor = i < powers.length ? powers[i] : Math.exp(1.5 * random.nextGaussian());
                boolean bounded = !Double.isInfinite(lower[j]);
                next[j] = bounded ? Math.PI * (random.nextDouble() - 0.5) : u[j] * factor;
            }
            return next;
        }

        private void marquardt(double[] u) {
            for (int j = 0; j < k; j++) {
                scale[j] = Math.max(Math.abs(u[j]), 1e-12);
            }
            LevenbergMarquardtOptimizer optimizer = new LevenbergMarquardtOptimizer()
                    .withCostRelativeTolerance(1e-13)
                    .withParameterRelativeTolerance(1e-11)
                    .withOrthoTolerance(1e-13);
            try {
                optimizer.optimize(LeastSquaresFactory.create(
                        this, new ArrayRealVector(n), new ArrayRealVector(u), null, EVALUATIONS, EVALUATIONS));
            } catch (MathIllegalStateException | MathIllegalArgumentException stopped) {
                // out of evaluations, or no further progress at rounding level: judge() looks at the best point
            }
        }

        private void simplex() {
            double[] steps = new double[k];
            for (int j = 0; j < k; j++) {
                steps[j] = best[j] == 0 ? 0.1 : 0.1 * Math.abs(best[j]);
            }
            try {
                new SimplexOptimizer(1e-12, 1e-30)
                        .optimize(
                                new MaxEval(SIMPLEX_EVALUATIONS),
                                new ObjectiveFunction(u -> rss(u, e)),
                                GoalType.MINIMIZE,
                                new InitialGuess(best.clone()),
                                new NelderMeadSimplex(steps));
            } catch (MathIllegalStateException outOfEvaluations) {
                // the best point seen is kept
            }
        }

        /** Residuals at u, remembering the best point seen. */
        private double rss(double[] u, double[] into) {
            outward(u, p);
            residuals.at(p, into);
            evaluations++;
            double sum = 0;
            for (int i = 0; i < n; i++) {
                if (!(Math.abs(into[i]) < NOT_A_VALUE)) {
                    into[i] = NOT_A_VALUE;
                }
                sum += into[i] * into[i];
            }
            if (sum < bestRss || best.length == 0) {
                bestRss = sum;
                best = u.clone();
            }
            return sum;
        }

        @Override
        public Pair<RealVector, RealMatrix> value(RealVector point) {
            double[] u = point.toArray();
            rss(u, e);
            double[] value = e.clone();
            return new Pair<>(new ArrayRealVector(value, false), new Array2DRowRealMatrix(jacobian(u), false));
        }

        private double[][] jacobian(double[] u) {
            double[][] jacobian = new double[n][k];
            double[] moved = u.clone();
            for (int j = 0; j < k; j++) {
                double h = STEP * Math.max(Math.abs(u[j]), 1e-3 * scale[j]);
                moved[j] = u[j] + h;
                double up = moved[j];
                rss(moved, ePlus);
                moved[j] = u[j] - h;
                double width = up - moved[j];
                rss(moved, eMinus);
                moved[j] = u[j];
                for (int i = 0; i < n; i++) {
                    jacobian[i][j] = (ePlus[i] - eMinus[i]) / width;
                }
            }
            return jacobian;
        }

        private Fit judge(Rung rung) {
            double[] u = best.clone();
            double[] parameters = new double[k];
            outward(u, parameters);
            boolean[] bound = onBound(parameters);
            int free = 0;
            for (boolean b : bound) {
                free += b ? 0 : 1;
            }
            double rss = rss(u, e);
            double[][] scaled = new double[n][free];
            double[] lengths = new double[free];
            String reason = rss >= NOT_A_VALUE
                    ? "no finite residuals were found"
                    : slope(jacobian(u), bound, rss, scaled, lengths);
            double[][] covariance = new double[k][k];
            if (reason.isEmpty() && free > 0) {
                reason = covariance(scaled, lengths, u, bound, rss, covariance);
            }
            if (!reason.isEmpty()) {
                Arrays.stream(covariance).forEach(row -> Arrays.fill(row, Double.NaN));
            }
            double[] errors = new double[k];
            for (int j = 0; j < k; j++) {
                errors[j] = Math.sqrt(covariance[j][j]);
            }
            double sd = n > k ? Math.sqrt(rss / (n - k)) : Double.NaN;
            return new Fit(parameters, errors, covariance, rss, sd, bound, reason.isEmpty(), reason, evaluations, rung);
        }

        /** Fills the scaled columns of the free parameters; the reason why the point is not stationary, or "". */
        private String slope(double[][] jacobian, boolean[] bound, double rss, double[][] scaled, double[] lengths) {
            double worst = 0;
            int column = 0;
            for (int j = 0; j < k; j++) {
                if (bound[j]) {
                    continue;
                }
                double length = 0;
                double dot = 0;
                for (int i = 0; i < n; i++) {
                    length = Math.hypot(length, jacobian[i][j]);
                    dot += jacobian[i][j] * e[i];
                }
                if (!(length > 0 && length < NOT_A_VALUE)) {
                    return "the residuals do not depend on parameter " + (j + 1);
                }
                for (int i = 0; i < n; i++) {
                    scaled[i][column] = jacobian[i][j] / length;
                }
                lengths[column++] = length;
                worst = Math.max(worst, rss < 1e-20 * n ? 0 : Math.abs(dot) / (length * Math.sqrt(rss)));
            }
            return worst <= LARGEST_COSINE ? "" : "the sum of squares still falls at the last point";
        }

        private String covariance(
                double[][] scaled, double[] lengths, double[] u, boolean[] bound, double rss, double[][] into) {
            SingularValueDecomposition svd = new SingularValueDecomposition(new Array2DRowRealMatrix(scaled, false));
            double[] s = svd.getSingularValues();
            int free = lengths.length;
            if (n < free || !(s[0] <= LARGEST_CONDITION * s[free - 1])) {
                return "the sum of squares is flat in some direction";
            }
            RealMatrix v = svd.getV();
            double variance = n > k ? rss / (n - k) : Double.NaN;
            for (int a = 0, ja = 0; a < k; a++) {
                for (int b = 0, jb = 0; b < k && !bound[a]; b++) {
                    if (!bound[b]) {
                        double sum = 0;
                        for (int i = 0; i < free; i++) {
                            sum += v.getEntry(ja, i) * v.getEntry(jb, i) / (s[i] * s[i]);
                        }
                        into[a][b] = variance * sum / (lengths[ja] * lengths[jb]) * slope(u, a) * slope(u, b);
                        jb++;
                    }
                }
                ja += bound[a] ? 0 : 1;
            }
            return "";
        }

        private double slope(double[] u, int j) {
            return Double.isInfinite(lower[j]) ? 1 : 0.5 * (upper[j] - lower[j]) * Math.cos(u[j]);
        }

        private boolean[] onBound(double[] parameters) {
            boolean[] bound = new boolean[k];
            for (int j = 0; j < k; j++) {
                double margin = AT_BOUND * (upper[j] - lower[j]);
                bound[j] = !Double.isInfinite(lower[j])
                        && (parameters[j] < lower[j] + margin || parameters[j] > upper[j] - margin);
            }
            return bound;
        }

        private void outward(double[] u, double[] into) {
            for (int j = 0; j < k; j++) {
                into[j] = Double.isInfinite(lower[j])
                        ? u[j]
                        : 0.5 * (lower[j] + upper[j]) + 0.5 * (upper[j] - lower[j]) * Math.sin(u[j]);
            }
        }

        private double[] inward(double[] parameters) {
            double[] u = new double[k];
            for (int j = 0; j < k; j++) {
                double x = (2 * parameters[j] - lower[j] - upper[j]) / (upper[j] - lower[j]);
                u[j] = Double.isInfinite(lower[j]) ? parameters[j] : Math.asin(Math.max(-0.999, Math.min(0.999, x)));
            }
            return u;
        }
    }
}
