package org.merewarden.core.dynamics;

/**
 * A biomass that a harvest holds: g(B) = u φ(B), B &gt; 0.
 *
 * @param harvest u, in the rule's unit
 * @param biomassTonnes B in t
 * @param eigenvalue λ = g′(B) − u φ′(B) in 1/yr; 0 at a fold. Small disturbances change as e^(λt), and their
 *     autocorrelation at a lag of Δt is e^(λΔt) where λ &lt; 0 (Scheffer et al. 2009, Nature 461: 53–59)
 * @param stable whether disturbances to both sides die away
 */
public record Equilibrium(double harvest, double biomassTonnes, double eigenvalue, boolean stable) {
    /** 1/|λ| in years: the time in which a small disturbance changes by a factor e; infinite at a fold. */
    public double returnTimeYears() {
        return 1 / Math.abs(eigenvalue);
    }
}
