package org.merewarden.core.prior;

import java.util.List;
import java.util.stream.Collectors;

/**
 * A predicted quantity with its lognormal prediction error.
 *
 * <pre>
 *   combined:  ln median = mean of ln medians;   logSd² = largest logSd² + variance of the ln medians
 * </pre>
 *
 * Several predictions of one quantity share their ignorance, so combining widens and never narrows (our judgement).
 *
 * @param value > 0
 * @param logSd >= 0
 * @param source publication
 * @param validity where it holds, and whether the case is inside
 */
public record Estimate(double value, double logSd, String source, String validity) {

    boolean usable() {
        return value > 0 && value < Double.POSITIVE_INFINITY;
    }

    /** One prediction out of several. */
    public static Estimate combined(List<Estimate> estimates) {
        double mean = estimates.stream()
                .mapToDouble(e -> Math.log(e.value()))
                .average()
                .orElseThrow();
        double between = estimates.stream()
                .mapToDouble(e -> Math.pow(Math.log(e.value()) - mean, 2))
                .average()
                .orElseThrow();
        double widest = estimates.stream().mapToDouble(Estimate::logSd).max().orElseThrow();
        return new Estimate(
                Math.exp(mean), Math.sqrt(widest * widest + between), text(estimates, true), text(estimates, false));
    }

    private static String text(List<Estimate> estimates, boolean source) {
        return estimates.stream()
                .map(e -> source ? e.source() : e.validity())
                .distinct()
                .collect(Collectors.joining("; "));
    }
}
