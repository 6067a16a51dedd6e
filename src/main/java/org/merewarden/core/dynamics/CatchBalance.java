package org.merewarden.core.dynamics;

import org.apache.commons.math3.analysis.UnivariateFunction;
import org.apache.commons.math3.analysis.solvers.BrentSolver;

/**
 * The two equilibria of surplus production under a constant catch below the fold, solved directly where a whole curve
 * would be traced for one point of it:
 *
 * <pre>
 *   g(B) = H,  0 &lt; H &lt; MSY:   B− in (0, BMSY), the tipping biomass;   B+ in (BMSY, K), stable
 *   n = 1:  B± = K (1/2 ± √(1/4 − H/(rK)))
 * </pre>
 *
 * <p>H constant catch, t/yr; other symbols as in {@link SurplusProduction}. Accuracy: rounding for n = 1, else Brent's
 * method to 1e-12 of K.
 */
public final class CatchBalance {
    private final SurplusProduction law;
    private final double catchTonnes;

    /**
     * @param catchTonnes H in t/yr, in [0, MSY)
     */
    public CatchBalance(SurplusProduction law, double catchTonnes) {
        if (!(catchTonnes >= 0 && catchTonnes < law.msy())) {
            throw new IllegalArgumentException("needs 0 <= H < MSY " + law.msy() + ", got " + catchTonnes);
        }
        this.law = law;
        this.catchTonnes = catchTonnes;
    }

    /** The unstable equilibrium, t: below it the catch runs the stock down to nothing. 0 for H = 0. */
    public double tippingBiomass() {
        return catchTonnes == 0 ? 0 : root(-1, 0, law.bmsy());
    }

    /**
     * Whether constant removals H (t/yr) from the given biomass (t) run the stock down to nothing: H &gt; MSY, or biomass
     * below the tipping biomass.
     */
    public static boolean collapses(SurplusProduction law, double biomassTonnes, double catchTonnes) {
        return catchTonnes > law.msy() || (biomassTonnes < law.bmsy() && law.rate(biomassTonnes) < catchTonnes);
    }

    /** The stable equilibrium, t. K for H = 0. */
    public double stableBiomass() {
        return catchTonnes == 0 ? law.capacityTonnes() : root(1, law.bmsy(), law.capacityTonnes());
    }

    private double root(int side, double low, double high) {
        double capacity = law.capacityTonnes();
        if (law.shape() == 1) {
            // the smaller root by the product of both, which keeps its digits when the catch is small
            double upper = 0.5 + Math.sqrt(Math.max(0, 0.25 - catchTonnes / (law.r() * capacity)));
            return side > 0 ? capacity * upper : catchTonnes / (law.r() * upper);
        }
        UnivariateFunction excess = b -> (law.rate(b * capacity) - catchTonnes) / law.msy();
        return capacity * new BrentSolver(1e-14, 1e-12).solve(1000, excess, low / capacity, high / capacity);
    }
}
