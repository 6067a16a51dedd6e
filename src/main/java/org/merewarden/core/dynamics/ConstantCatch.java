package org.merewarden.core.dynamics;

/** The same removals whatever the biomass: φ(B) = 1, u in t/yr. */
public record ConstantCatch() implements HarvestRule {
    @Override
    public double effect(double biomassTonnes) {
        return 1;
    }

    @Override
    public double slope(double biomassTonnes) {
        return 0;
    }
}
