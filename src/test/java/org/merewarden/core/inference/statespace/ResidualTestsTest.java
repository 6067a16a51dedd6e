package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.Map;
import java.util.TreeMap;
import org.junit.jupiter.api.Test;

class ResidualTestsTest {
    private static double[] signs(String signs) {
        return signs.chars().mapToDouble(c -> c == '+' ? 0.7 : -0.3).toArray();
    }

    /** By hand: of the 15 orders of 4 and 2 signs, 2, 4, 6 and 3 have 2, 3, 4 and 5 runs. */
    @Test
    void fourAndTwoSignsByHand() {
        assertThat(ResidualTests.runs(signs("++++--"))).isEqualTo(2 * 2 / 15.0, offset(1e-12));
        assertThat(ResidualTests.runs(signs("++--++"))).isEqualTo(2 * 6 / 15.0, offset(1e-12));
        assertThat(ResidualTests.runs(signs("+-+++-"))).isEqualTo(1, offset(1e-12));
        assertThat(ResidualTests.runs(signs("+-+-++"))).isEqualTo(2 * 3 / 15.0, offset(1e-12));
    }

    /** Every order of 5 and 4 signs written out and counted. */
    @Test
    void theDistributionIsThatOfAllOrders() {
        Map<Integer, Integer> counts = new TreeMap<>();
        int all = 0;
        for (int bits = 0; bits < 512; bits++) {
            if (Integer.bitCount(bits) == 5) {
                counts.merge(runs(bits), 1, Integer::sum);
                all++;
            }
        }
        for (int bits = 0; bits < 512; bits++) {
            if (Integer.bitCount(bits) == 5) {
                int r = runs(bits);
                double fewer = 0;
                double more = 0;
                for (Map.Entry<Integer, Integer> entry : counts.entrySet()) {
                    fewer += entry.getKey() <= r ? entry.getValue() : 0;
                    more += entry.getKey() >= r ? entry.getValue() : 0;
                }
                double expected = Math.min(1, 2 * Math.min(fewer, more) / all);
                assertThat(ResidualTests.runs(values(bits))).isEqualTo(expected, offset(1e-12));
            }
        }
    }

    private static int runs(int bits) {
        int runs = 1;
        for (int i = 1; i < 9; i++) {
            runs += (bits >> i & 1) == (bits >> (i - 1) & 1) ? 0 : 1;
        }
        return runs;
    }

    private static double[] values(int bits) {
        double[] values = new double[9];
        for (int i = 0; i < 9; i++) {
            values[i] = (bits >> i & 1) == 1 ? i + 1 : -i - 1;
        }
        return values;
    }

    @Test
    void tooFewValuesOrOneSignSayNothing() {
        assertThat(ResidualTests.runs(signs("++--+"))).isNull();
        assertThat(ResidualTests.runs(signs("++++++++"))).isNull();
        assertThat(ResidualTests.runs(new double[10])).isNull();
        assertThat(ResidualTests.runs(new double[0])).isNull();
        assertThat(ResidualTests.lagOne(new double[] {1, 2, 3, 4, 5})).isNull();
        assertThat(ResidualTests.lagOne(new double[] {2, 2, 2, 2, 2, 2})).isNull();
        assertThat(ResidualTests.mean(new double[0])).isNull();
        assertThat(ResidualTests.sd(new double[] {3})).isNull();
    }

    /** By hand: mean 3.5, Σ squares 17.5, Σ products 3.75 + 0.75 − 0.25 + 0.75 + 3.75 = 8.75. */
    @Test
    void lagOneByHand() {
        double[] rising = {1, 2, 3, 4, 5, 6};
        assertThat(ResidualTests.lagOne(rising)).isEqualTo(0.5, offset(1e-12));
        assertThat(ResidualTests.lagOne(new double[] {1, -1, 1, -1, 1, -1})).isEqualTo(-5 / 6.0, offset(1e-12));
        assertThat(ResidualTests.mean(rising)).isEqualTo(3.5, offset(1e-12));
        assertThat(ResidualTests.sd(rising)).isEqualTo(Math.sqrt(3.5), offset(1e-12));
    }

    @Test
    void manyValuesDoNotOverflow() {
        double[] many = new double[300];
        for (int i = 0; i < many.length; i++) {
            many[i] = i < 150 ? 1 : -1;
        }
        assertThat(ResidualTests.runs(many)).isBetween(0.0, 1e-80);
    }
}
