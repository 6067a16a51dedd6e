package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;
import static org.assertj.core.api.Assertions.withinPercentage;

import java.util.Random;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.apache.commons.math3.optim.MaxEval;
import org.apache.commons.math3.optim.nonlinear.scalar.GoalType;
import org.apache.commons.math3.optim.univariate.BrentOptimizer;
import org.apache.commons.math3.optim.univariate.SearchInterval;
import org.apache.commons.math3.optim.univariate.UnivariateObjectiveFunction;
import org.apache.commons.math3.optim.univariate.UnivariatePointValuePair;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.junit.jupiter.params.provider.ValueSource;

class SurplusProductionTest {
    /** Laws over the shapes and scales met; seed fixed. */
    static Stream<SurplusProduction> laws() {
        Random random = new Random(4711);
        double[] shapes = {0, 1e-12, 1e-9, 1e-4, 0.188115, 0.5, 1, 2, 4};
        return IntStream.range(0, 45).mapToObj(i -> {
            double r = 0.05 + 1.5 * random.nextDouble();
            double capacity = Math.pow(10, -4 + 12 * random.nextDouble());
            return new SurplusProduction(r, capacity, shapes[i % shapes.length]);
        });
    }

    /** Pella–Tomlinson ratios, computed; the reference prints four to six digits. */
    @ParameterizedTest
    @CsvSource({
        "0, 0.367879, 0.367879, 1, 5e-7",
        "0.188115, 0.4, 0.3367, 0.8417, 5e-5",
        "0.5, 0.444444, 0.296296, 0.666667, 5e-7",
        "1, 0.5, 0.25, 0.5, 5e-7",
        "2, 0.577350, 0.192450, 0.333333, 5e-7"
    })
    void referencePointsFollowTheShape(double n, double bmsy, double msy, double fmsy, double digits) {
        SurplusProduction law = new SurplusProduction(0.4, 1000, n);
        assertThat(law.bmsy() / 1000).isCloseTo(bmsy, within(digits));
        assertThat(law.msy() / 400).isCloseTo(msy, within(digits));
        assertThat(law.fmsy() / 0.4).isCloseTo(fmsy, within(digits));
    }

    @ParameterizedTest
    @MethodSource("laws")
    void msyIsTheMaximumOfGrowth(SurplusProduction law) {
        UnivariatePointValuePair best = new BrentOptimizer(1e-9, 1e-30)
                .optimize(
                        new MaxEval(1000),
                        GoalType.MAXIMIZE,
                        new UnivariateObjectiveFunction(law::rate),
                        new SearchInterval(0, law.capacity()));
        assertThat(law.msy()).isCloseTo(best.getValue(), withinPercentage(1e-10));
        assertThat(law.bmsy()).isCloseTo(best.getPoint(), withinPercentage(1e-4));
        assertThat(law.rate(law.bmsy())).isCloseTo(law.msy(), withinPercentage(1e-11));
        assertThat(law.slope(law.bmsy()) / law.r()).isCloseTo(0, within(1e-14));
    }

    @ParameterizedTest
    @MethodSource("laws")
    void referencePointsGoThereAndBack(SurplusProduction law) {
        SurplusProduction back = SurplusProduction.fromReferencePoints(law.msy(), law.fmsy(), law.shape());
        assertThat(back.r()).isCloseTo(law.r(), withinPercentage(1e-11));
        assertThat(back.capacityTonnes()).isCloseTo(law.capacityTonnes(), withinPercentage(1e-11));
    }

    @ParameterizedTest
    @MethodSource("laws")
    void scalesWithCapacity(SurplusProduction law) {
        SurplusProduction larger = new SurplusProduction(law.r(), 8 * law.capacityTonnes(), law.shape());
        for (double state : new double[] {1e-9, 0.1, 0.5, 1, 3}) {
            double biomass = state * law.capacity();
            assertThat(larger.rate(8 * biomass)).isEqualTo(8 * law.rate(biomass));
            assertThat(larger.slope(8 * biomass)).isEqualTo(law.slope(biomass));
        }
        assertThat(larger.msy()).isEqualTo(8 * law.msy());
    }

