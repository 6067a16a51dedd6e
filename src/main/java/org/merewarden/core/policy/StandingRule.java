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
        HeldRemovals held = new HeldRemovals(posterior, removalsTonnes);
        double collapse = held.collapseProbability();
        double below = HeldRemovals.share(
                draws, i -> posterior.presentBiomass(i) < policy.limitFraction() * posterior.capacity(i));
        double[] margin = held.margin();
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
                HeldRemovals.share(draws, i -> margin[i] < 0),
                median(held.tippingBiomass()),
                median(held.returnTime()));
    }

    Standing standing(double p, EvidenceStrength strength) {
        if (p >= policy.standing().criticalFrom()) {
            return Standing.CRITICAL;
        }
        if (p >= policy.standing().strainedFrom()) {
            return Standing.STRAINED;
        }
        return p >= policy.standing().watchFrom() || strength == EvidenceStrength.NONE
                ? Standing.WATCH
                : Standing.SECURE;
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
        return !CatchBalance.collapses(law, biomass, removals)
                && biomass >= policy.limitFraction() * law.capacityTonnes();
    }

    /** Over the draws that have the quantity; null where fewer than half do. */
    private static @Nullable Double median(double[] ofDraws) {
        double[] values = HeldRemovals.known(ofDraws);
        return values.length == 0 ? null : (Double) Quantiles.of(values, 0.5);
    }
}
