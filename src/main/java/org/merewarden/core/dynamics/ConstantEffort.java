package org.merewarden.core.dynamics;

/** The same fishing mortality whatever the biomass: φ(B) = B, u = F in 1/yr. */
public record ConstantEffort() implements HarvestRule {
    @Override
    public double effect(double biomassTonnes) {
        return biomassTonnes;
    }

    @Override
    public double slope(double biomassTonnes) {
        return 1;
    }
}
