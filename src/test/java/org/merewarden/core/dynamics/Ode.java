package org.merewarden.core.dynamics;

import java.util.function.DoubleUnaryOperator;
import org.apache.commons.math3.ode.FirstOrderDifferentialEquations;
import org.apache.commons.math3.ode.nonstiff.GraggBulirschStoerIntegrator;

/** Independent solutions: another method than the code under test, on equations written out afresh. */
final class Ode {
    private Ode() {}

    /** Solves y′ = f(y) by extrapolation (Gragg, Bulirsch, Stoer); f must be smooth along the solution. */
    static double smooth(DoubleUnaryOperator field, double start, double years) {
        FirstOrderDifferentialEquations equation = new FirstOrderDifferentialEquations() {
            @Override
            public int getDimension() {
                return 1;
            }

            @Override
            public void computeDerivatives(double time, double[] state, double[] derivative) {
                derivative[0] = field.applyAsDouble(state[0]);
            }
        };
        double[] state = {start};
        new GraggBulirschStoerIntegrator(1e-12 * years, years / 8, 1e-14, 1e-13)
                .integrate(equation, 0, state, years, state);
        return state[0];
    }

    /** Solves y′ = f(y) by many equal steps of the classical Runge–Kutta method; good to about h² across a kink. */
    static double kinked(DoubleUnaryOperator field, double start, double years, int steps) {
        double h = years / steps;
        double y = start;
        for (int i = 0; i < steps; i++) {
            double k1 = field.applyAsDouble(y);
            double k2 = field.applyAsDouble(y + h / 2 * k1);
            double k3 = field.applyAsDouble(y + h / 2 * k2);
            double k4 = field.applyAsDouble(y + h * k3);
            y += h / 6 * (k1 + 2 * k2 + 2 * k3 + k4);
        }
        return y;
    }
}
