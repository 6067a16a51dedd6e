package org.merewarden.core.policy;

import java.util.function.IntPredicate;
import java.util.function.IntToDoubleFunction;
import java.util.stream.DoubleStream;
import java.util.stream.IntStream;
import org.merewarden.core.dynamics.CatchBalance;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.inference.Posterior;

/**
 * What a constant removal H, held for ever, means to each draw of an assessment.
 *
 * <pre>
 * margin            (MSY − H) / MSY: how far H lies under the fold
 * tipping biomass   the unstable equilibrium, g(B) = H with 0 &lt; B &lt; BMSY; none for H = 0 or H &gt;= MSY
 * return time       1/|λ|, λ = g′ at the stable equilibrium; none for H &gt;= MSY
 * collapse course   H &gt; MSY, or B below the tipping biomass (B &lt; BMSY and g(B) &lt; H)
 *
 * H   removals, t/yr       B   biomass at the start of the coming season, t      g   surplus production, t/yr
 * </pre>
 *
 * <p>Sources and accuracy: {@link CatchBalance}. Arrays are by draw; a quantity that a draw does not have is NaN there.
 */
public final class HeldRemovals {
    private final Posterior posterior;
    private final double removals;

    /** @param removalsTonnes H, t/yr, >= 0 */
    public HeldRemovals(Posterior posterior, double removalsTonnes) {
        if (!(removalsTonnes >= 0 && removalsTonnes < Double.POSITIVE_INFINITY)) {
            throw new IllegalArgumentException("needs 0 <= H < infinity, got " + removalsTonnes);
        }
        this.posterior = posterior;
        this.removals = removalsTonnes;
    }

    /** Dimensionless, at most 1; below 0 where H exceeds MSY. */
    public double[] margin() {
        return byDraw(i -> 1 - removals / posterior.msyTonnes()[i]);
    }

    /** t. */
    public double[] tippingBiomass() {
        return byDraw(i -> {
            SurplusProduction law = law(i);
            return removals > 0 && removals < law.msy() ? new CatchBalance(law, removals).tippingBiomass() : Double.NaN;
        });
    }

    /** Years. */
    public double[] returnTime() {
        return byDraw(i -> {
            SurplusProduction law = law(i);
            return removals < law.msy() ? -1 / law.slope(new CatchBalance(law, removals).stableBiomass()) : Double.NaN;
        });
    }

    /** Part of the draws on a collapse course, 0–1; NaN without draws. */
    public double collapseProbability() {
        return share(posterior.draws(), i -> CatchBalance.collapses(law(i), posterior.presentBiomass(i), removals));
    }

    /** The draws that have the quantity, in order; none where fewer than half do. */
    public static double[] known(double[] ofDraws) {
        double[] values = DoubleStream.of(ofDraws).filter(Double::isFinite).toArray();
        return values.length * 2 < ofDraws.length ? new double[0] : values;
    }

    static double share(int draws, IntPredicate holds) {
        return (double) IntStream.range(0, draws).filter(holds).count() / draws;
    }

    private double[] byDraw(IntToDoubleFunction value) {
        return IntStream.range(0, posterior.draws()).mapToDouble(value).toArray();
    }

    private SurplusProduction law(int draw) {
        return SurplusProduction.fromReferencePoints(
                posterior.msyTonnes()[draw],
                posterior.fmsyPerYear()[draw],
                posterior.shape()[draw]);
    }
}
