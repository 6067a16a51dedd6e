package org.merewarden.core.policy;

/**
 * The constants of the office's written rule, from the draws of an assessment to the amount to be logged.
 *
 * @param limitFraction B lim as a fraction of K, in (0, 1/e): BMSY/K is at least 1/e for every shape, so B lim lies below
 *     BMSY in every draw
 * @param ramp from biomass to fishing mortality
 * @param quantile of the ramp's catch over the draws that is taken, in (0, 0.5]; lower is more careful
 * @param horizonYears Y, seasons looked ahead, 1–50
 * @param tolerance largest chance of B &lt; B lim at least once within Y that a limit may carry, in (0, 1)
 * @param steadinessCap largest change against an earlier limit &gt; 0, as a fraction of it, in (0, 1]
 * @param lastSeason what of last season's limit is carried over or paid back
 * @param setAsides parts of the limit that are kept from commercial fishing
 * @param rounding of the limit, always down
 * @param standing cut points of secure, watch, strained and critical
 * @param pooled whether estimates borrowed across lakes are used
 * @param intervalProbability of the intervals that are shown, in (0, 1)
 */
public record Policy(
        double limitFraction,
        Ramp ramp,
        double quantile,
        int horizonYears,
        double tolerance,
        double steadinessCap,
        LastSeason lastSeason,
        SetAsides setAsides,
        Rounding rounding,
        CutPoints standing,
        boolean pooled,
        double intervalProbability) {

    /** Largest B lim / K: BMSY/K of the Fox law, the lowest of all shapes. */
    public static final double LIMIT_FRACTION_BELOW = 1 / Math.E;

    public static final int LONGEST_HORIZON = 50;

    /** The program's own: common practice where no published standard prescribes a constant. */
    public static final Policy DEFAULT = new Policy(
            0.2,
            new Ramp(Line.MORTALITY, 0.8, 0.1, 0.4),
            0.35,
            10,
            0.10,
            0.2,
            new LastSeason(0, 1),
            new SetAsides(0, 0, 0, 0),
            new Rounding(0.01, 10),
            new CutPoints(0.05, 0.10, 0.50),
            false,
            0.8);

    /** What rises in a straight line with biomass. */
    public enum Line {
        /** F, from 0 at B lim to its target at BMSY. */
        MORTALITY,
        /** The catch, from 0 at B_lo to the target mortality's at B_up. */
        CATCH
    }

    /**
     * @param targetFraction F target as a fraction of FMSY, in (0, 1]
     * @param lowFraction B_lo / K, used by {@link Line#CATCH} only, in [0, 1)
     * @param highFraction B_up / K, used by {@link Line#CATCH} only, in (B_lo/K, 1]
     */
    public record Ramp(Line line, double targetFraction, double lowFraction, double highFraction) {
        public Ramp {
            require(0 < targetFraction && targetFraction <= 1, "0 < F target / FMSY <= 1", targetFraction);
            require(0 <= lowFraction && lowFraction < highFraction, "0 <= B_lo/K < B_up/K", lowFraction);
            require(highFraction <= 1, "B_up/K <= 1", highFraction);
        }
    }

    /**
     * @param carryOver largest part of last season's limit that may be added where it was not used up, in [0, 1]
     * @param payback part of what was taken over last season's limit that is subtracted, in [0, 1]
     */
    public record LastSeason(double carryOver, double payback) {
        public LastSeason {
            require(0 <= carryOver && carryOver <= 1, "0 <= carry-over <= 1", carryOver);
            require(0 <= payback && payback <= 1, "0 <= payback <= 1", payback);
        }
    }

    /** Fractions of the limit, each in [0, 1], together at most 1. */
    public record SetAsides(double subsistence, double angling, double research, double other) {
        public SetAsides {
            for (double part : new double[] {subsistence, angling, research, other}) {
                require(0 <= part && part <= 1, "0 <= set-aside <= 1", part);
            }
            double sum = subsistence + angling + research + other;
            require(sum <= 1 + 1e-12, "set-asides together <= 1", sum);
        }
    }

    /**
     * The step is the largest of 1, 2, 5, 10, 20, 50 … kg that is at most this share of the limit, but never less than
     * the least step.
     *
     * @param share of the limit, in [0, 0.1]
     * @param leastKilograms least step, kg, &gt; 0
     */
    public record Rounding(double share, double leastKilograms) {
        public Rounding {
            require(0 <= share && share <= 0.1, "0 <= share <= 0.1", share);
            require(0 < leastKilograms && leastKilograms <= 1e6, "0 < least step <= 1e6 kg", leastKilograms);
        }
    }

    /**
     * @param watchFrom probability from which a stock is watched, in (0, 1)
     * @param strainedFrom from which it is strained
     * @param criticalFrom from which it is critical
     */
    public record CutPoints(double watchFrom, double strainedFrom, double criticalFrom) {
        public CutPoints {
            require(0 < watchFrom && watchFrom < strainedFrom, "0 < watch < strained", watchFrom);
            require(strainedFrom < criticalFrom && criticalFrom < 1, "strained < critical < 1", criticalFrom);
        }
    }

    public Policy {
        require(0 < limitFraction && limitFraction < LIMIT_FRACTION_BELOW, "0 < B lim / K < 1/e", limitFraction);
        require(0 < quantile && quantile <= 0.5, "0 < quantile <= 0.5", quantile);
        require(1 <= horizonYears && horizonYears <= LONGEST_HORIZON, "1 <= horizon <= 50", horizonYears);
        require(0 < tolerance && tolerance < 1, "0 < tolerance < 1", tolerance);
        require(0 < steadinessCap && steadinessCap <= 1, "0 < steadiness cap <= 1", steadinessCap);
        require(0 < intervalProbability && intervalProbability < 1, "0 < interval < 1", intervalProbability);
    }

    private static void require(boolean holds, String rule, double value) {
        if (!holds) {
            throw new IllegalArgumentException("needs " + rule + ", got " + value);
        }
    }
}