    @ParameterizedTest
    @MethodSource("laws")
    void slopeIsTheDerivative(SurplusProduction law) {
        for (double state : new double[] {0.01, 0.3, 0.9, 1, 2}) {
            double biomass = state * law.capacity();
            double h = 1e-5 * biomass;
            double difference = (law.rate(biomass + h) - law.rate(biomass - h)) / (2 * h);
            double scale = law.r() * (1 + Math.pow(state, law.shape()));
            assertThat(law.slope(biomass)).isCloseTo(difference, within(1e-8 * scale));
        }
    }

    /** The limits of the formulas, written out: Fox and Graham–Schaefer. */
    @Test
    void foxAndSchaeferAreMembers() {
        SurplusProduction fox = new SurplusProduction(0.3, 500, 0);
        assertThat(fox.rate(100)).isCloseTo(0.3 * 100 * Math.log(5), within(1e-12));
        assertThat(fox.slope(100)).isCloseTo(0.3 * (Math.log(5) - 1), within(1e-14));
        assertThat(fox.slope(0)).isEqualTo(Double.POSITIVE_INFINITY);
        SurplusProduction schaefer = new SurplusProduction(0.3, 500, 1);
        assertThat(schaefer.rate(100)).isCloseTo(0.3 * 100 * 0.8, within(1e-13));
        assertThat(schaefer.slope(100)).isCloseTo(0.3 * (1 - 0.4), within(1e-15));
        assertThat(schaefer.slope(0)).isEqualTo(0.3);
    }

    /** To first order in n the law differs from Fox by r n B ln²(K/B)/2 · (−1). */
    @ParameterizedTest
    @ValueSource(doubles = {1e-5, 1e-7, 1e-9, 1e-12, 1e-18, 1e-300})
    void shapesNearZeroApproachFoxSmoothly(double n) {
        double log = Math.log(10);
        double expected = 0.4 * 100 * (log - n * log * log / 2 + n * n * log * log * log / 6);
        assertThat(new SurplusProduction(0.4, 1000, n).rate(100)).isCloseTo(expected, withinPercentage(1e-12));
        assertThat(new SurplusProduction(0.4, 1000, n).bmsy())
                .isCloseTo(1000 * Math.exp(-1 + n / 2 - n * n / 3), withinPercentage(1e-12));
    }

    @Test
    void anEmptyLakeGrowsNothing() {
        for (double n : new double[] {0, 1e-9, 1, 3}) {
            SurplusProduction law = new SurplusProduction(0.4, 1000, n);
            assertThat(law.rate(0)).isZero();
            assertThat(law.rate(-1)).isZero();
            assertThat(law.slope(0)).isEqualTo(0.4 / n);
            assertThat(law.perCapita(0)).isEqualTo(0.4 / n);
            assertThat(law.rate(1000)).isZero();
        }
    }

    @Test
    void rejectsWhatIsOutOfRangeWithTheInequality() {
        assertThatThrownBy(() -> new SurplusProduction(0, 1000, 1))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessage("0 < r < infinity is violated: r = 0.0");
        assertThatThrownBy(() -> new SurplusProduction(0.4, Double.POSITIVE_INFINITY, 1))
                .hasMessage("0 < K < infinity is violated: K = Infinity");
        assertThatThrownBy(() -> new SurplusProduction(0.4, 1000, -0.1))
                .hasMessage("0 <= n < infinity is violated: n = -0.1");
        assertThatThrownBy(() -> new SurplusProduction(0.4, 1000, Double.NaN)).hasMessageContaining("n = NaN");
        assertThatThrownBy(() -> SurplusProduction.fromReferencePoints(-5, 0.2, 1))
                .hasMessage("0 < MSY < infinity is violated: MSY = -5.0");
        assertThatThrownBy(() -> SurplusProduction.fromReferencePoints(5, 0, 1)).hasMessageContaining("FMSY = 0.0");
    }
}
