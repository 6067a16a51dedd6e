package org.merewarden.core.inference.statespace;

import java.util.Arrays;

/**
 * Shape k̂ of a generalised Pareto distribution fitted to the largest importance weights.
 *
 * <pre>
 *   tail: the M = min(S/5, 3 √S) largest of S weights, as exceedances y over the next one
 *   b_j = 1/y_M + (1 − √(m/(j − ½)))/(3 y_*),  j = 1 … m,  m = 30 + ⌊√M⌋,  y_* first quartile
 *   k(b) = mean ln(1 − b y),  profile log likelihood L(b) = M (ln(−b/k) − k − 1),   b̂ = Σ b_j softmax L(b_j)
 *   k̂ = (M k(b̂) + 5)/(M + 10)
 * </pre>
 *
 * <p>Source: Vehtari et al. 2024, J. Mach. Learn. Res. 25(72), with the estimator of Zhang &amp; Stephens 2009,
 * Technometrics 51: 316–325 and the weak prior at ½ of the former. Under 0.7 the weights can be trusted; under ½ their
 * variance is finite. Edge cases: under 5 tail weights or a tail without spread gives 0 where all weights are alike and
 * +∞ where one weight is all there is.
 */
final class ParetoTail {
    private static final int LEAST_TAIL = 5;

    private ParetoTail() {}

    /** k̂ from ln weights, which need not be normalised; −∞ is a weight of 0. */
    static double shape(double[] logWeights) {
        double[] sorted = logWeights.clone();
        Arrays.sort(sorted);
        int s = sorted.length;
        int m = (int) Math.min(s / 5.0, 3 * Math.sqrt(s));
        double largest = s == 0 ? Double.NaN : sorted[s - 1];
        if (m < LEAST_TAIL || !Double.isFinite(largest)) {
            return Double.POSITIVE_INFINITY;
        }
        double cut = Math.exp(sorted[s - m - 1] - largest);
        double[] y = new double[m];
        for (int i = 0; i < m; i++) {
            y[i] = Math.exp(sorted[s - m + i] - largest) - cut;
        }
        if (!(y[m - 1] > 1e-12)) {
            return 0;
        }
        double quartile = y[(int) (m / 4.0 + 0.5) - 1];
        return quartile > 0 ? (m * fit(y, quartile) + 5) / (m + 10) : Double.POSITIVE_INFINITY;
    }

    private static double fit(double[] y, double quartile) {
        int grid = 30 + (int) Math.sqrt(y.length);
        double[] b = new double[grid];
        double[] likelihood = new double[grid];
        double best = Double.NEGATIVE_INFINITY;
        for (int j = 0; j < grid; j++) {
            b[j] = 1 / y[y.length - 1] + (1 - Math.sqrt(grid / (j + 0.5))) / (3 * quartile);
            double k = meanLog(b[j], y);
            likelihood[j] = y.length * (Math.log(-b[j] / k) - k - 1);
            best = Double.isNaN(likelihood[j]) ? best : Math.max(best, likelihood[j]);
        }
        double sum = 0;
        double weighted = 0;
        for (int j = 0; j < grid; j++) {
            double weight = Double.isNaN(likelihood[j]) ? 0 : Math.exp(likelihood[j] - best);
            sum += weight;
            weighted += weight * b[j];
        }
        return meanLog(weighted / sum, y);
    }

    private static double meanLog(double b, double[] y) {
        double sum = 0;
        for (double each : y) {
            sum += Math.log1p(-b * each);
        }
        return sum / y.length;
    }
}
