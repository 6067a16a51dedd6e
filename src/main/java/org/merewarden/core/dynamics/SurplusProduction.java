package org.merewarden.core.dynamics;

/**
 * Surplus production of Pella and Tomlinson:
 *
 * <pre>
 *   g(B) = (r/n) B (1 − (B/K)^n)         n → 0:  g(B) = r B ln(K/B)
 *   BMSY = K (1 + n)^(−1/n)                      K/e
 *   FMSY = r/(1 + n)                             r
 *   MSY  = FMSY · BMSY
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>B</td><td>biomass, t</td></tr>
 * <tr><td>r</td><td>growth parameter, 1/yr, &gt; 0; g′(0) = r/n, so r is the growth rate of a small stock only at n = 1
 * </td></tr>
 * <tr><td>K</td><td>carrying capacity, t, &gt; 0</td></tr>
 * <tr><td>n</td><td>shape, ≥ 0; 0 is Fox, 1 is Graham–Schaefer. <b>Much of the literature writes n + 1 for this n</b>:
 * its 2 is Graham–Schaefer, its 1 is Fox</td></tr>
 * </table>
 *
 * <p>Sources: Pella and Tomlinson 1969 (Bull. Inter-Am. Trop. Tuna Comm. 13: 419–496); Fox 1970 (Trans. Am. Fish. Soc.
 * 99: 80–88); Schaefer 1954 (Bull. Inter-Am. Trop. Tuna Comm. 1: 25–56).
 *
 * <p>Edge cases: at B = 0 growth is zero and its slope is r/n, infinite for n = 0. Accuracy: a few units in the last
 * place for every n from 0 upwards, the smallest included, because 1 − (B/K)^n is taken as expm1(n ln(B/K)).
 *
 * @param r growth parameter in 1/yr, &gt; 0
 * @param capacityTonnes K in t, &gt; 0
 * @param shape n, ≥ 0; the literature's exponent is often n + 1
 */
public record SurplusProduction(double r, double capacityTonnes, double shape) implements GrowthLaw {
    public SurplusProduction {
        Require.positive("r", r);
        Require.positive("K", capacityTonnes);
        Require.notNegative("n", shape);
    }

    /**
     * The law with the given reference points: r = FMSY (1 + n), K = MSY/FMSY · (1 + n)^(1/n).
     *
     * @param msyTonnes largest sustainable removal in t/yr, &gt; 0
     * @param fmsy fishing mortality that takes it, 1/yr, &gt; 0
     * @param shape n, ≥ 0; the literature's exponent is often n + 1
     */
    public static SurplusProduction fromReferencePoints(double msyTonnes, double fmsy, double shape) {
        Require.positive("MSY", msyTonnes);
        Require.positive("FMSY", fmsy);
        Require.notNegative("n", shape);
        return new SurplusProduction(
                fmsy * (1 + shape), msyTonnes / fmsy * Math.exp(Stable.log1pOver(shape, 1)), shape);
    }

    @Override
    public double rate(double biomassTonnes) {
        return biomassTonnes > 0 ? biomassTonnes * perCapita(biomassTonnes) : 0;
    }

    @Override
    public double slope(double biomassTonnes) {
        double logState = Math.log(Math.max(0, biomassTonnes) / capacityTonnes);
        if (logState == Double.NEGATIVE_INFINITY) {
            return r / shape;
        }
        return -r * (Stable.expm1Over(shape, logState) + Math.exp(shape * logState));
    }

    @Override
    public double perCapita(double biomassTonnes) {
        return -r * Stable.expm1Over(shape, Math.log(Math.max(0, biomassTonnes) / capacityTonnes));
    }

    @Override
    public double capacity() {
        return capacityTonnes;
    }

    /** The largest sustainable removal in t/yr. */
    public double msy() {
        return fmsy() * bmsy();
    }

    /** The biomass in t at which growth is largest. */
    public double bmsy() {
        return capacityTonnes * Math.exp(-Stable.log1pOver(shape, 1));
    }

    /** The instantaneous fishing mortality in 1/yr that holds the stock at {@link #bmsy()}. */
    public double fmsy() {
        return r / (1 + shape);
    }
}
