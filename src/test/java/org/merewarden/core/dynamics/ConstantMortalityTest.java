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

class ConstantMortalityTest {
    private static final double PERCENT = 100;

    /** Computed at 60 digits by src/test/reference/dynamics_flows.py. */
    @ParameterizedTest
    @CsvFileSource(resources = "/reference/flow_constant_mortality.csv", numLinesToSkip = 1)
    void agreesWithSixtyDigits(double r, double n, double f, double state, double years, double after, Double caught) {
        ConstantMortality flow = new ConstantMortality(new SurplusProduction(r, 1, n), f);
        assertThat(flow.after(state, years)).isCloseTo(after, withinPercentage(1e-12 * PERCENT));
        if (caught != null) {
            double accuracy = n == 1 ? 1e-12 : 1e-10;
            assertThat(flow.removals(state, years)).isCloseTo(caught, withinPercentage(accuracy * PERCENT));
        }
    }

    /** The worst corners of the stated range of the quadrature, against an independent integration of C′ = F B. */
    @ParameterizedTest
    @CsvSource({
        "4, 1.5, 3, 2", "4, 1.5, 3, 1", "4, 1.5, 3, 0.01", "4, 1.5, 0.05, 2", "4, 0.05, 3, 2", "2, 1.5, 3, 2",
        "2, 1.5, 3, 0.2", "0, 1.5, 3, 2", "0, 1.5, 3, 1e-6", "1e-9, 1.5, 3, 2", "0.188115, 1.5, 3, 2",
                "3, 1.5, 2.2, 1.7"
    })
    void removalsAgreeWithFineQuadrature(double n, double r, double f, double state) {
        ConstantMortality flow = new ConstantMortality(new SurplusProduction(r, 1, n), f);
        assertThat(flow.removals(state, 1)).isCloseTo(simpson(flow, state, 200_000), withinPercentage(1e-10 * PERCENT));
    }

    private static double simpson(ConstantMortality flow, double state, int intervals) {
        double sum = flow.after(state, 0) + flow.after(state, 1);
        for (int i = 1; i < intervals; i++) {
            sum += (i % 2 == 0 ? 2 : 4) * flow.after(state, (double) i / intervals);
        }
        return flow.mortality() * sum / (3.0 * intervals);
    }

    /** An independent integration of u′ = (r/n)(1 − e^(n u)) − F, u = ln b. */
    @ParameterizedTest
    @CsvSource({
        "0.4, 1, 0.1, 0.3",
        "0.4, 0.5, 0.9, 1.6",
        "1.2, 2, 0.2, 0.01",
        "1.2, 4, 0.3, 1e-6",
        "0.3, 0.01, 0.3, 0.8"
    })
    void agreesWithAnIndependentIntegration(double r, double n, double f, double state) {
        ConstantMortality flow = new ConstantMortality(new SurplusProduction(r, 1, n), f);
        for (double years : new double[] {0.1, 1, 7, 30}) {
            double expected = Math.exp(Ode.smooth(u -> r / n * (1 - Math.exp(n * u)) - f, Math.log(state), years));
            assertThat(flow.after(state, years)).isCloseTo(expected, withinPercentage(1e-9 * PERCENT));
        }
    }

