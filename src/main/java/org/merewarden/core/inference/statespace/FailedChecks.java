package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.CheckBounds;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;

/**
 * Which checks of a result fail, by the rules of {@link CheckBounds}. Each test of each series counts by itself.
 */
final class FailedChecks {
    private final List<String> sentences = new ArrayList<>();

    private FailedChecks() {}

    /** A sentence for each. */
    static List<String> of(Diagnostics diagnostics) {
        FailedChecks failed = new FailedChecks();
        diagnostics.series().forEach(failed::series);
        Retrospective retrospective = diagnostics.retrospective();
        if (retrospective != null && CheckBounds.unsteady(retrospective)) {
            failed.add(
                    "Check failed: with the last seasons taken away B/BMSY comes out %+.0f %% from today's on average"
                            + " (Mohn's rho; at most 20 %% either way).",
                    100 * retrospective.rhoRelativeBiomass());
        }
        return failed.sentences;
    }

    private void series(SeriesCheck check) {
        if (CheckBounds.dependent(check)) {
            add(
                    "Check failed: the residuals of %s do not look independent (runs test, probability %.3f; at least"
                            + " 0.05).",
                    check.series(), check.runsProbability());
        }
        if (CheckBounds.unforeseen(check)) {
            add(
                    "Check failed: %s is predicted a year ahead with errors beyond its usual change (scaled error %.2f;"
                            + " at most 1.5).",
                    check.series(), check.scaledError());
        }
        if (CheckBounds.influential(check)) {
            add(
                    "Check failed: without %s MSY would be %+.0f %% (at most 25 %% either way).",
                    check.series(), 100 * CheckBounds.msyChange(check));
        }
    }

    private void add(String sentence, @Nullable Object... values) {
        sentences.add(String.format(Locale.ROOT, sentence, values));
    }
}
