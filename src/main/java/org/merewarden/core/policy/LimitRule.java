package org.merewarden.core.policy;

import java.util.ArrayList;
import java.util.List;
import java.util.OptionalInt;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.policy.Recommendation.Rule;
import org.merewarden.core.policy.Recommendation.Step;

/**
 * The office's written rule from an outlook to a limit of total removals.
 *
 * <pre>
 *   1  x = quantile over the draws of the catch at F(B)                    ({@link RampCourse})
 *   2  x ← min(x, C), C the largest constant catch with risk(C) ≤ tolerance; 0 where even risk(0) is above it
 *   3  L &gt; 0:  x ← min(x, (1 + cap) L);   x ← (1 − cap) L if that is more than x and at most C
 *   4  x ← x + min(carry-over · L, L − R)  where R &lt; L;   x ← x − payback · (R − L)  where R &gt; L;   x ← clip(x, 0, C)
 *   5  x ← rounded down to a step
 *
 *   L  limit of the season before, t       R  its removals, t       risk  see {@link Outlook}
 * </pre>
 *
 * <p>Risk always wins: no step leaves more than C. Without an earlier limit steps 3 and 4 change nothing; after a limit
 * of 0 step 3 does not. Because risk rises with the catch, "passes step 2" and "at most C" are the same.
 *
 * <p>Source: the office's policy. The shape of the rule is common practice; its constants are the policy's own.
 */
public final class LimitRule {
    private final Policy policy;

    public LimitRule(Policy policy) {
        this.policy = policy;
    }

    /** The limit for the outlook's first season. The outlook's horizon and B lim are the policy's. */
    public Recommendation recommend(Outlook outlook, EarlierSeason earlier) {
        double ramp = Quantiles.of(outlook.firstCatch(new RampCourse(policy, outlook)), policy.quantile());
        double ceiling = outlook.largestCatch(policy.tolerance());
        List<Step> steps = steps(ramp, ceiling, earlier);
        double limit = steps.get(steps.size() - 1).tonnes();
        return new Recommendation(
                limit,
                steps,
                ceiling,
                recovery(outlook, ceiling),
                outlook.risk(Course.ofCatch(limit)),
                outlook.posterior().strength() == EvidenceStrength.NONE);
    }

    /** The arithmetic alone: from the ramp's catch and the ceiling (see {@link Recommendation}) to the limit, t. */
    List<Step> steps(double ramp, double ceiling, EarlierSeason earlier) {
        double most = Double.isNaN(ceiling) ? 0 : ceiling;
        List<Step> steps = new ArrayList<>();
        steps.add(new Step(Rule.RAMP, ramp));
        double x = Math.min(ramp, most);
        steps.add(new Step(Rule.RISK, x));
        x = steady(x, most, earlier.limitTonnes());
        steps.add(new Step(Rule.STEADINESS, x));
        x = Math.max(0, x + carriedOver(earlier) - paidBack(earlier));
        steps.add(new Step(Rule.LAST_SEASON, x));
        x = Math.min(x, most);
        steps.add(new Step(Rule.RISK_AGAIN, x));
        steps.add(new Step(Rule.ROUNDING, rounded(x)));
        return steps;
    }

    private double steady(double x, double most, double before) {
        if (!(before > 0)) {
            return x;
        }
        double least = (1 - policy.steadinessCap()) * before;
        if (least > x && least <= most) {
            return least;
        }
        return Math.min(x, (1 + policy.steadinessCap()) * before);
    }

    /** What of last season's limit was not used up and may be added, t. */
    public double carriedOver(EarlierSeason earlier) {
        double unused = earlier.limitTonnes() - earlier.removalsTonnes();
        return unused > 0 ? Math.min(unused, policy.lastSeason().carryOver() * earlier.limitTonnes()) : 0;
    }

    /** What was taken over last season's limit and is subtracted, t. */
    public double paidBack(EarlierSeason earlier) {
        double over = earlier.removalsTonnes() - earlier.limitTonnes();
        return over > 0 ? policy.lastSeason().payback() * over : 0;
    }

    /** Down to a whole number of steps, t; see {@link Policy.Rounding}. Nothing is left of less than one step. */
    public double rounded(double tonnes) {
        double step = step(tonnes);
        // a hair is added, so that 12.3 t in steps of 0.1 t stay 12.3 t
        return Math.floor(tonnes * 1000 / step + 1e-9) * step / 1000;
    }

    /** kg. */
    private double step(double tonnes) {
        double wanted = policy.rounding().share() * tonnes * 1000;
        double least = policy.rounding().leastKilograms();
        if (!(wanted > least)) {
            return least;
        }
        double power = Math.pow(10, Math.floor(Math.log10(wanted) + 1e-12));
        double lead = wanted / power + 1e-9;
        double step = (lead >= 5 ? 5 : lead >= 2 ? 2 : 1) * power;
        return Math.max(least, step);
    }

    private @Nullable Integer recovery(Outlook outlook, double ceiling) {
        OptionalInt seasons = Double.isNaN(ceiling) ? outlook.recovery(policy.tolerance()) : OptionalInt.empty();
        return seasons.isPresent() ? (Integer) seasons.getAsInt() : null;
    }

    /**
     * The effort that the same rule allows, F = q E: the quantile over the draws of F(B)/q, lowered to the largest constant
     * effort within the tolerated risk.
     *
     * @param catchability q by draw, 1/(unit of effort · yr), > 0
     * @return in the unit of effort, not rounded; 0 where even no fishing is too risky
     */
    public double effort(Outlook outlook, double... catchability) {
        RampCourse ramp = new RampCourse(policy, outlook);
        double[] wanted = IntStream.range(0, outlook.draws())
                .mapToDouble(i -> ramp.mortality(i, outlook.startBiomass(i)) / catchability[i])
                .toArray();
        double quantile = Quantiles.of(wanted, policy.quantile());
        double usual = IntStream.range(0, outlook.draws())
                .mapToDouble(i -> outlook.law(i).fmsy() / catchability[i])
                .average()
                .orElseThrow();
        double most = outlook.largest(effort -> constantEffort(effort, catchability), usual, policy.tolerance());
        return Double.isNaN(most) ? 0 : Math.min(quantile, most);
    }

    private static Course constantEffort(double effort, double... catchability) {
        return Course.ofMortality(IntStream.range(0, catchability.length)
                .mapToDouble(i -> catchability[i] * effort)
                .toArray());
    }
}
