package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.withinPercentage;

import org.apache.commons.math3.ode.FirstOrderDifferentialEquations;
import org.apache.commons.math3.ode.nonstiff.DormandPrince853Integrator;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class DepensatedYearTest {

    /** Against an adaptive integrator of the mathematics library on dB/dt = g(B) B/(B + dK) − F B, dC/dt = F B. */
    @ParameterizedTest
    @CsvSource({
        "0.4, 1, 0.1, 500, 0.2, 0.001", "0.4, 1, 0.1, 20, 0.5, 0.001", "1.5, 1, 0.05, 900, 1, 0.001",
        "0.8, 0, 0.2, 150, 0.3, 0.001", "0.3, 2, 0.3, 1000, 0, 0.001", "1.0, 0.5, 0.1, 700, 3, 0.1"
    })
    void agreesWithAnAdaptiveIntegrator(
            double r, double shape, double d, double biomass, double mortality, double perCent) {
        SurplusProduction law = new SurplusProduction(r, 1000, shape);
        GrowthLaw weakened = new Depensation(law, d);
        FirstOrderDifferentialEquations flow = new FirstOrderDifferentialEquations() {
            @Override
            public int getDimension() {
                return 2;
            }

            @Override
            public void computeDerivatives(double t, double[] y, double[] slope) {
                slope[0] = weakened.rate(y[0]) - mortality * y[0];
                slope[1] = mortality * y[0];
            }
        };
        double[] end = {biomass, 0};
        new DormandPrince853Integrator(1e-12, 1, 1e-12, 1e-12).integrate(flow, 0, end, 1, end);
        DepensatedYear year = new DepensatedYear(law, d);
        assertThat(year.after(biomass, mortality)).isCloseTo(end[0], withinPercentage(perCent));
        assertThat(year.removals(biomass, mortality))
                .isCloseTo(end[1], mortality == 0 ? withinPercentage(0) : withinPercentage(perCent));
    }

    @ParameterizedTest
    @CsvSource({"0.4, 1, 300, 0.3", "0.9, 0, 800, 1", "0.5, 2, 50, 0"})
    void withoutDepensationIsTheClosedForm(double r, double shape, double biomass, double mortality) {
        SurplusProduction law = new SurplusProduction(r, 1000, shape);
        DepensatedYear year = new DepensatedYear(law, 0);
        AnnualMap exact = new AnnualMap(law);
        assertThat(year.after(biomass, mortality)).isCloseTo(exact.after(biomass, mortality), withinPercentage(1e-4));
        assertThat(year.removals(biomass, mortality))
                .isCloseTo(exact.removals(biomass, mortality), withinPercentage(1e-4));
    }
}
