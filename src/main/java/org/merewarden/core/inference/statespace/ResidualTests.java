package org.merewarden.core.inference.statespace;

import java.util.Arrays;
import org.apache.commons.math3.util.CombinatoricsUtils;
import org.jspecify.annotations.Nullable;

/** Whether residuals in order of time look independent. */
final class ResidualTests {
    static final int LEAST_VALUES = 6;

    private ResidualTests() {}

    /**
     * Runs test of Wald &amp; Wolfowitz 1940 (Ann. Math. Stat. 11: 147–162), exact given the numbers of both signs.
     *
     * <pre>
     *   P(R = 2k)     = 2 C(m−1, k−1) C(n−1, k−1) / C(m+n, m)
     *   P(R = 2k + 1) = (C(m−1, k) C(n−1, k−1) + C(m−1, k−1) C(n−1, k)) / C(m+n, m)
     *   p = min(1, 2 min(P(R ≤ r), P(R ≥ r)))
     * </pre>
     *
     * @return p; null with fewer than {@value #LEAST_VALUES} values or with one sign only. 0 counts as positive.
     */
    static @Nullable Double runs(double[] residuals) {
        int m = (int) Arrays.stream(residuals).filter(e -> e >= 0).count();
        int n = residuals.length - m;
        if (residuals.length < LEAST_VALUES || m == 0 || n == 0) {
            return null;
        }
        int r = 1;
        for (int i = 1; i < residuals.length; i++) {
            r += residuals[i] >= 0 == residuals[i - 1] >= 0 ? 0 : 1;
        }
        double fewer = 0;
        double more = 0;
        for (int k = 2; k <= m + n; k++) {
            double probability = ofRuns(k, m, n);
            fewer += k <= r ? probability : 0;
            more += k >= r ? probability : 0;
        }
        return Math.min(1, 2 * Math.min(fewer, more));
    }

    private static double ofRuns(int r, int m, int n) {
        int k = r / 2;
        double all = logChoose(m + n, m);
        return r % 2 == 0
                ? 2 * Math.exp(logChoose(m - 1, k - 1) + logChoose(n - 1, k - 1) - all)
                : Math.exp(logChoose(m - 1, k) + logChoose(n - 1, k - 1) - all)
                        + Math.exp(logChoose(m - 1, k - 1) + logChoose(n - 1, k) - all);
    }

    private static double logChoose(int n, int k) {
        return k > n ? Double.NEGATIVE_INFINITY : CombinatoricsUtils.binomialCoefficientLog(n, k);
    }

    /**
     * Lag-1 correlation Σ (e_i − ē)(e_{i+1} − ē)/Σ (e_i − ē)² of successive values, whatever the time between them.
     *
     * @return null with fewer than {@value #LEAST_VALUES} values or where all are equal
     */
    static @Nullable Double lagOne(double[] residuals) {
        double mean = Arrays.stream(residuals).average().orElse(0);
        double squares = 0;
        double products = 0;
        for (int i = 0; i < residuals.length; i++) {
            squares += (residuals[i] - mean) * (residuals[i] - mean);
            products += i == 0 ? 0 : (residuals[i] - mean) * (residuals[i - 1] - mean);
        }
        return residuals.length < LEAST_VALUES || !(squares > 0) ? null : (Double) (products / squares);
    }

    /** Null without any. */
    static @Nullable Double mean(double[] residuals) {
        return residuals.length == 0
                ? null
                : (Double) Arrays.stream(residuals).average().orElseThrow();
    }

    /** Standard deviation, n − 1 below; null with fewer than 2. */
    static @Nullable Double sd(double[] residuals) {
        double mean = Arrays.stream(residuals).average().orElse(0);
        double squares =
                Arrays.stream(residuals).map(e -> (e - mean) * (e - mean)).sum();
        return residuals.length < 2 ? null : (Double) Math.sqrt(squares / (residuals.length - 1));
    }
}
