package org.merewarden.core.dynamics;

/**
 * The ramp that is linear in catch: removals rise in a straight line from 0 at B_lo to u·B_up at B_up; above it the
 * mortality is u.
 *
 * <pre>
 *   F(B)/u = (B_up/B) (B − B_lo)/(B_up − B_lo), clipped to 0…1;   φ(B) = B · F(B)/u
 * </pre>
 *
 * <p>With B_lo = 0.1 K and B_up = 0.4 K it gives the grid usually called 40–10. At B = 0 the share is 0.
 *
 * @param lowTonnes B_lo in t, ≥ 0
 * @param highTonnes B_up in t, above B_lo
 */
public record CatchLinearRamp(double lowTonnes, double highTonnes) implements HarvestRule {
    public CatchLinearRamp {
        Require.notNegative("B_lo", lowTonnes);
        Require.positive("B_up", highTonnes);
        Require.less("B_lo", lowTonnes, "B_up", highTonnes);
    }

    /** The share, 0–1, of the target mortality that applies at this biomass. */
    public double shareOfTarget(double biomassTonnes) {
        return biomassTonnes > 0 ? effect(biomassTonnes) / biomassTonnes : 0;
    }

    @Override
    public double effect(double biomassTonnes) {
        if (biomassTonnes >= highTonnes) {
            return biomassTonnes;
        }
        return Math.max(0, slopeBetween() * (biomassTonnes - lowTonnes));
    }

    @Override
    public double slope(double biomassTonnes) {
        if (biomassTonnes < lowTonnes) {
            return 0;
        }
        return biomassTonnes >= highTonnes ? 1 : slopeBetween();
    }

    @Override
    public double[] kinks() {
        return new double[] {lowTonnes, highTonnes};
    }

    private double slopeBetween() {
        return highTonnes / (highTonnes - lowTonnes);
    }
}
