package org.merewarden.core.prior;

import java.util.Locale;

/**
 * A lognormal prior of one parameter: ln p ~ N(ln median, logSd).
 *
 * @param parameter name with unit, e.g. {@code msy_t}
 * @param median > 0, in the parameter's unit
 * @param logSd standard deviation of the logarithm, >= 0; 0 fixes the parameter
 * @param source where the number comes from: publication, or whose statement
 * @param reason a sentence for the reader
 * @param validity where it holds, and whether this stock is inside; may be empty
 */
public record Prior(String parameter, double median, double logSd, String source, String reason, String validity) {
    public Prior {
        if (!(median > 0 && median < Double.POSITIVE_INFINITY)) {
            throw new IllegalArgumentException("needs 0 < median < infinity, got " + median);
        }
        if (!(logSd >= 0 && logSd < Double.POSITIVE_INFINITY)) {
            throw new IllegalArgumentException("needs 0 <= log_sd < infinity, got " + logSd);
        }
    }

    /** The prior in a sentence. */
    public String said(String name, String unit) {
        return String.format(
                Locale.ROOT,
                "%s before the records: %.3g %s, within a factor of %.2g in two cases of three (%s). %s",
                name,
                median,
                unit,
                Math.exp(logSd),
                source,
                reason);
    }
}
