package org.merewarden.core.policy;

import java.util.Arrays;
import java.util.Comparator;
import java.util.stream.IntStream;

/**
 * From limit to logbook: limit (total removals) − set-asides = commercial removals; × expected reported fraction = the
 * amount to be logged. Shares of it are whole kilograms that add up exactly.
 */
public final class LimitArithmetic {
    private LimitArithmetic() {}

    /**
     * @param limitTonnes total removals, t, >= 0
     * @param setAsidesTonnes all set-asides together, t, in [0, limit]
     * @param reportedFraction of the commercial removals that the logbook will show, in (0, 1]
     * @return the amount to be logged, t
     */
    public static double toBeLogged(double limitTonnes, double setAsidesTonnes, double reportedFraction) {
        if (!(setAsidesTonnes >= 0 && setAsidesTonnes <= limitTonnes)) {
            throw new IllegalArgumentException(
                    "needs 0 <= set-asides <= limit " + limitTonnes + ", got " + setAsidesTonnes);
        }
        if (!(reportedFraction > 0 && reportedFraction <= 1)) {
            throw new IllegalArgumentException("needs 0 < reported fraction <= 1, got " + reportedFraction);
        }
        return (limitTonnes - setAsidesTonnes) * reportedFraction;
    }

    /**
     * A set-aside as the policy's share of the limit, rounded down to whole kilograms, so that the parts are never more
     * than the whole.
     *
     * @param share in [0, 1]
     * @param limitTonnes total removals, t, >= 0
     * @return t
     */
    public static double setAside(double share, double limitTonnes) {
        // a hair is added before rounding down, so that a tenth of 12.3 t is 1.230 t and not 1.229 t
        return Math.floor(share * limitTonnes * 1000 + 1e-6) / 1000;
    }

    /**
     * Splits an amount by shares that may leave a part unallocated. Whole kilograms by the method of the largest
     * remainder (Hamilton), ties to the earlier share: the parts add up to the rounded-down total of the shares.
     *
     * @param totalKg amount to be logged, kg, >= 0
     * @param sharePercent shares, each in (0, 100], together at most 100
     */
    public static long[] allocate(double totalKg, double... sharePercent) {
        double sum = Arrays.stream(sharePercent).sum();
        if (sum > 100 + 1e-9) {
            throw new IllegalArgumentException("needs shares that add up to <= 100, got " + sum);
        }
        double[] exact =
                Arrays.stream(sharePercent).map(share -> totalKg * share / 100).toArray();
        // a hair is added before rounding down, so that 0.3 + 0.7 of 10 kg is 10 and not 9
        long toGive = (long) Math.floor(totalKg * Math.min(sum, 100) / 100 + 1e-6);
        long[] parts = Arrays.stream(exact)
                .mapToLong(part -> (long) Math.floor(part + 1e-9))
                .toArray();
        long left = toGive - Arrays.stream(parts).sum();
        IntStream.range(0, parts.length)
                .boxed()
                .sorted(Comparator.comparingDouble((Integer i) -> parts[i] - exact[i]))
                .limit(Math.max(0, left))
                .forEach(i -> parts[i]++);
        return parts;
    }
}
