package org.merewarden.portfolio;

import static java.util.stream.Collectors.groupingBy;
import static java.util.stream.Collectors.joining;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.RiskOfLimits;
import org.merewarden.advice.WaitingLimits;
import org.merewarden.advice.WaitingLimits.Proposal;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.inference.Posterior;
import org.merewarden.web.Figures;
import org.merewarden.web.PdfPages;
import org.merewarden.web.Seasons;
import org.springframework.stereotype.Service;

/** Brings together what a meeting looks at: chosen stocks in one table, then each on half a page. */
@Service
class MeetingPacks {
    static final int MOST = 40;
    private static final int DRAWING_MILLIMETRES = 86;
    /** Two stocks stand on a page: what is below the first two drawings has to be low. */
    private static final int RISK_MILLIMETRES = 70;

    private final Portfolio portfolio;
    private final Assessments assessments;
    private final WaitingLimits proposals;
    private final RiskOfLimits risks;
    private final RowBuilder rows;
    private final StockWords words;
    private final DiagramTexts diagrams;
    private final HistoryBuilder history;
    private final Seasons seasons;
    private final Texts texts;

    MeetingPacks(
            Portfolio portfolio,
            Assessments assessments,
            WaitingLimits proposals,
            RiskOfLimits risks,
            RowBuilder rows,
            StockWords words,
            DiagramTexts diagrams,
            HistoryBuilder history,
            Seasons seasons,
            Texts texts) {
        this.portfolio = portfolio;
        this.assessments = assessments;
        this.proposals = proposals;
        this.risks = risks;
        this.rows = rows;
        this.words = words;
        this.diagrams = diagrams;
        this.history = history;
        this.seasons = seasons;
        this.texts = texts;
    }

    /** @param asked keys lake:species, all different; those that no stock has are named in a sentence */
    MeetingPack pack(List<String> asked) {
        int season = portfolio.presentSeason();
        Map<String, Entry> known = portfolio.entries(season).stream()
                .collect(Collectors.toMap(e -> e.stock().key(), Function.identity()));
        List<Entry> chosen =
                asked.stream().filter(known::containsKey).map(known::get).toList();
        Map<Long, List<Proposal>> waiting = proposals.waiting().stream().collect(groupingBy(Proposal::stockId));
        String unknown = asked.stream().filter(k -> !known.containsKey(k)).collect(joining(", "));
        return new MeetingPack(
                Integer.toString(season),
                unknown.isEmpty() ? List.of() : List.of(texts.get("compare.unknown", unknown)),
                chosen.stream()
                        .map(e -> row(e, waiting.getOrDefault(e.stock().id(), List.of())))
                        .toList(),
                sheets(chosen, season));
    }

    /** The rule is asked for the current season, or for the next where a stock has its limit already. */
    private List<MeetingPack.Sheet> sheets(List<Entry> chosen, int season) {
        int current = seasons.current();
        return chosen.stream()
                .map(e -> sheet(e, season, season == current && e.limit() != null ? current + 1 : current))
                .toList();
    }

    private MeetingPack.Row row(Entry e, List<Proposal> waiting) {
        PortfolioView.Row shown = rows.row(e);
        return new MeetingPack.Row(
                e.stock().title(),
                shown.standingCode(),
                shown.littleKnown().isEmpty() ? shown.standing() : shown.standing() + ", " + shown.littleKnown(),
                shown.margin(),
                shown.msy(),
                shown.biomass(),
                // an effort's unit may be too long to stand beside its figure in a narrow column
                shown.limit().replace('\u00a0', ' '),
                waiting.stream().map(this::proposed).collect(joining("; ")),
                shown.evidence());
    }

    private String proposed(Proposal p) {
        String amount = p.amount() == null ? texts.get("limit.measures") : Figures.decided(p.amount(), p.unit());
        return texts.get("pack.proposal", amount, Integer.toString(p.season()));
    }

    private MeetingPack.Sheet sheet(Entry e, int season, int advised) {
        AssessmentView a = e.assessment();
        Optional<RiskOfLimits.Risk> risk = risks.of(e.stock(), advised);
        Posterior posterior = a == null ? null : posterior(a.id(), risk);
        String equilibrium = posterior == null || a == null ? null : equilibrium(e, a, posterior);
        String biomass = posterior == null || a == null || posterior.seasons() == 0
                ? null
                : PdfPages.drawing(
                        history.onPaper(posterior, assessments.evidence(a.id())),
                        texts.get("pack.history", e.stock().title()),
                        DRAWING_MILLIMETRES);
        return new MeetingPack.Sheet(
                e.stock().title(),
                words.lede(e, season),
                equilibrium == null && biomass == null ? texts.get("pack.no-drawing") : null,
                equilibrium,
                biomass,
                risk.map(RiskOfLimits.Risk::recommendation).orElse(null),
                risk.map(r -> PdfPages.drawing(
                                r.curve(), texts.get("pack.risk", e.stock().title()), RISK_MILLIMETRES))
                        .orElse(null));
    }

    /** Loaded once: the rule has it where it had something to work on. */
    private Posterior posterior(long assessmentId, Optional<RiskOfLimits.Risk> risk) {
        return risk.filter(r -> r.assessmentId() == assessmentId)
                .map(RiskOfLimits.Risk::posterior)
                .orElseGet(() -> assessments.posterior(assessmentId));
    }

    private @Nullable String equilibrium(Entry e, AssessmentView a, Posterior posterior) {
        if (posterior.draws() == 0 || e.stock().recruitment().equals(StockWords.STOCKED_ONLY)) {
            return null;
        }
        StockCurve curve = StockCurve.of(e, a, posterior);
        ArrayList<String> said =
                new ArrayList<>(List.of(texts.get("diagram.title", e.stock().title())));
        words.diagram(curve).forEach(t -> said.add(t.name() + ": " + t.text()));
        return PdfPages.drawing(
                diagrams.onPaper(diagrams.diagram(List.of(curve), Axes.ABSOLUTE, 0)),
                String.join(". ", said),
                DRAWING_MILLIMETRES);
    }
}
