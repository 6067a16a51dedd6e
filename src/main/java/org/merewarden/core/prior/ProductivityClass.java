package org.merewarden.core.prior;

import java.util.Arrays;
import java.util.Optional;
import org.jspecify.annotations.Nullable;

/**
 * Range of r, 1/yr, for a stock of which only the kind of productivity is known.
 *
 * <pre>
 *   median r = √(low · high),   log-sd = ln(high/low)/(2 · 1.645)
 * </pre>
 *
 * <p>Source: ranges of Froese et al. 2017, Fish Fish. 18: 506–526 (recalled; class names ours). Reading a range as the
 * middle 90 % of a lognormal is our judgement. With n = 1, FMSY = r/2.
 */
public enum ProductivityClass {
    FAST("fast", 0.6, 1.5),
    MODERATE("moderate", 0.2, 0.8),
    SLOW("slow", 0.05, 0.5),
    VERY_SLOW("very slow", 0.015, 0.1);

    private final String label;
    private final double lowR;
    private final double highR;

    ProductivityClass(String label, double lowR, double highR) {
        this.label = label;
        this.lowR = lowR;
        this.highR = highR;
    }

    /** The class with this name as the tables write it; empty where none is. */
    public static Optional<ProductivityClass> named(@Nullable String label) {
        return Arrays.stream(values()).filter(c -> c.label.equals(label)).findFirst();
    }

    public double lowR() {
        return lowR;
    }

    public double highR() {
        return highR;
    }

    public double medianR() {
        return Math.sqrt(lowR * highR);
    }

    public double logSd() {
        return Math.log(highR / lowR) / (2 * 1.645);
    }

    Estimate fmsy() {
        return new Estimate(
                medianR() / 2,
                logSd(),
                "Froese et al. 2017, range of r " + lowR + "–" + highR,
                "productivity class " + label);
    }
}
