package org.merewarden.core.dynamics;

/**
 * Graham–Schaefer growth (n = 1; much of the literature writes 2) under constant removals, in closed form (a Riccati
 * equation). With b = B/K, x = b − 1/2, θ = r t:
 *
 * <pre>
 *   dx/dθ = Δ − x²,   Δ = 1/4 − H/(rK),   s = √Δ or w = √(−Δ)
 *   b(t) = b₀ + (Δ − x₀²) q/(1 + x₀ q)
 *   q = tanh(sθ)/s  (Δ &gt; 0),   θ  (Δ = 0),   tan(wθ)/w  (Δ &lt; 0)
 * </pre>
 *
 * <p>H in t/yr. For Δ &gt; 0 the equilibria are b± = 1/2 ± s: the upper one is stable, the lower one is the tipping
 * biomass. Time to extinction:
 *
 * <pre>
 *   Δ &lt; 0:              (atan(x₀/w) + atan(1/(2w)))/(r w)
 *   Δ = 0, b₀ &lt; 1/2:    4 b₀/(r (1 − 2 b₀))
 *   Δ &gt; 0, b₀ &lt; b−:     ln((b+ − b₀) b−/((b− − b₀) b+))/(2 r s)
 *   else never
 * </pre>
 *
 * <p>Source: Brauer and Sánchez 1975 (Theor. Popul. Biol. 8: 12–30). q is one smooth function of Δ, and each branch is
 * written so that nothing cancels as s or w → 0; the three therefore join without a jump. A Δ within rounding of zero
 * (4e-16: H equal to MSY to the last digits) is taken as zero. Accuracy: about 1e-12 relative, except that a start within
 * rounding of the lower equilibrium leaves it at a time that double precision cannot know.
 *
 * @param growth the law, with shape 1
 * @param removalsTonnes H in t/yr, ≥ 0
 */
public record ConstantRemovals(SurplusProduction growth, double removalsTonnes) implements Flow {
    /** Rounding of H/(rK) near 1/4, a few units in its last place. */
    private static final double ROUNDING = 0x1p-51;

    public ConstantRemovals {
        Require.notNegative("H", removalsTonnes);
        if (growth.shape() != 1) {
            throw new IllegalArgumentException("n = 1 is violated: n = " + growth.shape());
        }
    }

    @Override
    public double after(double biomassTonnes, double years) {
        Require.notNegative("years", years);
        if (years >= extinctionTime(biomassTonnes)) {
            return 0;
        }
        double b0 = biomassTonnes / growth.capacityTonnes();
        double change = change(b0, growth.r() * years);
        return growth.capacityTonnes() * Math.max(0, b0 + change);
    }

    @Override
    public double extinctionTime(double biomassTonnes) {
        Require.notNegative("B0", biomassTonnes);
        double b0 = biomassTonnes / growth.capacityTonnes();
        return b0 == 0 ? 0 : scaledExtinctionTime(b0) / growth.r();
    }

    private double change(double b0, double theta) {
        double x0 = b0 - 0.5;
        double delta = delta();
        if (delta > 0) {
            double s = Math.sqrt(delta);
            double aboveLower = b0 - lower(s);
            double decay = Math.exp(-2 * s * theta);
            double grown = -Math.expm1(-2 * s * theta);
            return aboveLower == 0 ? 0 : (s - x0) * aboveLower * grown / (aboveLower * grown + 2 * s * decay);
        }
        if (delta == 0) {
            return -x0 * x0 * theta / (1 + x0 * theta);
        }
        double w = Math.sqrt(-delta);
        double sine = Math.sin(w * theta);
        return (delta - x0 * x0) * sine / (w * Math.cos(w * theta) + x0 * sine);
    }

    private double scaledExtinctionTime(double b0) {
        double x0 = b0 - 0.5;
        double delta = delta();
        if (delta < 0) {
            double w = Math.sqrt(-delta);
            // the sum of the two arctangents as one angle: they cancel when b₀ < 1/2 and w is small
            return Math.atan2(b0 * w, w * w - x0 / 2) / w;
        }
        double s = Math.sqrt(delta);
        double belowLower = lower(s) - b0;
        if (!(belowLower > 0)) {
            return Double.POSITIVE_INFINITY;
        }
        return Stable.log1pOver(2 * s, b0 / (belowLower * (0.5 + s)));
    }

    /** b− = h/b+, which does not cancel when H is small. */
    private double lower(double s) {
        return s == 0 ? 0.5 : removalsTonnes / (growth.r() * growth.capacityTonnes()) / (0.5 + s);
    }

    private double delta() {
        double delta = 0.25 - removalsTonnes / (growth.r() * growth.capacityTonnes());
        return Math.abs(delta) <= ROUNDING ? 0 : delta;
    }
}
