package org.merewarden.core.dynamics;

/**
 * What a stock gains in a year at a given biomass, before any removal: dB/dt = g(B).
 *
 * <p>B is in tonnes and not negative; g in tonnes per year. g(0) = 0, g(K) = 0 and g is negative above K. A biomass at
 * or below zero counts as zero, so that an integrator may step across it.
 */
public interface GrowthLaw {
    /** g(B) in t/yr. */
    double rate(double biomassTonnes);

    /** g′(B) in 1/yr; at zero the limit from above, which may be infinite. */
    double slope(double biomassTonnes);

    /** The carrying capacity K in t, greater than zero: the largest biomass at which g is zero. */
    double capacity();

    /** g(B)/B in 1/yr; at zero its limit g′(0). */
    default double perCapita(double biomassTonnes) {
        return biomassTonnes > 0 ? rate(biomassTonnes) / biomassTonnes : slope(0);
    }
}
