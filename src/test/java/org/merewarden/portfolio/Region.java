package org.merewarden.portfolio;

import static org.mockito.Mockito.mock;
import static org.mockito.Mockito.when;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.Limits;
import org.merewarden.advice.Standings;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.AssessmentWords;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.evidence.Traits;
import org.merewarden.core.inference.Posterior;
import org.merewarden.season.Uptakes;
import org.merewarden.waterbody.Register;

/** The other features, answering with hand-made views. */
final class Region {
    private final Register register = mock(Register.class);
    private final Assessments assessments = mock(Assessments.class);
    private final Standings standings = mock(Standings.class);
    private final Limits limits = mock(Limits.class);
    private final Uptakes uptakes = mock(Uptakes.class);
    private final List<Entry> entries = new ArrayList<>();
    private final Texts texts = Made.texts();
    private final RowBuilder rows = new RowBuilder(texts);
    private final DiagramTexts diagrams = new DiagramTexts(texts);

    Region() {
        when(limits.presentSeason()).thenReturn(2026);
    }

    static Evidence evidence() {
        List<CatchRecord> catches = new ArrayList<>();
        for (int year = 2020; year <= 2025; year++) {
            catches.add(new CatchRecord(year, "commercial", 10 + (year - 2020), null, 0.5));
        }
        return new Evidence(
                new Habitat("lake", 1000, null, null, null, null, 1),
                new Traits("FPE", false, null, null, null, null, null),
                catches,
                List.of(new EffortRecord(2024, "nets", 100, "net-nights")),
                List.of(
                        new SurveyRecord(2022, "gillnets", 0.5, false, 2, null, null),
                        new SurveyRecord(2024, "gillnets", 0.5, false, 4, null, null),
                        new SurveyRecord(2023, "marks", 0.5, true, 61.5, 0.2, null)),
                List.of(),
                List.of(),
                List.of());
    }

    /** Adds the stock with its views; a posterior only where it is assessed. */
    Region with(Entry e, Posterior posterior) {
        entries.add(e);
        long id = e.stock().id();
        when(register.stocks()).thenReturn(entries.stream().map(Entry::stock).toList());
        when(register.stock(e.stock().lake(), e.stock().speciesKey())).thenReturn(Optional.of(e.stock()));
        when(limits.inForce(2026)).thenReturn(present(Entry::limit));
        when(standings.all()).thenReturn(present(Entry::standing));
        when(uptakes.ofSeason(2026)).thenReturn(present(Entry::uptake));
        when(assessments.latest()).thenReturn(present(Entry::assessment));
        when(limits.inForce(id, 2026)).thenReturn(Optional.ofNullable(e.limit()));
        when(standings.of(id)).thenReturn(Optional.ofNullable(e.standing()));
        when(uptakes.of(id, 2026)).thenReturn(Optional.ofNullable(e.uptake()));
        AssessmentView assessment = e.assessment();
        when(assessments.latest(id)).thenReturn(Optional.ofNullable(assessment));
        if (assessment != null) {
            when(assessments.ofStock(id)).thenReturn(List.of(assessment));
            when(assessments.posterior(assessment.id())).thenReturn(posterior);
            when(assessments.evidence(assessment.id())).thenReturn(evidence());
        }
        return this;
    }

    private <T> List<T> present(java.util.function.Function<Entry, T> view) {
        return entries.stream().map(view).filter(java.util.Objects::nonNull).toList();
    }

    Portfolio portfolio() {
        return new Portfolio(register, assessments, standings, limits, mock(ClosedLimits.class), uptakes);
    }

    Comparison comparison() {
        return new Comparison(portfolio(), assessments, new CompareViews(diagrams, rows, texts), texts);
    }

    StockPage page(String lake, String species) {
        return new StockPages(
                        portfolio(),
                        assessments,
                        new StockWords(texts, rows),
                        rows,
                        diagrams,
                        new HistoryBuilder(texts),
                        new StockEstimates(texts),
                        new AssessmentWords(Made.messages()),
                        texts)
                .page(lake, species);
    }
}
