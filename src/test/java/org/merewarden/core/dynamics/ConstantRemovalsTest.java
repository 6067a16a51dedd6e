package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;
import static org.assertj.core.api.Assertions.withinPercentage;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvFileSource;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

class ConstantRemovalsTest {
    private static final double PERCENT = 100;

    private final SurplusProduction law = new SurplusProduction(0.4, 1000, 1);

    /** Computed at 60 digits by src/test/reference/dynamics_flows.py. */
    @ParameterizedTest
    @CsvFileSource(resources = "/reference/flow_constant_removals.csv", numLinesToSkip = 1)
    void agreesWithSixtyDigits(
            double r, double capacity, double removals, double start, double years, double after, double gone) {
        ConstantRemovals flow = new ConstantRemovals(new SurplusProduction(r, capacity, 1), removals);
        assertThat(flow.after(start, years)).isCloseTo(after, withinPercentage(1e-9 * PERCENT));
        if (gone == Double.POSITIVE_INFINITY) {
            assertThat(flow.extinctionTime(start)).isEqualTo(gone);
        } else {
            assertThat(flow.extinctionTime(start)).isCloseTo(gone, withinPercentage(nearFold(r * capacity, removals)));
        }
    }

    /** Near the fold the time is about π/(r√−Δ), and rounding H/(rK) moves Δ by 1e-16: its condition, in percent. */
    private static double nearFold(double rk, double removals) {
        double delta = 0.25 - removals / rk;
        return (delta < 0 ? Math.max(1e-9, 1e-16 / -delta) : 1e-9) * PERCENT;
    }

    /** Computed values of the reference; it prints eight decimals. */
    @ParameterizedTest
    @CsvSource({"100, 300, 7.5", "101, 500, 73.55638372", "110, 1000, 39.98760051", "75, 200, 6.49641492"})
    void timeToExtinction(double removals, double start, double years) {
        ConstantRemovals flow = new ConstantRemovals(law, removals);
        assertThat(flow.extinctionTime(start)).isCloseTo(years, within(5e-9));
        assertThat(flow.after(start, years * (1 - 1e-7))).isPositive().isLessThan(1e-2);
        assertThat(flow.after(start, years * (1 + 1e-7))).isZero();
        assertThat(flow.after(start, 1e6)).isZero();
    }

    @ParameterizedTest
    @CsvSource({"0, 30", "50, 900", "50, 147", "75, 1200", "99.99, 600", "100, 800", "101, 900", "130, 1000", "75, 240"
    })
    void agreesWithAnIndependentIntegration(double removals, double start) {
        ConstantRemovals flow = new ConstantRemovals(law, removals);
        double end = Math.min(0.9 * flow.extinctionTime(start), 25);
        for (double years : new double[] {0.2 * end, 0.6 * end, end}) {
            double expected = Ode.smooth(b -> 0.4 * b * (1 - b / 1000) - removals, start, years);
            assertThat(flow.after(start, years)).isCloseTo(expected, withinPercentage(1e-9 * PERCENT));
        }
    }

    /** Across Δ = 0 the flow is smooth in H: second differences shrink with the square of the step. */
    @ParameterizedTest
    @ValueSource(doubles = {0.1, 0.35, 0.5, 0.7, 1, 2})
    void theThreeCasesJoinWithoutAJump(double state) {
        double start = 1000 * state;
        double years = Math.min(8, 0.5 * new ConstantRemovals(law, 100).extinctionTime(start));
        double sensitivity = (new ConstantRemovals(law, 100.01).after(start, years)
                        - new ConstantRemovals(law, 99.99).after(start, years))
                / 0.02;
        double atFold = new ConstantRemovals(law, 100).after(start, years);
        for (double step = 1e-3; step > 1e-14; step /= 10) {
            double above = new ConstantRemovals(law, 100 + step).after(start, years);
            double below = new ConstantRemovals(law, 100 - step).after(start, years);
            double rounding = 1e-12 * start;
            assertThat(above - atFold).isCloseTo(sensitivity * step, within(0.01 * step + rounding));
            assertThat(atFold - below).isCloseTo(sensitivity * step, within(0.01 * step + rounding));
        }
    }

