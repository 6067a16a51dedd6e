package org.merewarden.core.dynamics;

/**
 * A growth law weakened at low biomass:
 *
 * <pre>
 *   gₓ(B) = g(B) · B/(B + d K)
 * </pre>
 *
 * <p>g is the law without the effect, K its capacity in t, d ≥ 0 the share of K at which growth is halved; d = 0 leaves g
 * as it is. Source: Dennis 1989 (Nat. Resour. Model. 3: 481–538). A stress test for diagrams and projections; it is not
 * fitted. Edge case: for d &gt; 0 the slope at B = 0 is zero, whatever g′(0) is.
 *
 * @param law growth without the effect
 * @param halfGrowthState d, the state B/K at which growth is halved, ≥ 0
 */
public record Depensation(GrowthLaw law, double halfGrowthState) implements GrowthLaw {
    public Depensation {
        Require.notNegative("d", halfGrowthState);
    }

    @Override
    public double rate(double biomassTonnes) {
        return biomassTonnes > 0 ? law.rate(biomassTonnes) * weight(biomassTonnes) : 0;
    }

    @Override
    public double slope(double biomassTonnes) {
        if (halfGrowthState == 0) {
            return law.slope(biomassTonnes);
        }
        if (biomassTonnes <= 0) {
            return 0;
        }
        double weight = weight(biomassTonnes);
        // the second term is g · dK/(B + dK)², written with g/B so that it stays finite where B² would underflow
        return law.slope(biomassTonnes) * weight + law.perCapita(biomassTonnes) * weight * (1 - weight);
    }

    @Override
    public double capacity() {
        return law.capacity();
    }

    private double weight(double biomassTonnes) {
        return biomassTonnes / (biomassTonnes + halfGrowthState * law.capacity());
    }
}
