package org.merewarden.core.dynamics;

/**
 * Only the surplus above a reserve is fished: φ(B) = max(0, B − B₀), u in 1/yr.
 *
 * @param reserveTonnes B₀ in t, ≥ 0
 */
public record Reserve(double reserveTonnes) implements HarvestRule {
    public Reserve {
        Require.notNegative("B0", reserveTonnes);
    }

    @Override
    public double effect(double biomassTonnes) {
        return Math.max(0, biomassTonnes - reserveTonnes);
    }

    @Override
    public double slope(double biomassTonnes) {
        return biomassTonnes >= reserveTonnes ? 1 : 0;
    }

    @Override
    public double[] kinks() {
        return new double[] {reserveTonnes};
    }
}