    /** Schaefer's logistic, written out. */
    @Test
    void withoutFishingIsTheLogistic() {
        ConstantMortality flow = new ConstantMortality(new SurplusProduction(0.4, 1000, 1), 0);
        double expected = 1000 / (1 + (1000 / 50.0 - 1) * Math.exp(-0.4 * 6));
        assertThat(flow.after(50, 6)).isCloseTo(expected, withinPercentage(1e-11));
        assertThat(flow.removals(50, 6)).isZero();
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, 1e-9, 0.5, 1, 2})
    void holdsTheEquilibrium(double n) {
        SurplusProduction law = new SurplusProduction(0.4, 1000, n);
        ConstantMortality flow = new ConstantMortality(law, law.fmsy());
        assertThat(flow.after(law.bmsy(), 50)).isCloseTo(law.bmsy(), withinPercentage(1e-11));
        assertThat(flow.removals(law.bmsy(), 1)).isCloseTo(law.msy(), withinPercentage(1e-9));
        assertThat(flow.after(1e-3, 5000)).isCloseTo(law.bmsy(), withinPercentage(1e-11));
    }

    /** Growth without removals is what is gained: B(1) − B(0) = growth − C, so C cannot exceed start plus MSY. */
    @ParameterizedTest
    @ValueSource(doubles = {0, 0.188115, 1, 2})
    void removalsNeverExceedWhatWasThere(double n) {
        SurplusProduction law = new SurplusProduction(0.9, 1000, n);
        for (double f : new double[] {0.01, 0.5, 3, 20}) {
            for (double start : new double[] {1e-3, 100, 700, 1000}) {
                double caught = new ConstantMortality(law, f).removals(start, 1);
                assertThat(caught).isBetween(0.0, start + law.msy());
            }
        }
    }

    @Test
    void oddStarts() {
        for (double n : new double[] {0, 1e-9, 1, 4}) {
            ConstantMortality flow = new ConstantMortality(new SurplusProduction(0.4, 1000, n), 0.3);
            assertThat(flow.after(0, 5)).isZero();
            assertThat(flow.removals(0, 5)).isZero();
            assertThat(flow.extinctionTime(0)).isZero();
            assertThat(flow.extinctionTime(1e-300)).isEqualTo(Double.POSITIVE_INFINITY);
            assertThat(flow.after(700, 0)).isCloseTo(700, withinPercentage(1e-12));
            assertThat(flow.removals(700, 0)).isZero();
            assertThat(flow.after(1e-290, 1)).isPositive().isLessThan(1e-4);
        }
    }

    /** Exponents that overflow: a heavy fishery for a millennium, and a tiny stock's way up. */
    @Test
    void survivesExponentsBeyondTheRangeOfDoubles() {
        SurplusProduction steep = new SurplusProduction(1, 1000, 4);
        double decay = new ConstantMortality(steep, 3).after(1000, 100) / 1000;
        // far below K the law is b′ = (1/4 − 3) b; the start costs a constant: y = b^-4 grows to (1 + 1/11) e^(11 t)
        assertThat(Math.log(decay)).isCloseTo(-2.75 * 100 - Math.log(1 + 1 / 11.0) / 4, within(1e-10));
        assertThat(new ConstantMortality(steep, 3).after(1000, 1e5)).isZero();
        assertThat(new ConstantMortality(steep, 0).after(1e-100, 1e4)).isCloseTo(1000, within(1e-9));
        double grown = new ConstantMortality(steep, 0).after(1e-100, 100);
        assertThat(grown).isCloseTo(1e-100 * Math.exp(25), withinPercentage(1e-11));
        SurplusProduction schaefer = new SurplusProduction(1, 1000, 1);
        assertThat(new ConstantMortality(schaefer, 0).after(1e-100, 1e4)).isCloseTo(1000, within(1e-9));
        assertThat(new ConstantMortality(schaefer, 5).after(1000, 1e4)).isZero();
    }

    @Test
    void rejectsBadArguments() {
        SurplusProduction law = new SurplusProduction(0.4, 1000, 1);
        assertThatThrownBy(() -> new ConstantMortality(law, -0.1))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessage("0 <= F < infinity is violated: F = -0.1");
        ConstantMortality flow = new ConstantMortality(law, 0.1);
        assertThatThrownBy(() -> flow.after(-1, 1)).hasMessageContaining("B0 = -1.0");
        assertThatThrownBy(() -> flow.after(1, Double.NaN)).hasMessageContaining("years = NaN");
        assertThatThrownBy(() -> flow.removals(1, -1)).hasMessageContaining("years = -1.0");
        assertThatThrownBy(() -> flow.extinctionTime(-1)).hasMessageContaining("B0 = -1.0");
        assertThatThrownBy(() -> flow.removals(Double.NaN, 1)).hasMessageContaining("B0 = NaN");
    }
}
