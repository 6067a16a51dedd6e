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
import org.merewarden.core.inference.LeastSquares.Fit;
import org.merewarden.core.inference.LeastSquares.Residuals;
import org.merewarden.core.inference.LeastSquares.Rung;

/**
 * One fit's working space and ladder for {@link LeastSquares}, where equation, symbols and accuracy stand; u are the
 * unbounded coordinates of the parameters. Confined to one thread.
 */
final class LeastSquaresSearch implements MultivariateJacobianFunction {
    private static final double COSINE_PER_ROOT_TOLERANCE = 30;
    private static final double LARGEST_CONDITION = 1e7;
    private static final double AT_BOUND = 1e-5;
    private static final double NOT_A_VALUE = 1e100;
    private static final double STEP = Math.cbrt(Math.ulp(1.0));
    private static final int SHARP_EVALUATIONS = 1000;
    private static final int COARSE_EVALUATIONS = 200;
    private static final int SIMPLEX_EVALUATIONS = 4000;
    private static final int FURTHER_STARTS = 24;

    private final Residuals residuals;
    private final double[] lower;
    private final double[] upper;
    private final double tolerance;
    private final int k;
    private final int n;
    private final double[] p;
    private final double[] e;
    private final double[] ePlus;
    private final double[] eMinus;
    private final double[] leastScale;
    private double[] best = {};
    private double bestRss = Double.POSITIVE_INFINITY;
    private int evaluations;

    LeastSquaresSearch(Residuals residuals, double[] lower, double[] upper, double tolerance) {
        this.tolerance = tolerance;
        this.residuals = residuals;
        this.lower = lower;
        this.upper = upper;
        k = lower.length;
        n = residuals.count();
        p = new double[k];
        e = new double[n];
        ePlus = new double[n];
        eMinus = new double[n];
        leastScale = new double[k];
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
            // angles of bounded parameters are of order 1, however near 0 they are
            leastScale[j] = Double.isInfinite(lower[j]) ? Math.max(1e-3 * Math.abs(u[j]), 1e-15) : 1;
        }
        LevenbergMarquardtOptimizer optimizer = new LevenbergMarquardtOptimizer()
                .withCostRelativeTolerance(tolerance)
                .withParameterRelativeTolerance(100 * tolerance)
                .withOrthoTolerance(tolerance);
        int most = tolerance < LeastSquares.COARSE ? SHARP_EVALUATIONS : COARSE_EVALUATIONS;
        try {
            optimizer.optimize(
                    LeastSquaresFactory.create(this, new ArrayRealVector(n), new ArrayRealVector(u), null, most, most));
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
        outward(u, p);
        if (residuals.jacobian(p, jacobian)) {
            for (int j = 0; j < k; j++) {
                double slope = slope(u, j);
                for (int i = 0; i < n; i++) {
                    jacobian[i][j] *= slope;
                }
            }
            return jacobian;
        }
        double[] moved = u.clone();
        for (int j = 0; j < k; j++) {
            double h = STEP * Math.max(Math.abs(u[j]), leastScale[j]);
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
        String reason =
                rss >= NOT_A_VALUE ? "no finite residuals were found" : slope(jacobian(u), bound, rss, scaled, lengths);
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
        return worst <= COSINE_PER_ROOT_TOLERANCE * Math.sqrt(tolerance)
                ? ""
                : "the sum of squares still falls at the last point";
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
