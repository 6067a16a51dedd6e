package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;

/**
 * Which checks of a result fail, by rule.
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
 * number that cannot be had fails nothing. Each test of each series
 * counts by itself.
 */
final class FailedChecks {
    static final double LEAST_RUNS_PROBABILITY = 0.05;
    static final double LARGEST_RHO = 0.2;
    static final double LARGEST_SCALED_ERROR = 1.5;
    static final double LARGEST_INFLUENCE = 0.25;

    private final List<String> sentences = new ArrayList<>();

    private FailedChecks() {}

    /** A sentence for each. */
    static List<String> of(Diagnostics diagnostics) {
        FailedChecks failed = new FailedChecks();
        diagnostics.series().forEach(failed::series);
        Retrospective retrospective = diagnostics.retrospective();
        if (retrospective != null && Math.abs(retrospective.rhoRelativeBiomass()) > LARGEST_RHO) {
            failed.add(
                    "Check failed: with the last seasons taken away B/BMSY comes out %+.0f %% from today's on average"
                            + " (Mohn's rho; at most 20 %% either way).",
                    100 * retrospective.rhoRelativeBiomass());
        }
        return failed.sentences;
    }

    private void series(SeriesCheck check) {
        if (exceeds(check.runsProbability() == null ? null : -check.runsProbability(), -LEAST_RUNS_PROBABILITY)) {
            add(
                    "Check failed: the residuals of %s do not look independent (runs test, probability %.3f; at least"
                            + " 0.05).",
                    check.series(), check.runsProbability());
        }
        if (exceeds(check.scaledError(), LARGEST_SCALED_ERROR)) {
            add(
                    "Check failed: %s is predicted a year ahead with errors beyond its usual change (scaled error %.2f;"
                            + " at most 1.5).",
                    check.series(), check.scaledError());
        }
        Double without = check.msyWithout();
        Double with = check.msyWith();
        if (without != null && with != null && Math.abs(without / with - 1) > LARGEST_INFLUENCE) {
            add(
                    "Check failed: without %s MSY would be %+.0f %% (at most 25 %% either way).",
                    check.series(), 100 * (without / with - 1));
        }
    }

    private static boolean exceeds(@Nullable Double value, double bound) {
        return value != null && value > bound;
    }

    private void add(String sentence, @Nullable Object... values) {
        sentences.add(String.format(Locale.ROOT, sentence, values));
    }
}
