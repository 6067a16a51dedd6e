package org.merewarden.core.inference.statespace;

import java.util.function.ToDoubleFunction;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.linear.RealMatrix;

/**
 * Mode and curvature of ln p(θ, data), as the first proposal around it.
 *
 * <p>Quasi-Newton (BFGS, Nocedal &amp; Wright 2006, ch. 6) with central differences, then the Hessian by second
 * differences; its eigenvalues are held at ½ or more, half of the prior's. Need not be exact: a poor mode makes a poor
 * proposal, which the weights tell.
 */
final class OuterMode {
    private static final double DIFFERENCE = 0.01;
    private static final int MOST_STEPS = 40;
    private static final int MOST_HALVINGS = 12;
    private static final double LONGEST_STEP = 2;
    private static final double FLAT = 0.02;
    private static final double LEAST_CURVATURE = 0.5;

    private final ToDoubleFunction<double[]> logDensity;
    private final int d;
    private final double[] mode;
    private double value;
    private double[] gradient;
    private final double[][] inverse;

    OuterMode(ToDoubleFunction<double[]> logDensity, double[] start) {
        this(logDensity, start, halfUnit(start.length));
    }

    /** {@code inverse}: a positive definite guess of the inverse curvature; it is overwritten. */
    OuterMode(ToDoubleFunction<double[]> logDensity, double[] start, double[][] inverse) {
        this.logDensity = logDensity;
        this.inverse = inverse;
        d = start.length;
        mode = start.clone();
        value = cost(mode);
        gradient = gradient();
        for (int step = 0; step < MOST_STEPS && norm(gradient) > FLAT && advance(); step++) {}
    }

    private static double[][] halfUnit(int d) {
        double[][] result = new double[d][d];
        for (int k = 0; k < d; k++) {
            result[k][k] = 0.5;
        }
        return result;
    }

    double[] mode() {
        return mode.clone();
    }

    /** The inverse curvature at the mode. */
    double[][] covariance() {
        double[][] hessian = hessian();
        for (double[] row : hessian) {
            for (double each : row) {
                if (!Double.isFinite(each)) {
                    return inverse;
                }
            }
        }
        EigenDecomposition eigen = new EigenDecomposition(new Array2DRowRealMatrix(hessian));
        RealMatrix v = eigen.getV();
        double[][] scaled = v.getData();
        for (double[] row : scaled) {
            for (int k = 0; k < d; k++) {
                row[k] /= Math.max(LEAST_CURVATURE, eigen.getRealEigenvalue(k));
            }
        }
        return new Array2DRowRealMatrix(scaled).multiply(v.transpose()).getData();
    }

    private double cost(double[] u) {
        return -logDensity.applyAsDouble(u);
    }

    private double[] gradient() {
        double[] result = new double[d];
        for (int k = 0; k < d; k++) {
            double up = shifted(k, DIFFERENCE, k, 0);
            double down = shifted(k, -DIFFERENCE, k, 0);
            double slope = (up - down) / (2 * DIFFERENCE);
            result[k] = Double.isFinite(slope) ? slope : 0;
        }
        return result;
    }

    private double shifted(int i, double hi, int j, double hj) {
        double[] u = mode.clone();
        u[i] += hi;
        u[j] += hj;
        return cost(u);
    }

    private boolean advance() {
        double[] direction = new double[d];
        double slope = 0;
        for (int i = 0; i < d; i++) {
            for (int j = 0; j < d; j++) {
                direction[i] -= inverse[i][j] * gradient[j];
            }
            slope += direction[i] * gradient[i];
        }
        double share = Math.min(1, LONGEST_STEP / norm(direction));
        for (int halving = 0; halving < MOST_HALVINGS; halving++) {
            double[] trial = mode.clone();
            for (int i = 0; i < d; i++) {
                trial[i] += share * direction[i];
            }
            double next = cost(trial);
            if (next < value + 1e-4 * share * slope) {
                accept(trial, next);
                return true;
            }
            share /= 2;
        }
        return false;
    }

    private void accept(double[] trial, double next) {
        double[] s = new double[d];
        double[] before = gradient;
        for (int i = 0; i < d; i++) {
            s[i] = trial[i] - mode[i];
            mode[i] = trial[i];
        }
        value = next;
        gradient = gradient();
        double[] y = new double[d];
        double sy = 0;
        for (int i = 0; i < d; i++) {
            y[i] = gradient[i] - before[i];
            sy += s[i] * y[i];
        }
        if (sy > 1e-8) {
            update(s, y, sy);
        }
    }

    /** Inverse H ← (I − s yᵀ/sᵀy) H (I − y sᵀ/sᵀy) + s sᵀ/sᵀy. */
    private void update(double[] s, double[] y, double sy) {
        double[] hy = new double[d];
        double yhy = 0;
        for (int i = 0; i < d; i++) {
            for (int j = 0; j < d; j++) {
                hy[i] += inverse[i][j] * y[j];
            }
            yhy += y[i] * hy[i];
        }
        for (int i = 0; i < d; i++) {
            for (int j = 0; j < d; j++) {
                inverse[i][j] += (1 + yhy / sy) * s[i] * s[j] / sy - (hy[i] * s[j] + s[i] * hy[j]) / sy;
            }
        }
    }

    private double[][] hessian() {
        double[] h = new double[d];
        for (int k = 0; k < d; k++) {
            h[k] = Math.max(0.03, Math.min(0.3, 0.3 * Math.sqrt(inverse[k][k])));
        }
        double[][] result = new double[d][d];
        for (int i = 0; i < d; i++) {
            result[i][i] = (shifted(i, h[i], i, 0) - 2 * value + shifted(i, -h[i], i, 0)) / (h[i] * h[i]);
            for (int j = 0; j < i; j++) {
                double mixed = shifted(i, h[i], j, h[j])
                        - shifted(i, h[i], j, -h[j])
                        - shifted(i, -h[i], j, h[j])
                        + shifted(i, -h[i], j, -h[j]);
                result[i][j] = mixed / (4 * h[i] * h[j]);
                result[j][i] = result[i][j];
            }
        }
        return result;
    }

    private static double norm(double[] v) {
        double sum = 0;
        for (double each : v) {
            sum += each * each;
        }
        return Math.sqrt(sum);
    }
}
