package org.merewarden.core.dynamics;

/**
 * How removals follow biomass: a harvest u removes u·φ(B) tonnes a year.
 *
 * <p>φ is not negative, continuous, and smooth except at {@link #kinks()}; where φ(0) = 0 the ratio φ(B)/B stays bounded
 * as B → 0. The unit of u is the rule's own: t/yr where φ = 1, 1/yr where φ is a biomass.
 */
public interface HarvestRule {
    /** φ(B) for B ≥ 0 in t. */
    double effect(double biomassTonnes);

    /** φ′(B); at a kink the slope on the right. */
    double slope(double biomassTonnes);

    /** Biomasses in t, ascending, at which φ′ jumps. */
    default double[] kinks() {
        return new double[0];
    }
}
