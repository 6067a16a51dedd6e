package org.merewarden.core.dynamics;

/**
 * The policy's ramp: fishing mortality rises in a straight line from 0 at B lim to its target u at BMSY and stays there.
 *
 * <pre>
 *   φ(B) = B · clip((B − B lim)/(BMSY − B lim), 0, 1)
 * </pre>
 *
 * @param limitTonnes B lim in t, ≥ 0
 * @param bmsyTonnes BMSY in t, above B lim
 */
public record PolicyRamp(double limitTonnes, double bmsyTonnes) implements HarvestRule {
    public PolicyRamp {
        Require.notNegative("B lim", limitTonnes);
        Require.positive("BMSY", bmsyTonnes);
        Require.less("B lim", limitTonnes, "BMSY", bmsyTonnes);
    }

    /** The share, 0–1, of the target mortality that applies at this biomass. */
    public double shareOfTarget(double biomassTonnes) {
        return Math.max(0, Math.min(1, (biomassTonnes - limitTonnes) / (bmsyTonnes - limitTonnes)));
    }

    @Override
    public double effect(double biomassTonnes) {
        return biomassTonnes * shareOfTarget(biomassTonnes);
    }

    @Override
    public double slope(double biomassTonnes) {
        if (biomassTonnes < limitTonnes) {
            return 0;
        }
        if (biomassTonnes >= bmsyTonnes) {
            return 1;
        }
        return (2 * biomassTonnes - limitTonnes) / (bmsyTonnes - limitTonnes);
    }

    @Override
    public double[] kinks() {
        return new double[] {limitTonnes, bmsyTonnes};
    }
}
