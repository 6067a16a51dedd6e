package org.merewarden.core.inference.statespace;

import java.util.Arrays;
import java.util.random.RandomGenerator;

/**
 * A symmetric matrix with a band of half-width 2 and a few dense border rows, its Cholesky factor and what follows.
 *
 * <pre>
 *   H = | A  Wᵀ |,   A = L D Lᵀ,   V = L⁻¹ Wᵀ,   S = Q − Vᵀ D⁻¹ V = C Cᵀ
 *       | W  Q  |
 *   ln det H = Σ ln D + 2 Σ ln C;   M Mᵀ = H with M = | L D^½        0 |
 *                                                     | Vᵀ D^(−½)    C |
 * </pre>
 *
 * <p>A: N × N; W: J × N; Q: J × J. O(N (J + 1)²) each; nothing is allocated after construction.
 */
final class BorderedBand {
    final int band;
    final int borders;

    /** Diagonal of A, then first and second lower diagonals: below[i] = A[i][i − 1], below2[i] = A[i][i − 2]. */
    final double[] diagonal;

    final double[] below;
    final double[] below2;
    final double[][] border;
    final double[][] corner;

    private final double[] perPivot;
    private final double[] l1;
    private final double[] l2;
    private final double[][] v;
    private final double[][] c;
    private final double[] half;

    BorderedBand(int band, int borders) {
        this.band = band;
        this.borders = borders;
        diagonal = new double[band];
        below = new double[band];
        below2 = new double[band];
        border = new double[borders][band];
        corner = new double[borders][borders];
        perPivot = new double[band];
        l1 = new double[band];
        l2 = new double[band];
        v = new double[borders][band];
        c = new double[borders][borders];
        half = new double[borders];
    }

    void clear() {
        Arrays.fill(diagonal, 0);
        Arrays.fill(below, 0);
        Arrays.fill(below2, 0);
        for (int j = 0; j < borders; j++) {
            Arrays.fill(border[j], 0);
            Arrays.fill(corner[j], 0);
        }
    }

    /** False where the matrix is not positive definite to rounding. */
    boolean factor() {
        double per1 = 1;
        double per2 = 1;
        double previous = 0;
        for (int i = 0; i < band; i++) {
            double second = below2[i] * per2;
            double rest = below[i] - below2[i] * previous;
            double first = rest * per1;
            double pivot = diagonal[i] - second * below2[i] - first * rest;
            if (!(pivot > 1e-13 * diagonal[i])) {
                return false;
            }
            l2[i] = second;
            l1[i] = first;
            previous = first;
            per2 = per1;
            per1 = 1 / pivot;
            perPivot[i] = per1;
        }
        return factorCorner();
    }

    private boolean factorCorner() {
        for (int j = 0; j < borders; j++) {
            forward(border[j], v[j]);
        }
        for (int j = 0; j < borders; j++) {
            for (int k = 0; k <= j; k++) {
                double sum = corner[j][k] - weighted(v[j], v[k]);
                for (int m = 0; m < k; m++) {
                    sum -= c[j][m] * c[k][m];
                }
                if (j == k && !(sum > 1e-13 * corner[j][j])) {
                    return false;
                }
                c[j][k] = j == k ? Math.sqrt(sum) : sum / c[k][k];
            }
        }
        return true;
    }

    private void forward(double[] from, double[] to) {
        double t1 = 0;
        double t2 = 0;
        for (int i = 0; i < band; i++) {
            double t = from[i] - l1[i] * t1 - l2[i] * t2;
            to[i] = t;
            t2 = t1;
            t1 = t;
        }
    }

    private double weighted(double[] a, double[] b) {
        double sum = 0;
        for (int i = 0; i < band; i++) {
            sum += a[i] * b[i] * perPivot[i];
        }
        return sum;
    }

