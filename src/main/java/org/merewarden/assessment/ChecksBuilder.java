package org.merewarden.assessment;

import java.util.Comparator;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Peel;
import org.merewarden.core.inference.Diagnostics.Residual;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** How the records are met and how steady the result is: charts, sentences and the numbers behind them. */
@Component
class ChecksBuilder {
    private final CheckWords words;
    private final Texts texts;

    ChecksBuilder(CheckWords words, Texts texts) {
        this.words = words;
        this.texts = texts;
    }

    /** Null where nothing was computed. */
    AssessmentPage.@Nullable Checks checks(Diagnostics diagnostics) {
        Retrospective retrospective = diagnostics.retrospective();
        if (diagnostics.series().isEmpty() && retrospective == null) {
            return null;
        }
        return new AssessmentPage.Checks(
                diagnostics.series().stream().map(c -> series(c, diagnostics)).toList(),
                words.influence(diagnostics.series()),
                retrospective == null ? null : peels(retrospective));
    }

    private AssessmentPage.SeriesPart series(SeriesCheck check, Diagnostics diagnostics) {
        List<Residual> residuals = diagnostics.residuals().stream()
                .filter(r -> r.series().equals(check.series()))
                .sorted(Comparator.comparingInt(Residual::year).thenComparingDouble(Residual::timeOfYear))
                .toList();
        return new AssessmentPage.SeriesPart(
                check.series(),
                words.series(check),
                residuals.isEmpty() ? null : drawing(check, residuals),
                row(check),
                residuals.stream().map(ChecksBuilder::row).toList());
    }

    private String drawing(SeriesCheck check, List<Residual> residuals) {
        return CheckDrawings.residuals(
                residuals, texts.get("residuals.title", check.series()), texts.get("season"), texts.get("residuals.y"));
    }

    private AssessmentPage.SeriesRow row(SeriesCheck c) {
        return new AssessmentPage.SeriesRow(
                texts.get("kind." + c.kind().name()),
                c.values(),
                Figures.sig(c.contrast()),
                Figures.sig(c.meanResidual()),
                Figures.sig(c.residualSd()),
                Figures.percent(c.runsProbability()),
                Figures.sig(c.lagOne()),
                c.scaledError() == null ? Figures.UNKNOWN : Figures.sig(c.scaledError()) + " (" + c.hindcasts() + ")",
                Figures.sig(c.msyWithout()),
                Figures.sig(c.msyWith()),
                Figures.sig(c.relativeBiomassWithout()),
                Figures.sig(c.relativeBiomassWith()));
    }

    private static AssessmentPage.ResidualRow row(Residual r) {
        return new AssessmentPage.ResidualRow(
                r.year(), Figures.digits(r.timeOfYear(), 2), Figures.sig(r.standardised()));
    }

    private AssessmentPage.Peels peels(Retrospective r) {
        List<Peel> peels = r.peels();
        return new AssessmentPage.Peels(
                words.retrospective(r),
                CheckDrawings.peels(peels, texts.get("peels.title"), texts.get("season"), texts.get("peels.y")),
                peels.stream().map(ChecksBuilder::row).toList(),
                Figures.sig(r.rhoBiomass()),
                Figures.sig(r.rhoRelativeBiomass()),
                Figures.sig(r.rhoFishing()));
    }

    private static AssessmentPage.PeelRow row(Peel p) {
        return new AssessmentPage.PeelRow(
                p.lastYear(),
                Figures.sig(p.msyTonnes()),
                Figures.sig(last(p.biomassTonnes())),
                Figures.sig(last(p.relativeBiomass())),
                Figures.sig(last(p.fishingPerYear())));
    }

    private static @Nullable Double last(List<Double> values) {
        return values.isEmpty() ? null : values.get(values.size() - 1);
    }
}
