package org.merewarden.core.prior;

import java.util.ArrayList;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Traits;

/**
 * Natural mortality M, 1/yr, from life history.
 *
 * <pre>
 *   Then et al., age      M = 4.899 tmax^−0.916
 *   Then et al., growth   M = 4.118 K^0.73 L∞^−0.33
 *   Pauly                 log10 M = −0.0066 − 0.279 log10 L∞ + 0.6543 log10 K + 0.4634 log10 T
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>tmax</td><td>oldest age seen, yr</td></tr>
 * <tr><td>K, L∞</td><td>von Bertalanffy growth, 1/yr; asymptotic length, <b>cm</b></td></tr>
 * <tr><td>T</td><td>mean temperature of the water, °C; the air's stands in for it here</td></tr>
 * </table>
 *
 * <p>Sources: Then et al. 2015, ICES J. Mar. Sci. 72: 82–92, with corrigendum (published); Pauly 1980, J. Cons. Int.
 * Explor. Mer 39: 175–192 (recalled). Prediction errors (log-sd 0.4 by age, 0.5 by growth, 0.5 Pauly) are our judgement,
 * close to common practice. Pauly holds for T above about 3 °C (judgement) and is left out below.
 */
public final class NaturalMortality {
    private static final double AGE_LOG_SD = 0.4;
    private static final double GROWTH_LOG_SD = 0.5;
    private static final double PAULY_LOG_SD = 0.5;
    private static final double COLDEST = 3;

    private NaturalMortality() {}

    /** Then et al. 2015 from the oldest age seen. */
    public static double fromMaximumAge(double maxAgeYears) {
        return 4.899 * Math.pow(maxAgeYears, -0.916);
    }

    /** Then et al. 2015 from growth. */
    public static double fromGrowth(double growthKPerYear, double growthLinfCm) {
        return 4.118 * Math.pow(growthKPerYear, 0.73) * Math.pow(growthLinfCm, -0.33);
    }

    /** Pauly 1980 from growth and temperature. */
    public static double pauly(double growthKPerYear, double growthLinfCm, double temperatureCelsius) {
        return Math.pow(
                10,
                -0.0066
                        - 0.279 * Math.log10(growthLinfCm)
                        + 0.6543 * Math.log10(growthKPerYear)
                        + 0.4634 * Math.log10(temperatureCelsius));
    }

    /** What the traits allow: by age if an age is known, else by growth; empty without either. */
    static List<Estimate> predict(Traits traits, @Nullable Double temperatureCelsius) {
        List<Estimate> estimates = new ArrayList<>();
        Double age = traits.maxAgeYears();
        Double k = traits.growthKPerYear();
        Double length = traits.growthLinfCm();
        if (age != null && age > 0) {
            estimates.add(new Estimate(
                    fromMaximumAge(age),
                    AGE_LOG_SD,
                    "Then et al. 2015 from maximum age",
                    "the oldest age seen depends on how many fish were aged"));
        } else if (k != null && length != null && k > 0 && length > 0) {
            estimates.add(
                    new Estimate(fromGrowth(k, length), GROWTH_LOG_SD, "Then et al. 2015 from growth", "L∞ in cm"));
            if (temperatureCelsius != null && temperatureCelsius >= COLDEST) {
                estimates.add(new Estimate(
                        pauly(k, length, temperatureCelsius),
                        PAULY_LOG_SD,
                        "Pauly 1980",
                        "the air's mean temperature stands in for the water's"));
            }
        }
        return estimates.stream().filter(Estimate::usable).toList();
    }
}
