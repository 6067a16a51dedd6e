package org.merewarden.core.policy;

import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.dynamics.CatchBalance;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;

/**
 * Where a stock stands under a given constant removal H, from the draws of its assessment.
 *
 * <pre>
 * collapse course   H &gt; MSY, or B below the tipping biomass (B &lt; BMSY and g(B) &lt; H)
 * p                 max( P(collapse course), P(B &lt; B lim) now )
 * secure            p &lt; 0.05 and evidence not none        watch     p &lt; 0.10, or secure but for the evidence
 * strained          p &lt; 0.50                              critical  p &gt;= 0.50      (cut points: the policy's)
 * margin            (MSY − H) / MSY
 *
 * H   removals, t/yr       B   biomass at the start of the coming season, t      g   surplus production, t/yr
 * </pre>
 *
 * Source: the office's policy; no published standard prescribes these cut points. A posterior without draws has no
 * standing. Exact up to the draws.
 */
public final class StandingRule {

    /**
     * @param mainlyLittleKnown the middle of the draws alone would stand better: width, not level, decides
     * @param marginLow 10 % quantile of the margin
     * @param margin its median
     * @param marginHigh 90 % quantile
     * @param tippingBiomassTonnes median over the draws that have one; null where fewer than half do or H = 0
     * @param returnTimeYears median 1/|λ| on the stable branch over the draws that have one; null as above
     */
    public record Result(
            Standing standing,
            boolean mainlyLittleKnown,
            double probability,
            double collapseProbability,
            double belowLimitProbability,
            double marginLow,
            double margin,
            double marginHigh,
            double marginNegativeProbability,
            @Nullable Double tippingBiomassTonnes,
            @Nullable Double returnTimeYears) {}

    private final Policy policy;

    public StandingRule(Policy policy) {
        this.policy = policy;
    }

    /**
     * @param posterior with at least one draw
     * @param removalsTonnes constant removals H, t/yr, >= 0
     */
    public Result judge(Posterior posterior, double removalsTonnes) {
        int draws = posterior.draws();
        if (draws == 0) {
            throw new IllegalArgumentException("needs draws >= 1, got 0");
        }
        double collapse =
                share(draws, i -> collapseCourse(law(posterior, i), posterior.presentBiomass(i), removalsTonnes));
        double below = share(draws, i -> posterior.presentBiomass(i) < policy.limitFraction() * posterior.capacity(i));
        double[] margin = IntStream.range(0, draws)
                .mapToDouble(i -> 1 - removalsTonnes / posterior.msyTonnes()[i])
                .toArray();
        double p = Math.max(collapse, below);
        Standing standing = standing(p, posterior.strength());
        return new Result(
                standing,
                standing != Standing.SECURE && middleIsSound(posterior, removalsTonnes),
                p,
                collapse,
                below,
                Quantiles.of(margin, 0.1),
                Quantiles.of(margin, 0.5),
                Quantiles.of(margin, 0.9),
                share(draws, i -> margin[i] < 0),
                removalsTonnes == 0 ? null : median(posterior, (law, i) -> tipping(law, removalsTonnes)),
                median(posterior, (law, i) -> returnTime(law, removalsTonnes)));
    }

    Standing standing(double p, EvidenceStrength strength) {
        if (p >= policy.criticalFrom()) {
            return Standing.CRITICAL;
        }
        if (p >= policy.strainedFrom()) {
            return Standing.STRAINED;
        }
        return p >= policy.watchFrom() || strength == EvidenceStrength.NONE ? Standing.WATCH : Standing.SECURE;
    }

    /** Whether constant removals H from biomass B run the stock down to nothing. */
    static boolean collapseCourse(SurplusProduction law, double biomass, double removals) {
        return removals > law.msy() || (biomass < law.bmsy() && law.rate(biomass) < removals);
    }

    /** Whether the medians of the draws, taken as one stock, are on no collapse course and above B lim. */
    private boolean middleIsSound(Posterior posterior, double removals) {
        var law = SurplusProduction.fromReferencePoints(
                Quantiles.of(posterior.msyTonnes(), 0.5),
                Quantiles.of(posterior.fmsyPerYear(), 0.5),
                Quantiles.of(posterior.shape(), 0.5));
        double[] relative = IntStream.range(0, posterior.draws())
                .mapToDouble(i -> posterior.presentBiomass(i) / posterior.capacity(i))
                .toArray();
        double biomass = Quantiles.of(relative, 0.5) * law.capacityTonnes();
        return !collapseCourse(law, biomass, removals) && biomass >= policy.limitFraction() * law.capacityTonnes();
    }

    private interface OfDraw {
        double value(SurplusProduction law, int draw);
    }

    private static @Nullable Double median(Posterior posterior, OfDraw ofDraw) {
        double[] values = IntStream.range(0, posterior.draws())
                .mapToDouble(i -> ofDraw.value(law(posterior, i), i))
                .filter(Double::isFinite)
                .toArray();
        return values.length * 2 < posterior.draws() || values.length == 0 ? null : (Double) Quantiles.of(values, 0.5);
    }

    private static double tipping(SurplusProduction law, double removals) {
        return removals < law.msy() ? new CatchBalance(law, removals).tippingBiomass() : Double.NaN;
    }

    private static double returnTime(SurplusProduction law, double removals) {
        return removals < law.msy() ? -1 / law.slope(new CatchBalance(law, removals).stableBiomass()) : Double.NaN;
    }

    private static SurplusProduction law(Posterior posterior, int draw) {
        return SurplusProduction.fromReferencePoints(
                posterior.msyTonnes()[draw],
                posterior.fmsyPerYear()[draw],
                posterior.shape()[draw]);
    }

    private static double share(int draws, java.util.function.IntPredicate holds) {
        return (double) IntStream.range(0, draws).filter(holds).count() / draws;
    }
}
