package org.merewarden.core.inference;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.data.Offset.offset;

import org.apache.commons.math3.stat.descriptive.rank.Percentile;
import org.apache.commons.math3.stat.descriptive.rank.Percentile.EstimationType;
import org.junit.jupiter.api.Test;

class QuantilesTest {
    private final double[] values = {7, 1, 3, 10, 3.5, -2};

    @Test
    void agreesWithCommonsMathType7() {
        Percentile reference = new Percentile().withEstimationType(EstimationType.R_7);
        for (double p : new double[] {0.01, 0.1, 0.25, 0.5, 0.77, 0.95, 1}) {
            assertThat(Quantiles.of(values, p)).isEqualTo(reference.evaluate(values, 100 * p), offset(1e-12));
        }
        assertThat(Quantiles.of(values, new double[] {0, 0.5})).containsExactly(-2, 3.25);
    }

    @Test
    void leavesItsInputAlone() {
        Quantiles.of(values, 0.5);
        assertThat(values).containsExactly(7, 1, 3, 10, 3.5, -2);
    }

    @Test
    void rejectsWhatHasNoQuantile() {
        assertThatThrownBy(() -> Quantiles.of(new double[0], 0.5)).hasMessageContaining("got 0");
        assertThatThrownBy(() -> Quantiles.of(values, 1.1)).hasMessage("needs 0 <= p <= 1, got 1.1");
        assertThatThrownBy(() -> Quantiles.of(new double[] {1, Double.NaN}, 0.5))
                .hasMessageContaining("NaN");
    }
}