    /** ln det H of the last factor. */
    double logDeterminant() {
        double sum = 0;
        double product = 1;
        for (int i = 0; i < band; i++) {
            product *= perPivot[i];
            if (product > 1e100 || product < 1e-100) {
                sum -= Math.log(product);
                product = 1;
            }
        }
        for (int j = 0; j < borders; j++) {
            sum += 2 * Math.log(c[j][j]);
        }
        return sum - Math.log(product);
    }

    /** Solves H out = rhs by the last factor; both have N + J entries and may be the same array. */
    void solve(double[] rhs, double[] out) {
        forward(rhs, out);
        for (int j = 0; j < borders; j++) {
            double sum = rhs[band + j] - weighted(v[j], out);
            for (int k = 0; k < j; k++) {
                sum -= c[j][k] * half[k];
            }
            half[j] = sum / c[j][j];
        }
        for (int i = 0; i < band; i++) {
            out[i] *= perPivot[i];
        }
        backward(out);
    }

    /** out ~ N(0, H⁻¹) by the last factor; returns outᵀ H out. */
    double sample(RandomGenerator random, double[] out) {
        double squares = 0;
        for (int i = 0; i < band; i++) {
            double g = random.nextGaussian();
            squares += g * g;
            out[i] = g * Math.sqrt(perPivot[i]);
        }
        for (int j = 0; j < borders; j++) {
            half[j] = random.nextGaussian();
            squares += half[j] * half[j];
        }
        backward(out);
        return squares;
    }

    /** out = H v with the matrix itself, not its factor. */
    void multiply(double[] v, double[] out) {
        for (int i = 0; i < band; i++) {
            double sum = diagonal[i] * v[i];
            sum += i > 0 ? below[i] * v[i - 1] : 0;
            sum += i > 1 ? below2[i] * v[i - 2] : 0;
            sum += i + 1 < band ? below[i + 1] * v[i + 1] : 0;
            sum += i + 2 < band ? below2[i + 2] * v[i + 2] : 0;
            out[i] = sum;
        }
        for (int j = 0; j < borders; j++) {
            double sum = 0;
            for (int i = 0; i < band; i++) {
                out[i] += border[j][i] * v[band + j];
                sum += border[j][i] * v[i];
            }
            for (int k = 0; k < borders; k++) {
                sum += corner[j][k] * v[band + k];
            }
            out[band + j] = sum;
        }
    }

    /** Takes over the entries of another matrix of the same size and its last factor. */
    void copy(BorderedBand other) {
        copy(other.diagonal, diagonal);
        copy(other.below, below);
        copy(other.below2, below2);
        copy(other.perPivot, perPivot);
        copy(other.l1, l1);
        copy(other.l2, l2);
        for (int j = 0; j < borders; j++) {
            copy(other.border[j], border[j]);
            copy(other.corner[j], corner[j]);
            copy(other.v[j], v[j]);
            copy(other.c[j], c[j]);
        }
    }

    private static void copy(double[] from, double[] to) {
        System.arraycopy(from, 0, to, 0, to.length);
    }

    /** Corner by Cᵀ, then the band by Lᵀ, from {@code half} and out[0 … N − 1]. */
    private void backward(double[] out) {
        for (int j = borders - 1; j >= 0; j--) {
            double sum = half[j];
            for (int k = j + 1; k < borders; k++) {
                sum -= c[k][j] * out[band + k];
            }
            double q = sum / c[j][j];
            out[band + j] = q;
            for (int i = 0; i < band; i++) {
                out[i] -= v[j][i] * perPivot[i] * q;
            }
        }
        double t1 = 0;
        double t2 = 0;
        double f1 = 0;
        double f2 = 0;
        double f22 = 0;
        for (int i = band - 1; i >= 0; i--) {
            double t = out[i] - f1 * t1 - f22 * t2;
            out[i] = t;
            t2 = t1;
            t1 = t;
            f1 = l1[i];
            f22 = f2;
            f2 = l2[i];
        }
    }
}
