package org.merewarden.core.inference.statespace;

import java.util.Arrays;
import java.util.stream.IntStream;
import org.apache.commons.math3.special.Erf;

/**
 * Whether Markov chains agree, and how many independent draws they are worth.
 *
 * <pre>
 *   z = Φ⁻¹((rank − 3/8)/(S + 1/4))                       over all S draws, each chain split in two: M chains of N
 *   W = mean s_m²,  B/N = variance of the chains' means,  V = W (N − 1)/N + B/N
 *   R̂ = √(V/W), the larger of that of z and that of the ranks of |x − median|
 *   ρ_t = 1 − (W − mean s_m² ρ_{t,m})/V,  τ = −1 + 2 Σ P_k,  P_k = ρ_{2k} + ρ_{2k+1} while > 0, made monotone
 *   bulk ESS = S/τ, at most S log₁₀ S
 * </pre>
 *
 * <p>Source: Vehtari et al. 2021, Bayesian Analysis 16: 667–718 (rank-normalised split R̂, bulk ESS, by Geyer's initial
 * monotone sequence). Chains are given as [chain][step], all of one length ≥ 4. Draws without any spread give R̂ = 1 and
 * ESS = S where all are alike, R̂ = +∞ and ESS = 1 where single chains never moved.
 */
final class ChainDiagnostics {
    private ChainDiagnostics() {}

    static double rHat(double[][] chains) {
        double[][] halves = split(chains);
        return Math.max(potential(normalised(halves)), potential(normalised(folded(halves))));
    }

    static double bulkEffectiveSize(double[][] chains) {
        return effectiveSize(normalised(split(chains)));
    }

    private static double[][] split(double[][] chains) {
        int half = chains[0].length / 2;
        double[][] halves = new double[2 * chains.length][];
        for (int c = 0; c < chains.length; c++) {
            int length = chains[c].length;
            halves[2 * c] = Arrays.copyOfRange(chains[c], 0, half);
            halves[2 * c + 1] = Arrays.copyOfRange(chains[c], length - half, length);
        }
        return halves;
    }

    private static double[][] folded(double[][] chains) {
        double[] all = flat(chains);
        Arrays.sort(all);
        int s = all.length;
        double median = 0.5 * (all[(s - 1) / 2] + all[s / 2]);
        return Arrays.stream(chains)
                .map(chain ->
                        Arrays.stream(chain).map(x -> Math.abs(x - median)).toArray())
                .toArray(double[][]::new);
    }

    private static double[] flat(double[][] chains) {
        return Arrays.stream(chains).flatMapToDouble(Arrays::stream).toArray();
    }

    /** Normal scores of the ranks, equal values sharing their mean rank. */
    private static double[][] normalised(double[][] chains) {
        double[] sorted = flat(chains);
        Arrays.sort(sorted);
        return Arrays.stream(chains)
                .map(chain -> Arrays.stream(chain).map(x -> score(x, sorted)).toArray())
                .toArray(double[][]::new);
    }

    private static double score(double x, double[] sorted) {
        int below = firstNotBelow(x, sorted);
        int upTo = firstNotBelow(Math.nextUp(x), sorted);
        double rank = 0.5 * (below + 1 + upTo);
        return Math.sqrt(2) * Erf.erfInv(2 * (rank - 0.375) / (sorted.length + 0.25) - 1);
    }

    private static int firstNotBelow(double x, double[] sorted) {
        int low = 0;
        int high = sorted.length;
        while (low < high) {
            int middle = (low + high) >>> 1;
            if (sorted[middle] < x) {
                low = middle + 1;
            } else {
                high = middle;
            }
        }
        return low;
    }

    private static double potential(double[][] z) {
        double within = within(z);
        return within > 0 ? Math.sqrt(pooled(z, within) / within) : spread(z) ? Double.POSITIVE_INFINITY : 1;
    }

    private static boolean spread(double[][] z) {
        return Arrays.stream(flat(z)).distinct().count() > 1;
    }

    private static double within(double[][] z) {
        return Arrays.stream(z)
                .mapToDouble(ChainDiagnostics::variance)
                .average()
                .orElseThrow();
    }

    private static double pooled(double[][] z, double within) {
        double[] means = Arrays.stream(z).mapToDouble(ChainDiagnostics::mean).toArray();
        return within * (z[0].length - 1) / z[0].length + variance(means);
    }

    private static double mean(double[] v) {
        return Arrays.stream(v).sum() / v.length;
    }

    /** Σ v_i v_{i+lag}/N. */
    private static double product(double[] v, int lag) {
        double sum = 0;
        for (int i = 0; i + lag < v.length; i++) {
            sum += v[i] * v[i + lag];
        }
        return sum / v.length;
    }

    private static double variance(double[] v) {
        return product(centred(v), 0) * v.length / (v.length - 1);
    }

    private static double effectiveSize(double[][] z) {
        double within = within(z);
        double size = (double) z.length * z[0].length;
        if (!(within > 0)) {
            return spread(z) ? 1 : size;
        }
        double pooled = pooled(z, within);
        double[][] centred = Arrays.stream(z).map(ChainDiagnostics::centred).toArray(double[][]::new);
        double tau = -1;
        double last = Double.POSITIVE_INFINITY;
        for (int lag = 0; lag + 1 < z[0].length; lag += 2) {
            double pair = correlation(centred, lag, within, pooled) + correlation(centred, lag + 1, within, pooled);
            if (!(pair > 0)) {
                break;
            }
            last = Math.min(last, pair);
            tau += 2 * last;
        }
        return Math.min(size / Math.max(tau, 1e-3), size * Math.log10(size));
    }

    private static double[] centred(double[] v) {
        double mean = mean(v);
        return Arrays.stream(v).map(x -> x - mean).toArray();
    }

    private static double correlation(double[][] z, int lag, double within, double pooled) {
        double unbiased = (double) z[0].length / (z[0].length - 1);
        double mean = IntStream.range(0, z.length)
                .mapToDouble(m -> product(z[m], lag))
                .average()
                .orElseThrow();
        return 1 - (within - unbiased * mean) / pooled;
    }
}
