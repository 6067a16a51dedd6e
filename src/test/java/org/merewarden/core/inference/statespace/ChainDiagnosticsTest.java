package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;
import static org.assertj.core.data.Percentage.withPercentage;

import java.util.Arrays;
import java.util.SplittableRandom;
import java.util.function.DoubleUnaryOperator;
import org.apache.commons.math3.special.Erf;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

/** Cases whose answer is known, the kinds discussed by Vehtari et al. 2021. */
class ChainDiagnosticsTest {
    private static final int STEPS = 2000;

    /** Chain c: x_{t+1} = ρ x_t + √(1 − ρ²) g, stationary from the start, then shown through a function. */
    private static double[][] chains(double rho, DoubleUnaryOperator shown) {
        SplittableRandom random = new SplittableRandom(17);
        double[][] chains = new double[4][STEPS];
        for (double[] chain : chains) {
            double x = random.nextGaussian();
            for (int t = 0; t < STEPS; t++) {
                chain[t] = shown.applyAsDouble(x);
                x = rho * x + Math.sqrt(1 - rho * rho) * random.nextGaussian();
            }
        }
        return chains;
    }

    @Test
    void independentDrawsAgreeAndCountInFull() {
        double[][] chains = chains(0, x -> x);
        assertThat(ChainDiagnostics.rHat(chains)).isEqualTo(1, offset(0.003));
        assertThat(ChainDiagnostics.bulkEffectiveSize(chains)).isCloseTo(8000, withPercentage(10));
    }

    /** n (1 − ρ)/(1 + ρ); a spectral density of 8,000 draws is good to about 10 %. */
    @ParameterizedTest
    @ValueSource(doubles = {0.3, 0.6, 0.9})
    void anAutoregressionCountsByItsFormula(double rho) {
        assertThat(ChainDiagnostics.bulkEffectiveSize(chains(rho, x -> x)))
                .isCloseTo(8000 * (1 - rho) / (1 + rho), withPercentage(15));
    }

    /** Alternating chains are worth more than their length, here 3 times, but no more than S log₁₀ S. */
    @Test
    void alternatingChainsCountMoreThanTheirLength() {
        assertThat(ChainDiagnostics.bulkEffectiveSize(chains(-0.5, x -> x))).isCloseTo(24_000, withPercentage(15));
        assertThat(ChainDiagnostics.bulkEffectiveSize(chains(-0.99, x -> x)))
                .isLessThanOrEqualTo(8000 * Math.log10(8000));
    }

    /** Chains of one mean and other spread, which R̂ of the values alone would miss, and a chain moved or drifting. */
    @Test
    void chainsThatDifferAreSeen() {
        double[][] moved = chains(0, x -> x);
        double[][] wider = chains(0, x -> x);
        double[][] drifting = chains(0, x -> x);
        for (int t = 0; t < STEPS; t++) {
            moved[0][t] += 1;
            wider[0][t] *= 3;
            for (double[] chain : drifting) {
                chain[t] += (double) t / STEPS;
            }
        }
        assertThat(ChainDiagnostics.rHat(moved)).isGreaterThan(1.05);
        assertThat(ChainDiagnostics.rHat(wider)).isGreaterThan(1.05);
        assertThat(ChainDiagnostics.rHat(drifting)).isGreaterThan(1.02);
        assertThat(ChainDiagnostics.bulkEffectiveSize(moved)).isLessThan(100);
    }

    /** Φ is the cdf of g, so tan(π (Φ − ½)) is Cauchy: without moments, but the same ranks as the normal. */
    @Test
    void monotoneTransformsChangeNothingHoweverHeavyTheTail() {
        double[][] normal = chains(0.5, x -> x);
        double[][] cauchy = chains(0.5, x -> Math.tan(Math.PI * (0.5 * Erf.erf(x / Math.sqrt(2)))));
        assertThat(ChainDiagnostics.bulkEffectiveSize(cauchy))
                .isEqualTo(ChainDiagnostics.bulkEffectiveSize(normal), offset(1e-9));
        assertThat(ChainDiagnostics.rHat(cauchy)).isEqualTo(1, offset(0.01));
    }

    @Test
    void chainsThatNeverMoveAreSeen() {
        assertThat(ChainDiagnostics.rHat(new double[4][100])).isEqualTo(1);
        assertThat(ChainDiagnostics.bulkEffectiveSize(new double[4][100])).isEqualTo(400);
        double[][] stuck = new double[4][100];
        Arrays.fill(stuck[1], 1);
        assertThat(ChainDiagnostics.rHat(stuck)).isInfinite();
        assertThat(ChainDiagnostics.bulkEffectiveSize(stuck)).isEqualTo(1);
    }
}
