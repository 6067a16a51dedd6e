package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Residual;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;
import org.merewarden.core.inference.statespace.ModeSearch.Fit;

/**
 * Diagnostics of a state-space result, put together: {@link Learning}, {@link Residuals} and their {@link ResidualTests},
 * {@link Peels}, {@link Hindcast}, {@link NextEvidence}, and each series' influence.
 *
 * <p>Influence: a refit at the most likely parameters ({@link ModeSearch}) without the series, wherever another index,
 * effort series or kind of absolute biomass remains; without any, taking the series away leaves the priors, which is no
 * contradiction.
 */
final class StateSpaceDiagnostics {
    private final StateSpaceFit fit;
    private final ModeSearch search;
    private final List<ValuesOfSeries> series;
    private final double[] residuals;

    private StateSpaceDiagnostics(StateSpaceFit fit) {
        this.fit = fit;
        search = new ModeSearch(fit);
        series = ValuesOfSeries.of(fit.data());
        residuals = Residuals.of(fit);
    }

    /** None without draws. */
    static Diagnostics of(StateSpaceFit fit, Evidence evidence) {
        return fit.draws().theta().length == 0
                ? Diagnostics.NONE
                : new StateSpaceDiagnostics(fit).diagnostics(evidence);
    }

    private Diagnostics diagnostics(Evidence evidence) {
        Optional<Fit> full = search.ofAll();
        Optional<Peels> peels = full.map(mode -> Peels.of(evidence, fit.priors(), search, mode));
        return new Diagnostics(
                Learning.of(fit),
                full.isEmpty() ? List.of() : checks(full.get(), peels.orElseThrow()),
                residuals(),
                peels.map(Peels::retrospective).orElse(null),
                NextEvidence.of(fit, evidence));
    }

    private List<Residual> residuals() {
        Observations o = fit.data().observations();
        return series.stream()
                .flatMap(each -> each.values().stream())
                .filter(i -> Double.isFinite(residuals[i]))
                .map(i ->
                        new Residual(o.names().get(i), fit.data().firstYear() + o.season(i), o.time()[i], residuals[i]))
                .toList();
    }

    private List<SeriesCheck> checks(Fit full, Peels peels) {
        Hindcast hindcast = new Hindcast(full, fit.priors(), peels.fits());
        List<SeriesCheck> checks = new ArrayList<>();
        series.forEach(each -> checks.add(check(each, full, hindcast)));
        return checks;
    }

    private SeriesCheck check(ValuesOfSeries each, Fit full, Hindcast hindcast) {
        double[] own = each.values().stream()
                .mapToDouble(i -> residuals[i])
                .filter(Double::isFinite)
                .toArray();
        Fit without = series.size() < 2 ? null : without(each, full).orElse(null);
        int coming = full.data().seasons();
        return new SeriesCheck(
                each.name(),
                each.kind(),
                each.values().size(),
                each.contrast(fit.data().observations()),
                ResidualTests.mean(own),
                ResidualTests.sd(own),
                ResidualTests.runs(own),
                ResidualTests.lagOne(own),
                hindcast.scaledError(each),
                hindcast.errors(each).length,
                without == null ? null : finite(without.msyTonnes()),
                without == null ? null : finite(full.msyTonnes()),
                without == null ? null : finite(without.relativeBiomass(coming)),
                without == null ? null : finite(full.relativeBiomass(coming)));
    }

    private Optional<Fit> without(ValuesOfSeries each, Fit full) {
        return search.of(fit.data().without(Set.copyOf(each.values()), each.series()), full.theta());
    }

    private static @Nullable Double finite(double value) {
        return Double.isFinite(value) ? (Double) value : null;
    }
}
