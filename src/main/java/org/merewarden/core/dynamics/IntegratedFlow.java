package org.merewarden.core.dynamics;

import java.util.Arrays;
import java.util.stream.DoubleStream;

/**
 * dB/dt = g(B) − u φ(B) for any law and rule, integrated by {@link ScalarEquation}.
 *
 * <p>A rule that removes nothing from an empty lake (φ(0) = 0) cannot bring the stock to zero in finite time: ln B is
 * integrated, so small stocks keep their digits. Any other rule is integrated in B, and the crossing of zero is an event
 * that ends it. The time to extinction is the integral of dB/(u φ − g) from B₀ down to 0 when no equilibrium lies in
 * between; else it is never.
 *
 * <p>Accuracy: 1e-7 relative, for rules with φ(0) &gt; 0 as long as B &gt; 1e-5 K. Equilibria closer together than the
 * resolution of {@link EquilibriumCurve} are not seen by the time to extinction. A solution that is not found is NaN.
 *
 * @param harvest u, ≥ 0, in the rule's unit
 */
public record IntegratedFlow(GrowthLaw law, HarvestRule rule, double harvest) implements Flow {
    private static final double ABSOLUTE_LOGARITHM = 1e-11;

    private static final double ABSOLUTE_STATE = 1e-13;

    public IntegratedFlow {
        Require.notNegative("harvest", harvest);
    }

    @Override
    public double after(double biomassTonnes, double years) {
        Require.notNegative("B0", biomassTonnes);
        Require.notNegative("years", years);
        if (biomassTonnes == 0 || years == 0) {
            return biomassTonnes;
        }
        if (canEmpty()) {
            return law.capacity() * states().after(biomassTonnes / law.capacity(), years, 0);
        }
        return Math.exp(logarithms().after(Math.log(biomassTonnes), years, Double.NEGATIVE_INFINITY));
    }

    @Override
    public double extinctionTime(double biomassTonnes) {
        Require.notNegative("B0", biomassTonnes);
        if (biomassTonnes == 0) {
            return 0;
        }
        if (!canEmpty() || holdsAtOrBelow(biomassTonnes)) {
            return Double.POSITIVE_INFINITY;
        }
        return states().timeBetween(biomassTonnes / law.capacity(), 0);
    }

    private boolean canEmpty() {
        return harvest * rule.effect(0) > 0;
    }

    private boolean holdsAtOrBelow(double biomassTonnes) {
        return net(biomassTonnes) >= 0
                || EquilibriumCurve.trace(law, rule).equilibria(harvest).stream()
                        .anyMatch(equilibrium -> equilibrium.biomassTonnes() <= biomassTonnes);
    }

    private double net(double biomassTonnes) {
        double biomass = Math.max(0, biomassTonnes);
        return law.rate(biomass) - harvest * rule.effect(biomass);
    }

    private double netPerCapita(double biomassTonnes) {
        double effectPerCapita = biomassTonnes > 0 ? rule.effect(biomassTonnes) / biomassTonnes : rule.slope(0);
        return law.perCapita(biomassTonnes) - harvest * effectPerCapita;
    }

    /** The equation of B/K, with the empty lake among its breaks. */
    private ScalarEquation states() {
        double capacity = law.capacity();
        double[] breaks = DoubleStream.concat(DoubleStream.of(0), Arrays.stream(rule.kinks()))
                .map(kink -> kink / capacity)
                .toArray();
        return new ScalarEquation(state -> net(state * capacity) / capacity, breaks, ABSOLUTE_STATE);
    }

    /** The equation of ln B; a kink at zero lies at −infinity and is never met. */
    private ScalarEquation logarithms() {
        double[] breaks = Arrays.stream(rule.kinks()).map(Math::log).toArray();
        return new ScalarEquation(logB -> netPerCapita(Math.exp(logB)), breaks, ABSOLUTE_LOGARITHM);
    }
}
