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
import org.springframework.stereotype.Service;

/** Brings together what a meeting looks at: chosen stocks in one table, then each on half a page. */
@Service
class MeetingPacks {
    static final int MOST = 40;
    private static final int DRAWING_MILLIMETRES = 86;

    private final Portfolio portfolio;
    private final Assessments assessments;
    private final WaitingLimits proposals;
    private final RiskOfLimits risks;
    private final RowBuilder rows;
    private final StockWords words;
    private final DiagramTexts diagrams;
    private final HistoryBuilder history;
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
            Texts texts) {
        this.portfolio = portfolio;
        this.assessments = assessments;
        this.proposals = proposals;
        this.risks = risks;
        this.rows = rows;
        this.words = words;
        this.diagrams = diagrams;
        this.history = history;
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
                chosen.stream().map(e -> sheet(e, season)).toList());
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
        String amount = p.amount() == null ? texts.get("limit.measures") : Figures.withUnit(p.amount(), p.unit());
        return texts.get("pack.proposal", amount, Integer.toString(p.season()));
    }

    private MeetingPack.Sheet sheet(Entry e, int season) {
        AssessmentView a = e.assessment();
        Posterior posterior = a == null ? null : assessments.posterior(a.id());
        String equilibrium = posterior == null || a == null ? null : equilibrium(e, a, posterior);
        String biomass = posterior == null || a == null || posterior.seasons() == 0
                ? null
                : drawing(
                        history.onPaper(posterior, assessments.evidence(a.id())),
                        texts.get("pack.history", e.stock().title()));
        Optional<RiskOfLimits.Risk> risk = risks.of(e.stock());
        return new MeetingPack.Sheet(
                e.stock().title(),
                words.lede(e, season),
                equilibrium == null && biomass == null ? texts.get("pack.no-drawing") : null,
                equilibrium,
                biomass,
                risk.map(RiskOfLimits.Risk::recommendation).orElse(null),
                risk.map(r -> drawing(
                                r.curve(), texts.get("pack.risk", e.stock().title())))
                        .orElse(null));
    }

    private @Nullable String equilibrium(Entry e, AssessmentView a, Posterior posterior) {
        if (posterior.draws() == 0 || e.stock().recruitment().equals(StockWords.STOCKED_ONLY)) {
            return null;
        }
        StockCurve curve = StockCurve.of(e, a, posterior);
        ArrayList<String> said =
                new ArrayList<>(List.of(texts.get("diagram.title", e.stock().title())));
        words.diagram(curve).forEach(t -> said.add(t.name() + ": " + t.text()));
        return drawing(diagrams.onPaper(diagrams.diagram(List.of(curve), Axes.ABSOLUTE, 0)), String.join(". ", said));
    }

    private static String drawing(String svg, String said) {
        return PdfPages.drawing(svg, said, DRAWING_MILLIMETRES);
    }
}
