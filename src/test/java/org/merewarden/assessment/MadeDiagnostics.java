package org.merewarden.assessment;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Gathering;
import org.merewarden.core.inference.Diagnostics.Help;
import org.merewarden.core.inference.Diagnostics.Kind;
import org.merewarden.core.inference.Diagnostics.Learned;
import org.merewarden.core.inference.Diagnostics.Peel;
import org.merewarden.core.inference.Diagnostics.Residual;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.prior.Prior;

/** Hand-made diagnostics for tests of pages. */
public final class MadeDiagnostics {
    private static final double TEN_TO_NINETY = 2 * 1.2816;

    private MadeDiagnostics() {}

    /** MSY narrowed to a third, process variation left as it was, one survey, three peels, two helps. */
    public static Diagnostics typical() {
        return new Diagnostics(
                List.of(
                        learned("msy_t", 12, 0.9, 0.9 / 3, 0.35),
                        learned("process_sd", 0.1, 0.4, 0.4, 0.95),
                        learned("shape", 1, 0, 0, null)),
                List.of(survey(10, 0.1, 1.0, 0.6, 0.2, 0.7)),
                List.of(
                        new Residual("nets", 2020, 0.5, -0.4),
                        new Residual("nets", 2021, 0.5, 1.3),
                        new Residual("nets", 2022, 0.5, -2.2)),
                retrospective(0.12),
                List.of(new Help(Gathering.BIOMASS_ESTIMATE, "", 0.18), new Help(Gathering.INDEX_VALUE, "nets", 0.01)));
    }

    /** A posterior about its prior's median, by the log-sd before and after. */
    static Learned learned(String parameter, double median, double logSd, double logSdAfter, @Nullable Double overlap) {
        double half = Math.exp(TEN_TO_NINETY / 2 * logSdAfter);
        Prior prior = new Prior(parameter, median, logSd, "Ryder 1965, exact units", "For a test.", "test lakes");
        return new Learned(prior, "", median / half, median, median * half, overlap);
    }

    static SeriesCheck survey(
            int values,
            @Nullable Double mean,
            @Nullable Double sd,
            @Nullable Double runs,
            @Nullable Double lag,
            @Nullable Double error) {
        return new SeriesCheck("nets", Kind.INDEX, values, 2.1, mean, sd, runs, lag, error, 5, 14.0, 12.5, 0.9, 0.8);
    }

    static Retrospective retrospective(double rho) {
        List<Peel> peels = new ArrayList<>();
        for (int peel = 0; peel < 3; peel++) {
            List<Double> ratios = Arrays.asList(1.2, 1.0, 0.9, 0.8, 0.7, 0.6).subList(0, 6 - peel);
            peels.add(new Peel(2025 - peel, 12.5 + peel, ratios, ratios, ratios));
        }
        return new Retrospective(peels, rho, rho, -rho);
    }

    /** The same posterior with removals, further parameters and these diagnostics. */
    public static Posterior with(Posterior p, Diagnostics diagnostics) {
        double[][] removals = new double[p.draws()][p.seasons()];
        for (double[] ofDraw : removals) {
            Arrays.fill(ofDraw, 7.5);
        }
        return new Posterior(
                p.method(),
                p.firstYear(),
                p.msyTonnes(),
                p.fmsyPerYear(),
                p.shape(),
                p.biomassTonnes(),
                p.fishingPerYear(),
                removals,
                Map.of("process_sd", new double[p.draws()]),
                p.estimates(),
                p.strength(),
                p.verdict(),
                diagnostics);
    }
}