    @Test
    void timeToExtinctionJoinsAcrossTheFold() {
        double atFold = new ConstantRemovals(law, 100).extinctionTime(300);
        for (double step = 1e-4; step > 1e-12; step /= 10) {
            assertThat(new ConstantRemovals(law, 100 + step).extinctionTime(300))
                    .isCloseTo(atFold, within(step));
            assertThat(new ConstantRemovals(law, 100 - step).extinctionTime(300))
                    .isCloseTo(atFold, within(step));
        }
    }

    @Test
    void removalsOfMsyHoldTheStockAtAndAboveHalfOfCapacity() {
        ConstantRemovals flow = new ConstantRemovals(law, 100);
        assertThat(flow.extinctionTime(500)).isEqualTo(Double.POSITIVE_INFINITY);
        assertThat(flow.after(500, 1000)).isEqualTo(500);
        assertThat(flow.after(1000, 1e9)).isCloseTo(500, within(1e-4));
        // reference points of an odd scale: rounding must not turn "exactly MSY" into a collapse
        for (double msy : new double[] {0.1, 1 / 3.0, 7.7, 123.456, 9e7}) {
            SurplusProduction odd = SurplusProduction.fromReferencePoints(msy, 0.13, 1);
            assertThat(new ConstantRemovals(odd, msy).extinctionTime(odd.capacity()))
                    .isInfinite();
        }
    }

    @Test
    void equilibriaStayWhereTheyAre() {
        ConstantRemovals flow = new ConstantRemovals(law, 75);
        assertThat(flow.after(250, 20)).isCloseTo(250, withinPercentage(1e-8));
        assertThat(flow.after(750, 1000)).isEqualTo(750);
        assertThat(flow.extinctionTime(250)).isInfinite();
        assertThat(flow.extinctionTime(249.999)).isFinite().isGreaterThan(50);
        assertThat(flow.after(250.001, 1000)).isCloseTo(750, within(1e-9));
    }

    @Test
    void oddStartsAndScales() {
        ConstantRemovals none = new ConstantRemovals(law, 0);
        assertThat(none.after(0, 10)).isZero();
        assertThat(none.extinctionTime(0)).isZero();
        assertThat(none.extinctionTime(1e-200)).isInfinite();
        assertThat(none.after(1e-9, 5)).isCloseTo(1e-9 * Math.exp(2), withinPercentage(1e-9));
        ConstantRemovals heavy = new ConstantRemovals(law, 1e9);
        assertThat(heavy.after(1000, 1)).isZero();
        assertThat(heavy.extinctionTime(1000)).isCloseTo(1e-6, withinPercentage(1e-3));
        assertThat(heavy.after(1e5, 0)).isEqualTo(1e5);
        double small = new ConstantRemovals(new SurplusProduction(0.4, 1e-6, 1), 75e-9).after(0.8e-6, 3);
        double huge = new ConstantRemovals(new SurplusProduction(0.4, 1e12, 1), 75e9).after(0.8e12, 3);
        assertThat(small * 1e18).isCloseTo(huge, withinPercentage(1e-11));
    }

    @Test
    void rejectsOtherShapesAndBadValues() {
        assertThatThrownBy(() -> new ConstantRemovals(new SurplusProduction(0.4, 1000, 2), 5))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessage("n = 1 is violated: n = 2.0");
        assertThatThrownBy(() -> new ConstantRemovals(law, -5)).hasMessage("0 <= H < infinity is violated: H = -5.0");
        assertThatThrownBy(() -> new ConstantRemovals(law, 5).after(1, -1)).hasMessageContaining("years = -1.0");
        assertThatThrownBy(() -> new ConstantRemovals(law, 5).after(-1, 1)).hasMessageContaining("B0 = -1.0");
    }
}
