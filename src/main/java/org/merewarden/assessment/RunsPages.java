package org.merewarden.assessment;

import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Objects;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.jobs.JobView;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.springframework.stereotype.Component;

/** Brings the page of the runs together. */
@Component
class RunsPages {
    private final AssessmentRuns runs;
    private final AssessmentStore assessments;
    private final Register register;
    private final Texts texts;

    RunsPages(AssessmentRuns runs, AssessmentStore assessments, Register register, Texts texts) {
        this.runs = runs;
        this.assessments = assessments;
        this.register = register;
        this.texts = texts;
    }

    /** What became of a stock in a run, the most pressing first. */
    private enum Outcome {
        FAILED,
        UNSETTLED,
        WAITING,
        STOPPED,
        SETTLED
    }

    /** A stock with what the run has stored of it so far. */
    private record Piece(StockView stock, @Nullable AssessmentView made, Outcome outcome) {}

    /**
     * @param run the run whose stocks are listed; null for the latest
     * @throws NotFound where no recent run has that number
     */
    RunsPage page(@Nullable Long run) {
        List<JobView> recent = runs.recent();
        List<StockView> stocks = register.stocks();
        return new RunsPage(
                stocks.size(),
                assessments.assessedStocks(),
                recent.stream().anyMatch(JobView::active),
                recent.stream().map(this::row).toList(),
                recent.isEmpty() ? null : chosen(chosen(recent, run), stocks));
    }

    private static JobView chosen(List<JobView> recent, @Nullable Long run) {
        return run == null
                ? recent.get(0)
                : recent.stream()
                        .filter(job -> job.id() == run)
                        .findFirst()
                        .orElseThrow(() -> new NotFound("run " + run));
    }

    private RunsPage.Run row(JobView job) {
        return new RunsPage.Run(
                job.id(),
                job.subject(),
                texts.get("state." + job.state()),
                job.done(),
                job.total(),
                Objects.requireNonNullElse(job.note(), ""),
                job.requestedBy(),
                Figures.dateTime(job.requestedAt()),
                Figures.dateTime(job.finishedAt()),
                job.active());
    }

    private RunsPage.Chosen chosen(JobView job, List<StockView> stocks) {
        Map<Long, StockView> byId = stocks.stream().collect(Collectors.toMap(StockView::id, Function.identity()));
        Map<Long, AssessmentView> made = assessments.ofJob(job.id()).stream()
                .collect(Collectors.toMap(AssessmentView::stockId, Function.identity()));
        List<Piece> pieces = runs.stocksOf(job.id()).stream()
                .map(byId::get)
                .filter(Objects::nonNull)
                .map(s -> new Piece(s, made.get(s.id()), outcome(job, made.get(s.id()))))
                .sorted(Comparator.comparing(Piece::outcome)
                        .thenComparing(p -> p.stock().title()))
                .toList();
        return new RunsPage.Chosen(
                texts.get("run.caption", job.subject(), Figures.dateTime(job.requestedAt())),
                texts.get(
                        "run.sentence",
                        count(pieces, Outcome.SETTLED),
                        count(pieces, Outcome.UNSETTLED),
                        count(pieces, Outcome.FAILED),
                        count(pieces, Outcome.WAITING),
                        count(pieces, Outcome.STOPPED)),
                pieces.stream().map(this::row).toList());
    }

    /** A stock of a finished run without an assessment failed: the run stores one for every stock that it reaches. */
    private static Outcome outcome(JobView job, @Nullable AssessmentView made) {
        if (made != null) {
            return made.settled() ? Outcome.SETTLED : Outcome.UNSETTLED;
        }
        if (job.active()) {
            return Outcome.WAITING;
        }
        return job.state().equals("CANCELLED") ? Outcome.STOPPED : Outcome.FAILED;
    }

    private static long count(List<Piece> pieces, Outcome outcome) {
        return pieces.stream().filter(p -> p.outcome() == outcome).count();
    }

    private RunsPage.StockRow row(Piece piece) {
        AssessmentView made = piece.made();
        String path = piece.stock().path();
        return new RunsPage.StockRow(
                piece.stock().title(),
                made == null ? path : path + "/assessments/" + made.number(),
                texts.get("outcome." + piece.outcome().name()),
                made == null ? "" : why(made),
                made == null ? "" : texts.of("strength." + made.strength().toLowerCase(Locale.ROOT)),
                made == null ? "" : Figures.interval(made.msyTonnes(), made.msyLowTonnes(), made.msyHighTonnes()));
    }

    private static String why(AssessmentView made) {
        return made.settled() || made.verdict().isEmpty() ? "" : made.verdict().get(0);
    }
}
