package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;
import static org.assertj.core.api.Assertions.withinPercentage;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

class IntegratedFlowTest {
    private static final double PERCENT = 100;

    private static final double ACCURACY = 1e-7 * PERCENT;

    private final SurplusProduction law = new SurplusProduction(0.4, 1000, 1);

    @ParameterizedTest
    @CsvSource({"0, 0.3", "1e-9, 0.5", "0.5, 0.1", "1, 0", "1, 0.7", "2, 0.3", "4, 2"})
    void agreesWithTheClosedFormOfConstantMortality(double n, double mortality) {
        SurplusProduction shaped = new SurplusProduction(0.4, 1000, n);
        Flow closed = new ConstantMortality(shaped, mortality);
        Flow integrated = new IntegratedFlow(shaped, new ConstantEffort(), mortality);
        for (double start : new double[] {1e-9, 1, 400, 1000, 1700}) {
            for (double years : new double[] {1e-3, 1, 10, 60}) {
                assertThat(integrated.after(start, years))
                        .isCloseTo(closed.after(start, years), withinPercentage(ACCURACY));
            }
            assertThat(integrated.extinctionTime(start)).isInfinite();
        }
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, 50, 75, 99.9, 100, 100.1, 110, 400})
    void agreesWithTheClosedFormOfConstantRemovals(double removals) {
        Flow closed = new ConstantRemovals(law, removals);
        Flow integrated = new IntegratedFlow(law, new ConstantCatch(), removals);
        for (double start : new double[] {10, 200, 499, 500, 800, 1300}) {
            double gone = closed.extinctionTime(start);
            if (Double.isInfinite(gone)) {
                assertThat(integrated.extinctionTime(start)).isInfinite();
            } else {
                assertThat(integrated.extinctionTime(start)).isCloseTo(gone, withinPercentage(ACCURACY));
                assertThat(integrated.after(start, gone * (1 - 1e-4))).isPositive();
                assertThat(integrated.after(start, gone * (1 + 1e-6))).isZero();
            }
            for (double years : new double[] {0.1 * Math.min(gone, 20), 0.9 * Math.min(gone, 20)}) {
                assertThat(integrated.after(start, years))
                        .isCloseTo(closed.after(start, years), withinPercentage(ACCURACY));
            }
        }
    }

    /** Computed values of the reference, eight decimals, by the general route. */
    @ParameterizedTest
    @CsvSource({"100, 300, 7.5", "101, 500, 73.55638372", "110, 1000, 39.98760051", "75, 200, 6.49641492"})
    void timeToExtinction(double removals, double start, double years) {
        Flow flow = new IntegratedFlow(law, new ConstantCatch(), removals);
        assertThat(flow.extinctionTime(start)).isCloseTo(years, withinPercentage(ACCURACY));
    }

    /** Shapes without a closed form under constant removals, against extrapolation on the equation written out. */
    @ParameterizedTest
    @CsvSource({"0.5, 80, 900", "2, 70, 800", "2, 90, 1000", "0.188115, 100, 500", "4, 30, 1200"})
    void agreesWithAnIndependentIntegration(double n, double removals, double start) {
        Flow flow = new IntegratedFlow(new SurplusProduction(0.4, 1000, n), new ConstantCatch(), removals);
        double end = Math.min(0.9 * flow.extinctionTime(start), 30);
        for (double years : new double[] {end / 4, end}) {
            double expected = Ode.smooth(b -> 0.4 / n * b * (1 - Math.pow(b / 1000, n)) - removals, start, years);
            assertThat(flow.after(start, years)).isCloseTo(expected, withinPercentage(ACCURACY));
        }
    }

    /** Rules with kinks, which the solution crosses. */
    @ParameterizedTest
    @ValueSource(doubles = {50, 150, 290, 480, 900})
    void crossesKinks(double start) {
        Flow reserve = new IntegratedFlow(law, new Reserve(300), 0.7);
        Flow ramp = new IntegratedFlow(law, new PolicyRamp(200, 500), 0.16);
        for (double years : new double[] {2, 9}) {
            double reserved =
                    Ode.kinked(b -> 0.4 * b * (1 - b / 1000) - 0.7 * Math.max(0, b - 300), start, years, 400_000);
            assertThat(reserve.after(start, years)).isCloseTo(reserved, withinPercentage(ACCURACY));
            double ramped = Ode.kinked(
                    b -> 0.4 * b * (1 - b / 1000) - 0.16 * b * Math.max(0, Math.min(1, (b - 200) / 300)),
                    start,
                    years,
                    400_000);
            assertThat(ramp.after(start, years)).isCloseTo(ramped, withinPercentage(ACCURACY));
        }
    }

    /** Growth that is critical below a threshold: r N (N/A − 1)(1 − N/K), r 0.5, A 200, K 1000. */
    @Test
    void criticalDepensationEndsAStockBelowItsThreshold() {
        GrowthLaw critical = new CriticalDepensation(0.5, 200, 1000);
        Flow unfished = new IntegratedFlow(critical, new ConstantEffort(), 0);
        assertThat(unfished.after(199, 100)).isLessThan(1e-6);
        assertThat(unfished.after(201, 100)).isCloseTo(1000, within(1e-3));
        Flow caught = new IntegratedFlow(critical, new ConstantCatch(), 10);
        assertThat(caught.extinctionTime(200)).isFinite().isPositive();
        assertThat(caught.extinctionTime(400)).isInfinite();
        assertThat(new IntegratedFlow(critical, new ConstantCatch(), 0).extinctionTime(100))
                .isInfinite();
    }

    @Test
    void oddStarts() {
        Flow flow = new IntegratedFlow(law, new ConstantCatch(), 75);
        assertThat(flow.after(0, 5)).isZero();
        assertThat(flow.extinctionTime(0)).isZero();
        assertThat(flow.after(640, 0)).isEqualTo(640);
        assertThat(flow.after(250, 10)).isCloseTo(250, withinPercentage(ACCURACY));
        for (double capacity : new double[] {1e-6, 1e12}) {
            Flow scaled =
                    new IntegratedFlow(new SurplusProduction(0.4, capacity, 1), new ConstantCatch(), 0.11 * capacity);
            assertThat(scaled.extinctionTime(capacity)).isCloseTo(39.98760051, withinPercentage(ACCURACY));
        }
    }

    /** The answer to "no solution was found" is a value, not an exception. */
    @Test
    void anUnsolvableLawGivesNaN() {
        GrowthLaw broken = new GrowthLaw() {
            @Override
            public double rate(double biomass) {
                return biomass > 500 ? Double.NaN : biomass;
            }

            @Override
            public double slope(double biomass) {
                return 1;
            }

            @Override
            public double capacity() {
                return 1000;
            }
        };
        assertThat(new IntegratedFlow(broken, new ConstantEffort(), 0).after(400, 10))
                .isNaN();
        assertThat(new IntegratedFlow(broken, new ConstantCatch(), 1).after(400, 10))
                .isNaN();
    }

    @Test
    void theFactoryPrefersClosedForms() {
        assertThat(Flow.of(law, new ConstantEffort(), 0.1)).isInstanceOf(ConstantMortality.class);
        assertThat(Flow.of(law, new ConstantCatch(), 10)).isInstanceOf(ConstantRemovals.class);
        assertThat(Flow.of(law, new Reserve(10), 0.1)).isInstanceOf(IntegratedFlow.class);
        SurplusProduction fox = new SurplusProduction(0.4, 1000, 0);
        assertThat(Flow.of(fox, new ConstantCatch(), 10)).isInstanceOf(IntegratedFlow.class);
        assertThat(Flow.of(new Depensation(law, 0.1), new ConstantEffort(), 0.1))
                .isInstanceOf(IntegratedFlow.class);
    }

    @Test
    void rejectsBadValues() {
        assertThatThrownBy(() -> new IntegratedFlow(law, new ConstantCatch(), -1))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessage("0 <= harvest < infinity is violated: harvest = -1.0");
        Flow flow = new IntegratedFlow(law, new ConstantCatch(), 1);
        assertThatThrownBy(() -> flow.after(Double.NaN, 1)).hasMessageContaining("B0 = NaN");
        assertThatThrownBy(() -> flow.after(1, -1)).hasMessageContaining("years = -1.0");
        assertThatThrownBy(() -> flow.extinctionTime(-1)).hasMessageContaining("B0 = -1.0");
    }
}
