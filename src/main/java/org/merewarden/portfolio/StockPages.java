package org.merewarden.portfolio;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.AssessmentWords;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Posterior;
import org.merewarden.records.EvidenceStrip;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.merewarden.web.Who;
import org.springframework.stereotype.Service;

/** Brings one stock's page together, whatever of it is known. */
@Service
class StockPages {
    private final Portfolio portfolio;
    private final Assessments assessments;
    private final StockWords words;
    private final RowBuilder rows;
    private final DiagramTexts diagrams;
    private final HistoryBuilder history;
    private final StockEstimates estimates;
    private final AssessmentWords taught;
    private final Texts texts;

    StockPages(
            Portfolio portfolio,
            Assessments assessments,
            StockWords words,
            RowBuilder rows,
            DiagramTexts diagrams,
            HistoryBuilder history,
            StockEstimates estimates,
            AssessmentWords taught,
            Texts texts) {
        this.portfolio = portfolio;
        this.assessments = assessments;
        this.words = words;
        this.rows = rows;
        this.diagrams = diagrams;
        this.history = history;
        this.estimates = estimates;
        this.taught = taught;
        this.texts = texts;
    }

    /** @throws NotFound where there is no such stock */
    StockPage page(String lake, String speciesKey) {
        int season = portfolio.presentSeason();
        Entry entry = portfolio
                .entry(lake, speciesKey, season)
                .orElseThrow(() -> new NotFound("no stock " + lake + ":" + speciesKey));
        AssessmentView assessment = entry.assessment();
        return page(entry, season, assessment == null ? null : result(assessment));
    }

    /** What one assessment read and yielded. */
    private record Result(AssessmentView assessment, Posterior posterior, Evidence evidence) {
        boolean hasDraws() {
            return posterior.draws() > 0;
        }
    }

    private Result result(AssessmentView a) {
        return new Result(a, assessments.posterior(a.id()), assessments.evidence(a.id()));
    }

    private StockPage page(Entry e, int season, @Nullable Result result) {
        boolean selfSustaining = !e.stock().recruitment().equals(StockWords.STOCKED_ONLY);
        StockCurve curve = result == null || !result.hasDraws() || !selfSustaining
                ? null
                : StockCurve.of(e, result.assessment(), result.posterior());
        Result series = result == null || result.posterior().seasons() == 0 ? null : result;
        Map<String, Double> named =
                result == null ? Map.of() : result.posterior().estimates();
        return new StockPage(
                e.stock().title(),
                e.standingCode(),
                rows.standing(e),
                words.lede(e, season),
                missing(result),
                Who.has("BIOLOGIST") || Who.has("APPROVER") ? e.stock().path() + "/assessments" : null,
                curve == null ? null : equilibrium(curve),
                curve == null ? List.of() : words.diagram(curve),
                series == null ? null : history.biomass(series.posterior(), series.evidence()),
                series == null ? null : history.fishing(series.posterior()),
                series == null ? List.of() : history.table(series.posterior(), series.evidence()),
                words.season(e),
                rows.row(e).takenBar(),
                result == null ? null : strip(e, result.evidence()),
                result == null ? null : basis(e, result),
                estimates.terms(named, false),
                estimates.terms(named, true),
                earlier(e),
                links(e, season),
                e.stock().path() + "/advice",
                e.limit() == null
                        ? null
                        : link("notice", "/notices/" + e.limit().id()));
    }

    private StockPage.Basis basis(Entry e, Result result) {
        AssessmentView a = result.assessment();
        List<String> learned = new ArrayList<>(taught.taught(result.posterior().diagnostics()));
        taught.helps(result.posterior().diagnostics()).stream().limit(1).forEach(learned::add);
        return new StockPage.Basis(
                words.strength(a, result.evidence()),
                learned,
                a.verdict(),
                words.method(a),
                new StockPage.Link(
                        texts.get("basis.link", Integer.toString(a.number())),
                        e.stock().path() + "/assessments/" + a.number()));
    }

    private @Nullable String strip(Entry e, Evidence evidence) {
        EvidenceStrip strip = EvidenceStrip.of(evidence);
        return strip.rows().isEmpty()
                ? null
                : strip.svg(
                        texts.of("records.strip.title", e.stock().title()), kind -> texts.of("records.strip." + kind));
    }

    private @Nullable String missing(@Nullable Result result) {
        if (result == null) {
            return texts.get("stock.missing");
        }
        if (!result.hasDraws()) {
            return texts.get("stock.no-draws");
        }
        return result.posterior().seasons() == 0 ? texts.get("stock.lake-only") : null;
    }

    private StockPage.Figure equilibrium(StockCurve curve) {
        Diagram diagram = diagrams.diagram(List.of(curve), Axes.ABSOLUTE, 0);
        return new StockPage.Figure("equilibrium", diagrams.large(diagram), diagrams.json(diagram));
    }

    private List<StockPage.Link> earlier(Entry e) {
        return assessments.ofStock(e.stock().id()).stream()
                .map(a -> new StockPage.Link(
                        texts.get(
                                a.settled() ? "stock.assessment" : "stock.assessment.unsettled",
                                Integer.toString(a.number()),
                                Figures.dateTime(a.madeAt()),
                                rows.strength(a.strength())),
                        e.stock().path() + "/assessments/" + a.number()))
                .toList();
    }

    private List<StockPage.Link> links(Entry e, int season) {
        List<StockPage.Link> links = new ArrayList<>();
        links.add(link("evidence", e.stock().path() + "/evidence"));
        links.add(link("advice", e.stock().path() + "/advice"));
        links.add(link("landings", "/season/" + season + "/landings"));
        links.add(link(
                "enter",
                "/landings/new?lake=" + e.stock().lake() + "&species="
                        + e.stock().speciesKey()));
        links.add(link("water", "/water-bodies/" + e.stock().lake()));
        links.add(link("compare", "/portfolio/compare?stock=" + e.stock().key()));
        return links;
    }

    private StockPage.Link link(String key, String address) {
        return new StockPage.Link(texts.get("link." + key), address);
    }
}
