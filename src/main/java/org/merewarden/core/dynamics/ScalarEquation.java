package org.merewarden.core.dynamics;

import java.util.function.DoubleUnaryOperator;
import org.apache.commons.math3.exception.MathIllegalArgumentException;
import org.apache.commons.math3.exception.MathIllegalStateException;
import org.apache.commons.math3.ode.FirstOrderDifferentialEquations;
import org.apache.commons.math3.ode.events.EventHandler;
import org.apache.commons.math3.ode.nonstiff.DormandPrince853Integrator;
import org.apache.commons.math3.ode.sampling.StepHandler;
import org.apache.commons.math3.ode.sampling.StepInterpolator;

/**
 * y′ = f(y) in one unknown, f continuous and smooth between its breaks; solved by an adaptive Runge–Kutta method of order
 * 8(5,3) (Dormand and Prince; Hairer, Nørsett and Wanner 1993, Solving Ordinary Differential Equations I, II.10).
 *
 * <p>A solution only rises or only falls, so it meets each break at most once. A step across a break would carry an error
 * that the method's own estimate can miss. It is therefore given up: the rest of the way to the break is the integral of
 * dy/f(y), which never looks beyond it, and the next leg starts at the break itself.
 *
 * <p>No solution, a step that has shrunk to nothing or too many evaluations, is NaN.
 *
 * @param field f
 * @param breaks ascending; f may have a kink at each
 * @param absolute absolute tolerance of y; the relative one is 1e-11
 */
record ScalarEquation(DoubleUnaryOperator field, double[] breaks, double absolute) {
    private static final double RELATIVE = 1e-11;

    private static final double SMALLEST_STEP = 1e-14;

    private static final int MOST_EVALUATIONS = 1_000_000;

    private static final int MOST_EVENT_STEPS = 200;

    /** y at the given time, or {@code floor} for ever once it falls to it; a floor must be one of the breaks. */
    double after(double start, double time, double floor) {
        double y = start;
        double left = time;
        while (left > 0 && y > floor && field.applyAsDouble(y) != 0) {
            Leg leg = new Leg(nextBreak(y, field.applyAsDouble(y) > 0));
            double end = leg.run(y, left);
            if (!leg.reached) {
                return end;
            }
            double arrival = leg.stepStart + piece(leg.stepState, leg.target);
            if (!(arrival < left)) {
                // the step given up was early by its own error; what is missing is of that size
                return leg.target + field.applyAsDouble(leg.target) * (left - arrival);
            }
            y = leg.target;
            left -= arrival;
        }
        return y;
    }

    /** Time from one y to another that lies ahead of it with f ≠ 0 on the way. */
    double timeBetween(double from, double to) {
        double time = 0;
        double y = from;
        while (y != to) {
            double next = to > y ? Math.min(to, nextBreak(y, true)) : Math.max(to, nextBreak(y, false));
            time += piece(y, next);
            y = next;
        }
        return time;
    }

    private double nextBreak(double y, boolean rising) {
        double next = rising ? Double.POSITIVE_INFINITY : Double.NEGATIVE_INFINITY;
        for (double each : breaks) {
            if (rising ? each > y && each < next : each < y && each > next) {
                next = each;
            }
        }
        return next;
    }

    /** ∫ dy/f(y) between two points with no break in between. */
    private double piece(double from, double to) {
        if (from == to) {
            return 0;
        }
        double span = Math.abs(to - from);
        double shortest = span / Math.max(Math.abs(field.applyAsDouble(from)), Math.abs(field.applyAsDouble(to)));
        double[] time = {0};
        return solve(integrator(span, RELATIVE * shortest), (y, elapsed) -> 1 / field.applyAsDouble(y), from, to, time);
    }

    private static DormandPrince853Integrator integrator(double span, double absolute) {
        DormandPrince853Integrator integrator =
                new DormandPrince853Integrator(span * SMALLEST_STEP, span, absolute, RELATIVE);
        integrator.setMaxEvaluations(MOST_EVALUATIONS);
        return integrator;
    }

    private static double solve(
            DormandPrince853Integrator integrator, Derivative derivative, double from, double to, double[] state) {
        try {
            integrator.integrate(new Equation(derivative), from, state, to, state);
            return Double.isFinite(state[0]) ? state[0] : Double.NaN;
        } catch (MathIllegalArgumentException | MathIllegalStateException noSolution) {
            return Double.NaN;
        }
    }

    private interface Derivative {
        double at(double argument, double value);
    }

    private record Equation(Derivative derivative) implements FirstOrderDifferentialEquations {
        @Override
        public int getDimension() {
            return 1;
        }

        @Override
        public void computeDerivatives(double argument, double[] value, double[] result) {
            result[0] = derivative.at(argument, value[0]);
        }
    }

    /** One integration, ended by the end of time or by the step that reaches the target. */
    private final class Leg implements EventHandler, StepHandler {
        private final double target;

        private boolean reached;

        private double stepStart;

        private double stepState;

        private Leg(double target) {
            this.target = target;
        }

        private double run(double start, double time) {
            DormandPrince853Integrator integrator = integrator(time, absolute);
            if (Double.isFinite(target)) {
                integrator.addEventHandler(this, time, time * SMALLEST_STEP, MOST_EVENT_STEPS);
                integrator.addStepHandler(this);
            }
            return solve(integrator, (elapsed, y) -> field.applyAsDouble(y), 0, time, new double[] {start});
        }

        @Override
        public void init(double from, double[] state, double to) {}

        @Override
        public double g(double time, double[] state) {
            return state[0] - target;
        }

        @Override
        public Action eventOccurred(double time, double[] state, boolean increasing) {
            reached = true;
            return Action.STOP;
        }

        @Override
        public void resetState(double time, double[] state) {}

        @Override
        public void handleStep(StepInterpolator step, boolean last) {
            if (reached) {
                stepStart = step.getPreviousTime();
                step.setInterpolatedTime(stepStart);
                stepState = step.getInterpolatedState()[0];
            }
        }
    }
}
