package org.merewarden.core.inference.statespace;

import java.util.random.RandomGenerator;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.special.Gamma;

/**
 * Multivariate t with {@value #FREEDOM} degrees of freedom, as a proposal.
 *
 * <pre>
 *   u = m + A g/√(χ²_ν/ν),   A = E √Λ,  scale Σ = E Λ Eᵀ
 *   ln p(u) = c − ½ ln det Σ − (ν + d)/2 · ln(1 + |A⁻¹(u − m)|²/ν)
 * </pre>
 *
 * <p>Eigenvalues of Σ are held between {@value #LEAST} and {@value #MOST}: outer parameters have a standard normal prior,
 * so no direction is wider by much, and a direction without spread would never be searched again.
 */
final class StudentT {
    static final int FREEDOM = 5;
    private static final double LEAST = 1e-4;
    private static final double MOST = 4;

    private final double[] mean;
    private final double[][] axes;
    private final double[] lengths;
    private final double logConstant;
    private final double[] scratch;

    StudentT(double[] mean, double[][] scale) {
        int d = mean.length;
        this.mean = mean.clone();
        EigenDecomposition eigen = new EigenDecomposition(new Array2DRowRealMatrix(scale));
        axes = eigen.getV().transpose().getData();
        lengths = eigen.getRealEigenvalues();
        double logDeterminant = 0;
        for (int k = 0; k < d; k++) {
            lengths[k] = Math.sqrt(Math.max(LEAST, Math.min(MOST, lengths[k])));
            logDeterminant += 2 * Math.log(lengths[k]);
        }
        logConstant = Gamma.logGamma((FREEDOM + d) / 2.0)
                - Gamma.logGamma(FREEDOM / 2.0)
                - 0.5 * d * Math.log(FREEDOM * Math.PI)
                - 0.5 * logDeterminant;
        scratch = new double[d];
    }

    /** The prior's shape: mean 0, unit scale. */
    static StudentT standard(int dimension) {
        double[][] unit = new double[dimension][dimension];
        for (int k = 0; k < dimension; k++) {
            unit[k][k] = 1;
        }
        return new StudentT(new double[dimension], unit);
    }

    /** The direction of the largest eigenvalue. */
    double[] longestAxis() {
        int longest = 0;
        for (int k = 1; k < lengths.length; k++) {
            longest = lengths[k] > lengths[longest] ? k : longest;
        }
        return axes[longest].clone();
    }

    void draw(RandomGenerator random, double[] out) {
        double chiSquare = 0;
        for (int k = 0; k < FREEDOM; k++) {
            double g = random.nextGaussian();
            chiSquare += g * g;
        }
        double stretch = Math.sqrt(FREEDOM / chiSquare);
        System.arraycopy(mean, 0, out, 0, mean.length);
        for (int k = 0; k < mean.length; k++) {
            double along = stretch * lengths[k] * random.nextGaussian();
            for (int i = 0; i < mean.length; i++) {
                out[i] += along * axes[k][i];
            }
        }
    }

    double logDensity(double[] u) {
        double distance = 0;
        for (int i = 0; i < mean.length; i++) {
            scratch[i] = u[i] - mean[i];
        }
        for (int k = 0; k < mean.length; k++) {
            double along = 0;
            for (int i = 0; i < mean.length; i++) {
                along += axes[k][i] * scratch[i];
            }
            distance += along * along / (lengths[k] * lengths[k]);
        }
        return logConstant - 0.5 * (FREEDOM + mean.length) * Math.log1p(distance / FREEDOM);
    }
}
