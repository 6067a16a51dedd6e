package org.merewarden.core.inference;

import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;

/**
 * When a check of a result fails, for every place that judges one.
 *
 * <pre>
 *   runs          p &lt; 0.05 in a series                                      the usual level
 *   retrospective |Mohn's ρ of B/BMSY| > 0.2
 *   hindcast      MASE > 1.5 in a series                                   our judgement
 *   influence     MSY without a series differs by more than 25 %           our judgement
 * </pre>
 *
 * <p>ρ: Hurtado-Ferro et al. 2015, ICES J. Mar. Sci. 72: 99–110 (recalled), whose range for long-lived species is about
 * −0.15 to 0.20; one bound for all is our judgement. MASE rests on five predictions at most: of 180 stocks simulated from
 * the model itself with an index or biomass in every season 68 exceeded 1 and 12 exceeded 1.5, so 1 would blame chance. A
 * number that cannot be had fails nothing.
 */
public final class CheckBounds {
    public static final double LEAST_RUNS_PROBABILITY = 0.05;
    public static final double LARGEST_RHO = 0.2;
    public static final double LARGEST_SCALED_ERROR = 1.5;
    public static final double LARGEST_INFLUENCE = 0.25;

    private CheckBounds() {}

    /** Too few or too many runs of sign for independent residuals. */
    public static boolean dependent(SeriesCheck check) {
        Double p = check.runsProbability();
        return p != null && p < LEAST_RUNS_PROBABILITY;
    }

    /** Predicted a year ahead with errors beyond the series' usual change. */
    public static boolean unforeseen(SeriesCheck check) {
        Double error = check.scaledError();
        return error != null && error > LARGEST_SCALED_ERROR;
    }

    /** MSY is another without the series. */
    public static boolean influential(SeriesCheck check) {
        return Math.abs(msyChange(check)) > LARGEST_INFLUENCE;
    }

    /** B/BMSY of earlier results differs from today's. */
    public static boolean unsteady(Retrospective retrospective) {
        return Math.abs(retrospective.rhoRelativeBiomass()) > LARGEST_RHO;
    }

    /** Share by which MSY changes without the series, above −1; NaN where not known. */
    public static double msyChange(SeriesCheck check) {
        return change(check.msyWithout(), check.msyWith());
    }

    /** The same of present B/BMSY; no check rests on it. */
    public static double relativeBiomassChange(SeriesCheck check) {
        return change(check.relativeBiomassWithout(), check.relativeBiomassWith());
    }

    private static double change(@Nullable Double without, @Nullable Double with) {
        return without == null || with == null ? Double.NaN : without / with - 1;
    }
}
