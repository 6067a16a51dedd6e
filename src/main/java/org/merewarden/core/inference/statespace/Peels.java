package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.function.ToDoubleBiFunction;
import java.util.stream.DoubleStream;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Diagnostics.Peel;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.statespace.ModeSearch.Fit;

/**
 * Retrospective peels: refits at the most likely parameters with the last seasons taken away.
 *
 * <pre>
 *   ρ = mean over peels of (X_peel − X_full)/X_full,   X of each peel's last season
 * </pre>
 *
 * <p>Mohn 1999, ICES J. Mar. Sci. 56: 473–488 (recalled), as the mean over peels that is common practice. Let the last
 * season with any record be the L-th. There are min({@value #MOST}, L/4) peels, from L ≥ {@value #LEAST_SEASONS} on: each
 * keeps three quarters of the seasons, and each takes away something. Priors and unit stay those of all records. A peel
 * without a mode is left out. A closed season in which both F are 0 counts as no change.
 */
final class Peels {
    static final int MOST = 5;
    static final int LEAST_SEASONS = 8;

    private final Fit full;
    private final List<Fit> peeled;

    private Peels(Fit full, List<Fit> peeled) {
        this.full = full;
        this.peeled = peeled;
    }

    static Peels of(Evidence evidence, ModelPriors priors, ModeSearch search, Fit full) {
        int recorded = recorded(full.data());
        int count = recorded < LEAST_SEASONS ? 0 : Math.min(MOST, recorded / 4);
        List<Fit> peeled = IntStream.rangeClosed(1, count)
                .map(peel -> full.data().firstYear() + recorded - 1 - peel)
                .mapToObj(last -> SeasonData.of(evidence, last, priors))
                .map(data -> search.of(data, full.theta()))
                .flatMap(Optional::stream)
                .toList();
        return new Peels(full, peeled);
    }

    /** Number of seasons to the last one with a catch, an effort or a survey. */
    private static int recorded(SeasonData data) {
        int t = data.seasons();
        while (t > 0 && !recorded(data, t - 1)) {
            t--;
        }
        return t;
    }

    private static boolean recorded(SeasonData data, int t) {
        int[] firstOf = data.observations().firstOf();
        return data.removals().closed()[t]
                || !Double.isNaN(data.removals().logCatch()[t])
                || firstOf[t + 1] > firstOf[t];
    }

    /** Without the full fit, longest first. */
    List<Fit> fits() {
        return peeled;
    }

    /** Null with fewer than two peels, or beyond the arithmetic. */
    @Nullable
    Retrospective retrospective() {
        List<Fit> all = new ArrayList<>(List.of(full));
        all.addAll(peeled);
        Retrospective result = new Retrospective(
                all.stream().map(Peels::peel).toList(),
                rho(Fit::biomassTonnes),
                rho(Fit::relativeBiomass),
                rho(Fit::fishing));
        boolean finite = DoubleStream.of(result.rhoBiomass(), result.rhoRelativeBiomass(), result.rhoFishing())
                .allMatch(Double::isFinite);
        return peeled.size() < 2 || !finite ? null : result;
    }

    private double rho(ToDoubleBiFunction<Fit, Integer> quantity) {
        return mohnsRho(
                peeled.stream()
                        .mapToDouble(fit -> quantity.applyAsDouble(fit, last(fit)))
                        .toArray(),
                peeled.stream()
                        .mapToDouble(fit -> quantity.applyAsDouble(full, last(fit)))
                        .toArray());
    }

    private static int last(Fit fit) {
        return fit.data().seasons() - 1;
    }

    /** NaN without any. */
    static double mohnsRho(double[] peeled, double[] full) {
        return IntStream.range(0, full.length)
                .mapToDouble(i -> peeled[i] == full[i] ? 0 : (peeled[i] - full[i]) / full[i])
                .average()
                .orElse(Double.NaN);
    }

    private static Peel peel(Fit fit) {
        int seasons = fit.data().seasons();
        return new Peel(
                fit.data().firstYear() + seasons - 1,
                fit.msyTonnes(),
                Arrays.stream(fit.path().biomassTonnes()[0])
                        .limit(seasons)
                        .boxed()
                        .toList(),
                IntStream.range(0, seasons)
                        .mapToObj(t -> (Double) fit.relativeBiomass(t))
                        .toList(),
                Arrays.stream(fit.path().fishing()[0]).boxed().toList());
    }
}
