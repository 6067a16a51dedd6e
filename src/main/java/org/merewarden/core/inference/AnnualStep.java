package org.merewarden.core.inference;

/**
 * One season of the difference equation that the simple estimators share.
 *
 * <pre>
 *   B⁺      = (B(t) + S)(1 − m)
 *   B(t+1)  = B⁺ + g(B⁺) − C
 *   g(B)    = (r/n) B (1 − (B/K)^n),    n → 0:  r B ln(K/B)
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>B</td><td>biomass at the season's start, t</td></tr>
 * <tr><td>S</td><td>stocked fish that recruit, t</td></tr>
 * <tr><td>m</td><td>fraction lost to a fish kill</td></tr>
 * <tr><td>C</td><td>removals, t</td></tr>
 * <tr><td>r, K, n</td><td>growth, 1/yr; capacity, t; shape (1 Graham–Schaefer, 0 Fox)</td></tr>
 * </table>
 *
 * <p>Source: Pella &amp; Tomlinson 1969, Bull. Inter-Am. Trop. Tuna Comm. 13: 419–496; as an annual step in Polacheck,
 * Hilborn &amp; Punt 1993, Can. J. Fish. Aquat. Sci. 50: 2597–2607. The step overshoots for r above 2, so its users keep
 * r at or below {@link #LARGEST_R}.
 */
final class AnnualStep {
    /** The annual step has no steady state that attracts above this r (n = 1). */
    static final double LARGEST_R = 2;

    private AnnualStep() {}

    /** Surplus production in t/yr of a biomass in t. */
    static double growth(double biomass, double r, double capacity, double n) {
        if (n == 1) {
            return r * biomass * (1 - biomass / capacity);
        }
        double logFraction = Math.log(biomass / capacity);
        return n == 0 ? -r * biomass * logFraction : -(r / n) * biomass * Math.expm1(n * logFraction);
    }

    /** ∂g/∂ln K = r B (B/K)^n. */
    static double growthByLogCapacity(double biomass, double r, double capacity, double n) {
        return r * biomass * (n == 1 ? biomass / capacity : Math.pow(biomass / capacity, n));
    }

    /** ∂g/∂B = g/B − r (B/K)^n. */
    static double growthByBiomass(double biomass, double r, double capacity, double n) {
        return (growth(biomass, r, capacity, n) - growthByLogCapacity(biomass, r, capacity, n)) / biomass;
    }

    /** B⁺: biomass after stocking and fish kill, t. */
    static double afterEvents(double biomass, double stockedTonnes, double killedFraction) {
        return (biomass + stockedTonnes) * (1 - killedFraction);
    }

    /** Biomass at the next season's start; negative where the removals exceed what is there. */
    static double next(double afterEvents, double removals, double r, double capacity, double n) {
        return afterEvents + growth(afterEvents, r, capacity, n) - removals;
    }

    /** F of a season, 1/yr: removals over the mean of the biomass after events and at the end. */
    static double fishing(double removals, double afterEvents, double end) {
        return removals == 0 ? 0 : removals / (0.5 * (afterEvents + end));
    }

    /** BMSY / K = (1 + n)^(−1/n); 1/e for n = 0. */
    static double bmsyFraction(double n) {
        return n == 0 ? Math.exp(-1) : Math.exp(-Math.log1p(n) / n);
    }
}
