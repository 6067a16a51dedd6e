package org.merewarden.core.policy;

import java.util.function.DoubleUnaryOperator;
import java.util.stream.IntStream;
import org.merewarden.core.dynamics.CatchLinearRamp;
import org.merewarden.core.dynamics.FishedYear;
import org.merewarden.core.dynamics.PolicyRamp;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.Outlook;

/**
 * The policy's ramp for each draw of an outlook, each draw knowing its own biomass:
 *
 * <pre>
 *   F(B) = F target · share(B),  F target = fraction · FMSY
 *   share(B) = clip((B − B lim)/(BMSY − B lim), 0, 1)                line MORTALITY ({@link PolicyRamp})
 *   share(B) = clip((B_up/B)(B − B_lo)/(B_up − B_lo), 0, 1)          line CATCH ({@link CatchLinearRamp})
 * </pre>
 *
 * <p>As a course it is better informed than any office: the error of later assessments is left out.
 */
public final class RampCourse implements Course {
    private final DoubleUnaryOperator[] mortalities;

    public RampCourse(Policy policy, Outlook outlook) {
        this.mortalities = IntStream.range(0, outlook.draws())
                .mapToObj(i -> mortality(policy, outlook.law(i)))
                .toArray(DoubleUnaryOperator[]::new);
    }

    @Override
    public double mortality(int draw, double biomassTonnes, FishedYear year) {
        return mortality(draw, biomassTonnes);
    }

    double mortality(int draw, double biomassTonnes) {
        return mortalities[draw].applyAsDouble(biomassTonnes);
    }

    /** F(B), 1/yr, at most the largest of a season. */
    static DoubleUnaryOperator mortality(Policy policy, SurplusProduction law) {
        Policy.Ramp ramp = policy.ramp();
        double target = Math.min(ramp.targetFraction() * law.fmsy(), FishedYear.LARGEST_MORTALITY);
        double capacity = law.capacityTonnes();
        if (ramp.line() == Policy.Line.CATCH) {
            var share = new CatchLinearRamp(ramp.lowFraction() * capacity, ramp.highFraction() * capacity);
            return b -> target * share.shareOfTarget(b);
        }
        var share = new PolicyRamp(policy.limitFraction() * capacity, law.bmsy());
        return b -> target * share.shareOfTarget(b);
    }
}
