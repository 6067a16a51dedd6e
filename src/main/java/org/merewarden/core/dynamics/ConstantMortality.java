package org.merewarden.core.dynamics;

import java.util.stream.IntStream;
import org.apache.commons.math3.analysis.integration.gauss.GaussIntegrator;
import org.apache.commons.math3.analysis.integration.gauss.GaussIntegratorFactory;

/**
 * Surplus production under a constant fishing mortality, in closed form (a Bernoulli equation). With b = B/K, a = r − nF:
 *
 * <pre>
 *   ln b(τ) = −ln(1 + n w)/n,   w = (b₀^(−n) − 1)/n · e^(−aτ) + F (1 − e^(−aτ))/a
 *   n → 0:  ln b(τ) = ln b₀ · e^(−rτ) − F (1 − e^(−rτ))/r
 *   removals  C = F ∫₀^τ B dt;   n = 1:  C = (F K/r) ln(1 + r b₀ (e^(aτ) − 1)/a)
 * </pre>
 *
 * <p>r, K, n as in {@link SurplusProduction} (much of the literature writes n + 1); F in 1/yr; τ in years; C in t.
 *
 * <p>Edge cases: b₀ = 0 stays 0; a = 0 and n = 0 are the limits of the same expressions and need no switch; results too
 * small for a double are 0. A positive stock never dies out in finite time.
 *
 * <p>Accuracy: biomass to about 1e-13 relative. Removals for n = 1 likewise; for other n by Gauss–Legendre on b(t).
 * What decides its error is m = (r max(1, b₀^n) + nF) τ, about the e-folds of b^n within the time. The worst error found
 * over 60,000 random cases with n ≤ 4, b₀ ≤ 2, rτ ≤ 1.5, Fτ ≤ 3 was 5e-11 with 8 points for m ≤ 1, 3e-11 with 12 for
 * m ≤ 5 and 5e-11 with 16 for m ≤ 10; beyond, the time is cut into panels with m ≤ 10 each. Stated: 1e-10 relative in
 * that range (five points in all would err by 5e-4).
 *
 * @param growth the law
 * @param mortality F in 1/yr, ≥ 0
 */
public record ConstantMortality(SurplusProduction growth, double mortality) implements Flow {
    private static final Quadrature FEW = Quadrature.ofPoints(8);

    private static final Quadrature SOME = Quadrature.ofPoints(12);

    private static final Quadrature MANY = Quadrature.ofPoints(16);

    private static final double FOLDS_OF_FEW = 1;

    private static final double FOLDS_OF_SOME = 5;

    private static final double FOLDS_OF_MANY = 10;

    private static final int MOST_PANELS = 64;

    /** Exponents up to this neither overflow nor lose their partner in a sum. */
    private static final double SAFE_EXPONENT = 300;

    public ConstantMortality {
        Require.notNegative("F", mortality);
    }

    @Override
    public double after(double biomassTonnes, double years) {
        Require.notNegative("B0", biomassTonnes);
        Require.notNegative("years", years);
        return after(growth, mortality, biomassTonnes, years);
    }

    @Override
    public double extinctionTime(double biomassTonnes) {
        Require.notNegative("B0", biomassTonnes);
        return biomassTonnes == 0 ? 0 : Double.POSITIVE_INFINITY;
    }

    /** Removals in t over the given years, starting from the given biomass. */
    public double removals(double biomassTonnes, double years) {
        Require.notNegative("B0", biomassTonnes);
        Require.notNegative("years", years);
        return removals(growth, mortality, biomassTonnes, years);
    }

    /** Biomass in t after the given years, unchecked and without allocation, for inner loops: B₀, F, years ≥ 0. */
    static double after(SurplusProduction growth, double mortality, double biomassTonnes, double years) {
        double b0 = biomassTonnes / growth.capacityTonnes();
        double exponent = (growth.r() - growth.shape() * mortality) * years;
        if (growth.shape() == 1 && Math.abs(exponent) < SAFE_EXPONENT) {
            double gain = years * Stable.expm1Over(exponent, 1);
            return biomassTonnes * Math.exp(exponent) / (1 + growth.r() * b0 * gain);
        }
        return b0 == 0 ? 0 : growth.capacityTonnes() * Math.exp(logState(growth, mortality, Math.log(b0), years));
    }

    /** Removals in t over the given years, unchecked and without allocation: B₀, F, years ≥ 0. */
    static double removals(SurplusProduction growth, double mortality, double biomassTonnes, double years) {
        if (biomassTonnes == 0 || mortality == 0 || years == 0) {
            return 0;
        }
        double exponent = (growth.r() - growth.shape() * mortality) * years;
        if (growth.shape() == 1 && Math.abs(exponent) < SAFE_EXPONENT) {
            double b0 = biomassTonnes / growth.capacityTonnes();
            double gain = years * Stable.expm1Over(exponent, 1);
            return mortality * growth.capacityTonnes() / growth.r() * Math.log1p(growth.r() * b0 * gain);
        }
        return mortality * meanBiomass(growth, mortality, biomassTonnes, years) * years;
    }

    private static double logState(SurplusProduction growth, double mortality, double logStart, double years) {
        double n = growth.shape();
        double a = growth.r() - n * mortality;
        double w = Stable.expm1Over(n, -logStart) * Math.exp(-a * years)
                + mortality * years * Stable.expm1Over(-a * years, 1);
        if (Math.abs(n * w) <= 0.5) {
            return -Stable.log1pOver(n, w);
        }
        // far from b = 1: b^(−n) is a sum of two positive terms, added as logarithms because either may overflow
        double fromStart = -n * logStart - a * years;
        double fromGrowth = Math.log(growth.r() * years) + logMeanDecay(a * years);
        return -Stable.logSum(fromStart, fromGrowth) / n;
    }

    /** ln((1 − e^(−x))/x). */
    private static double logMeanDecay(double x) {
        return x < -SAFE_EXPONENT ? -x - Math.log(-x) : Math.log(Stable.expm1Over(-x, 1));
    }

    private static double meanBiomass(SurplusProduction growth, double mortality, double biomassTonnes, double years) {
        double logStart = Math.log(biomassTonnes / growth.capacityTonnes());
        double folds =
                years * (growth.r() * Math.max(1, Math.exp(growth.shape() * logStart)) + growth.shape() * mortality);
        Quadrature quadrature = folds <= FOLDS_OF_FEW ? FEW : folds <= FOLDS_OF_SOME ? SOME : MANY;
        int panels = (int) Math.min(MOST_PANELS, Math.ceil(folds / FOLDS_OF_MANY));
        double sum = 0;
        for (int panel = 0; panel < panels; panel++) {
            for (int i = 0; i < quadrature.nodes().length; i++) {
                double time = years * (panel + quadrature.nodes()[i]) / panels;
                sum += quadrature.weights()[i] * Math.exp(logState(growth, mortality, logStart, time));
            }
        }
        return growth.capacityTonnes() * sum / panels;
    }

    /** A Gauss–Legendre rule on 0…1, as plain arrays for inner loops. */
    private record Quadrature(double[] nodes, double[] weights) {
        static Quadrature ofPoints(int points) {
            GaussIntegrator rule = new GaussIntegratorFactory().legendre(points, 0, 1);
            return new Quadrature(
                    IntStream.range(0, points).mapToDouble(rule::getPoint).toArray(),
                    IntStream.range(0, points).mapToDouble(rule::getWeight).toArray());
        }
    }
}
