package org.merewarden.core.inference.statespace;

/**
 * A season whose catch is known without error: its F is a function of the biomass, not a hidden state.
 *
 * <pre>
 *   c(x, l(x)) = ln(H/K):   l′ = −c_x/c_l,   l″ = −(c_xx + 2 c_xl l′ + c_ll l′²)/c_l
 *   f(x) = y(x, l(x)):      f′ = y_x + y_l l′,   f″ = y_xx + 2 y_xl l′ + y_ll l′² + y_l l″
 * </pre>
 *
 * <p>H: the known catch; c, y from {@link SeasonStep}. F ≤ 3: where the stock cannot yield H, F = 3 and l′ = l″ = 0.
 */
final class KnownCatch {
    private static final double LOG_LARGEST = Math.log(StateDensity.LARGEST_MORTALITY);
    private static final int MOST_STEPS = 50;

    private final SeasonStep step;
    private boolean active;
    private double l1;
    private double l2;

    KnownCatch(SeasonStep step) {
        this.step = step;
    }

    void none() {
        active = false;
    }

    /** Starts the step with the F that yields ln(H/K) = target from ln b = x; returns ln F. */
    double solve(double x, double target) {
        active = true;
        double l = Math.min(LOG_LARGEST, target - x);
        for (int k = 0; k < MOST_STEPS; k++) {
            at(x, l);
            double change = (target - step.c) / Math.max(0.05, step.cL);
            double next = Math.min(LOG_LARGEST, l + Math.max(-2, Math.min(2, change)));
            boolean done = Math.abs(next - l) < 1e-12;
            l = next;
            if (done) {
                break;
            }
        }
        at(x, l);
        boolean held = l >= LOG_LARGEST;
        l1 = held ? 0 : -step.cX / step.cL;
        l2 = held ? 0 : -(step.cXX + 2 * step.cXL * l1 + step.cLL * l1 * l1) / step.cL;
        return l;
    }

    private void at(double x, double l) {
        boolean kept = step.slopes;
        step.slopes = true;
        step.start(x, l, true);
        step.biomassAt(1);
        step.removals();
        step.slopes = kept;
    }

    /** Replaces the step's derivatives of y by those of f. */
    void eliminate() {
        if (!active) {
            return;
        }
        step.yXX += 2 * step.yXL * l1 + step.yLL * l1 * l1 + step.yL * l2;
        step.yX += step.yL * l1;
        step.yL = 0;
        step.yXL = 0;
        step.yLL = 0;
    }
}
