package org.merewarden.core.dynamics;

/** A law for tests only: N′ = r N (N/A − 1)(1 − N/K), negative below A. */
record CriticalDepensation(double r, double threshold, double capacity) implements GrowthLaw {
    @Override
    public double rate(double biomass) {
        return r * biomass * (biomass / threshold - 1) * (1 - biomass / capacity);
    }

    @Override
    public double slope(double biomass) {
        return r * (biomass / threshold - 1) * (1 - biomass / capacity)
                + r * biomass / threshold * (1 - biomass / capacity)
                - r * biomass * (biomass / threshold - 1) / capacity;
    }
}
