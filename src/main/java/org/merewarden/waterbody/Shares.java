package org.merewarden.waterbody;

import java.math.BigDecimal;
import java.math.RoundingMode;

/** The shares of one stock, in per cent. */
final class Shares {
    /** Room for the rounding of the sum, not for a real excess. */
    private static final double SLACK_PERCENT = 1e-6;

    private Shares() {}

    static boolean tooMuch(double totalPercent) {
        return totalPercent > 100 + SLACK_PERCENT;
    }

    static String percent(double total) {
        return BigDecimal.valueOf(total)
                .setScale(4, RoundingMode.HALF_UP)
                .stripTrailingZeros()
                .toPlainString();
    }
}
