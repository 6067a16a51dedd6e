package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.SplittableRandom;
import java.util.stream.IntStream;
import org.apache.commons.math3.distribution.NormalDistribution;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class OverlapTest {
    private static final NormalDistribution STANDARD = new NormalDistribution();

    /**
     * Closed form of two normals (Inman &amp; Bradley 1989, Commun. Stat. Theory Methods 18: 3851–3874, recalled): 2 Φ(−d/2)
     * for equal sds, else from the two points where the densities cross. The sample: 1,000 quantiles, so that only the
     * kernel errs.
     */
    @ParameterizedTest
    @CsvSource({"0,1", "0.5,1", "1,1", "2,1", "0,0.5", "0,0.2", "0,0.05", "1,0.5", "0.6,0.3", "3,0.4", "0,2", "1,3"})
    void agreesWithTheClosedFormOfTwoNormals(double mean, double sd) {
        double[] sample = IntStream.range(0, 1000)
                .mapToDouble(i -> mean + sd * STANDARD.inverseCumulativeProbability((i + 0.5) / 1000))
                .toArray();
        assertThat(Overlap.of(0, 1, sample)).isEqualTo(twoNormals(mean, sd), offset(0.015));
        double[] moved =
                IntStream.range(0, 1000).mapToDouble(i -> 7 + 0.3 * sample[i]).toArray();
        assertThat(Overlap.of(7, 0.3, moved)).isEqualTo(Overlap.of(0, 1, sample), offset(1e-3));
    }

    private static double twoNormals(double mean, double sd) {
        if (sd == 1) {
            return 2 * STANDARD.cumulativeProbability(-Math.abs(mean) / 2);
        }
        double a = 1 - 1 / (sd * sd);
        double b = 2 * mean / (sd * sd);
        double c = -mean * mean / (sd * sd) - 2 * Math.log(sd);
        double root = Math.sqrt(b * b - 4 * a * c);
        double low = Math.min((-b - root) / (2 * a), (-b + root) / (2 * a));
        double high = Math.max((-b - root) / (2 * a), (-b + root) / (2 * a));
        double other = new NormalDistribution(mean, sd).probability(low, high);
        double own = STANDARD.probability(low, high);
        return sd < 1 ? own + 1 - other : other + 1 - own;
    }

    /** The noise of 1,000 draws takes about 0.03 from a full overlap: 20 samples. */
    @Test
    void drawsOfThePriorItselfOverlapAlmostWhole() {
        double sum = 0;
        for (int seed = 0; seed < 20; seed++) {
            SplittableRandom random = new SplittableRandom(seed);
            double[] sample = IntStream.range(0, 1000)
                    .mapToDouble(i -> random.nextGaussian())
                    .toArray();
            sum += Overlap.of(0, 1, sample) / 20;
        }
        assertThat(sum).isBetween(0.96, 0.98);
    }

    @Test
    void oddSamplesGiveANumber() {
        assertThat(Overlap.of(0, 1, new double[] {0.3})).isZero();
        assertThat(Overlap.of(0, 1, new double[] {2, 2, 2, 2})).isZero();
        assertThat(Overlap.of(0, 1, new double[] {0, 0, 0, 0, 1})).isBetween(0.0, 1.0);
        assertThat(Overlap.of(0, 1, new double[] {40, 41, 42})).isZero();
        assertThat(Overlap.of(0, 1e-3, new double[] {-40, 0, 1e6})).isBetween(0.0, 1.0);
    }
}
