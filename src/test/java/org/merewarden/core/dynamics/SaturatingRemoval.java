package org.merewarden.core.dynamics;

/** A rule for tests only, the removal of type III: φ(x) = x²/(x² + 1). */
record SaturatingRemoval() implements HarvestRule {
    @Override
    public double effect(double biomass) {
        return biomass * biomass / (biomass * biomass + 1);
    }

    @Override
    public double slope(double biomass) {
        double scale = biomass * biomass + 1;
        return 2 * biomass / (scale * scale);
    }
}
