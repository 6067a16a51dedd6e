package org.merewarden.core.dynamics;

/**
 * Where a stock is after some time: the solution of dB/dt = g(B) − u φ(B), B(0) = B₀, zero for ever once it reaches zero.
 *
 * <p>Biomasses in t, times in years. Both methods reject a negative, infinite or missing argument.
 */
public interface Flow {
    /** B after the given years; NaN where a numerical solution was not found (never for a closed form). */
    double after(double biomassTonnes, double years);

    /** Years until B reaches zero; 0 if it is zero already, +infinity for never. */
    double extinctionTime(double biomassTonnes);

    /**
     * The flow of a law under a rule: in closed form where there is one, else integrated.
     *
     * @param harvest u, ≥ 0, in the rule's unit
     */
    static Flow of(GrowthLaw law, HarvestRule rule, double harvest) {
        if (law instanceof SurplusProduction growth) {
            if (rule instanceof ConstantEffort) {
                return new ConstantMortality(growth, harvest);
            }
            if (rule instanceof ConstantCatch && growth.shape() == 1) {
                return new ConstantRemovals(growth, harvest);
            }
        }
        return new IntegratedFlow(law, rule, harvest);
    }
}
