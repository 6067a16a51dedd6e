package org.merewarden.advice;

import java.math.BigDecimal;
import java.util.function.ToDoubleFunction;
import org.merewarden.core.policy.Policy;

/** The constants of the rule that people see, compare and propose, in the order of its steps. */
enum PolicyConstant {
    LIMIT_FRACTION("limitFraction", Group.RAMP, Unit.PERCENT, Range.between(0, 100 / Math.E), Policy::limitFraction),
    TARGET("target", Group.RAMP, Unit.PERCENT, Range.over(0, 100), p -> p.ramp().targetFraction()),
    LOW("low", Group.RAMP, Unit.PERCENT, Range.under(0, 100), p -> p.ramp().lowFraction()),
    HIGH("high", Group.RAMP, Unit.PERCENT, Range.over(0, 100), p -> p.ramp().highFraction()),
    QUANTILE("quantile", Group.RAMP, Unit.PERCENT, Range.over(0, 50), Policy::quantile),
    HORIZON("horizon", Group.RISK, Unit.SEASONS, Range.within(1, Policy.LONGEST_HORIZON), Policy::horizonYears),
    TOLERANCE("tolerance", Group.RISK, Unit.PERCENT, Range.between(0, 100), Policy::tolerance),
    STEADINESS("steadiness", Group.STEADINESS, Unit.PERCENT, Range.over(0, 100), Policy::steadinessCap),
    CARRY_OVER(
            "carryOver",
            Group.LAST_SEASON,
            Unit.PERCENT,
            Range.within(0, 100),
            p -> p.lastSeason().carryOver()),
    PAYBACK(
            "payback",
            Group.LAST_SEASON,
            Unit.PERCENT,
            Range.within(0, 100),
            p -> p.lastSeason().payback()),
    ROUNDING_SHARE(
            "roundingShare",
            Group.ROUNDING,
            Unit.PERCENT,
            Range.within(0, 10),
            p -> p.rounding().share()),
    ROUNDING_LEAST(
            "roundingLeast",
            Group.ROUNDING,
            Unit.KILOGRAMS,
            Range.over(0, 1e6),
            p -> p.rounding().leastKilograms()),
    SUBSISTENCE(
            "subsistence",
            Group.SET_ASIDES,
            Unit.PERCENT,
            Range.within(0, 100),
            p -> p.setAsides().subsistence()),
    ANGLING(
            "angling",
            Group.SET_ASIDES,
            Unit.PERCENT,
            Range.within(0, 100),
            p -> p.setAsides().angling()),
    RESEARCH(
            "research",
            Group.SET_ASIDES,
            Unit.PERCENT,
            Range.within(0, 100),
            p -> p.setAsides().research()),
    OTHER(
            "other",
            Group.SET_ASIDES,
            Unit.PERCENT,
            Range.within(0, 100),
            p -> p.setAsides().other()),
    WATCH(
            "watch",
            Group.STANDING,
            Unit.PERCENT,
            Range.between(0, 100),
            p -> p.standing().watchFrom()),
    STRAINED(
            "strained",
            Group.STANDING,
            Unit.PERCENT,
            Range.between(0, 100),
            p -> p.standing().strainedFrom()),
    CRITICAL(
            "critical",
            Group.STANDING,
            Unit.PERCENT,
            Range.between(0, 100),
            p -> p.standing().criticalFrom()),
    INTERVAL("interval", Group.SHOWN, Unit.PERCENT, Range.between(0, 100), Policy::intervalProbability);

    /** Parts of the form. */
    enum Group {
        RAMP,
        RISK,
        STEADINESS,
        LAST_SEASON,
        ROUNDING,
        SET_ASIDES,
        STANDING,
        SHOWN
    }

    /** As people read and type it. */
    enum Unit {
        PERCENT,
        SEASONS,
        KILOGRAMS
    }

    /**
     * What may be typed, in the constant's unit.
     *
     * @param kind which ends belong to it: within (both), over (not the low one), under (not the high one), between
     *     (neither)
     */
    record Range(double low, double high, String kind) {
        static Range within(double low, double high) {
            return new Range(low, high, "within");
        }

        static Range over(double low, double high) {
            return new Range(low, high, "over");
        }

        static Range under(double low, double high) {
            return new Range(low, high, "under");
        }

        static Range between(double low, double high) {
            return new Range(low, high, "between");
        }

        boolean holds(double value) {
            boolean lowIn = kind.equals("within") || kind.equals("under");
            boolean highIn = kind.equals("within") || kind.equals("over");
            return (lowIn ? value >= low : value > low) && (highIn ? value <= high : value < high);
        }
    }

    /** Its name in forms and message keys. */
    final String key;

    final Group group;
    final Unit unit;
    final Range range;
    private final ToDoubleFunction<Policy> value;

    PolicyConstant(String key, Group group, Unit unit, Range range, ToDoubleFunction<Policy> value) {
        this.key = key;
        this.group = group;
        this.unit = unit;
        this.range = range;
        this.value = value;
    }

    /** In the unit that people read; exact in decimals, so that what is shown and typed again is the same constant. */
    double shown(Policy policy) {
        double stored = value.applyAsDouble(policy);
        return unit == Unit.PERCENT
                ? BigDecimal.valueOf(stored).movePointRight(2).doubleValue()
                : stored;
    }

    /** What was typed in the constant's unit, as the policy holds it. */
    double stored(double typed) {
        return unit == Unit.PERCENT ? BigDecimal.valueOf(typed).movePointLeft(2).doubleValue() : typed;
    }
}
