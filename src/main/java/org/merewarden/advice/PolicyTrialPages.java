package org.merewarden.advice;

import java.util.Comparator;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.jobs.JobView;
import org.merewarden.jobs.Jobs;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** What a version would recommend, beside the version in force. */
@Component
class PolicyTrialPages {
    private final PolicyTrialStore store;
    private final Jobs jobs;
    private final Register register;
    private final PolicyWords words;

    PolicyTrialPages(PolicyTrialStore store, Jobs jobs, Register register, PolicyWords words) {
        this.store = store;
        this.jobs = jobs;
        this.register = register;
        this.words = words;
    }

    /** What becomes of a stock's limit. */
    private enum Change {
        CLOSES,
        FALLS,
        RISES,
        STAYS,
        UNKNOWN
    }

    /** @param size of the change against the larger of the two limits, 0–1 */
    private record Piece(PolicyTrialStore.Row row, Change change, double size) {}

    /** Of the version's latest trial; null where there was none. */
    @Nullable
    PolicyTrialPage page(int number) {
        Optional<PolicyTrialStore.Trial> latest = store.latest(number);
        return latest.isEmpty()
                ? null
                : page(latest.get(), jobs.find(latest.get().jobId()).orElseThrow());
    }

    private PolicyTrialPage page(PolicyTrialStore.Trial trial, JobView job) {
        Map<Long, StockView> stocks =
                register.stocks().stream().collect(Collectors.toMap(StockView::id, Function.identity()));
        List<Piece> pieces = store.rows(trial.id()).stream()
                .map(PolicyTrialPages::piece)
                .sorted(Comparator.comparing(Piece::size).reversed().thenComparing(p -> title(stocks, p)))
                .toList();
        return new PolicyTrialPage(
                version(trial.number()),
                version(trial.against()),
                words.word("policy.trial.when", job.requestedBy(), Figures.dateTime(job.requestedAt())),
                words.word("policy.trial.state." + job.state()),
                job.active(),
                job.done(),
                job.total(),
                job.note(),
                totals(trial, pieces),
                pieces.stream().map(p -> row(trial, p, stocks)).toList());
    }

    private String version(int number) {
        return words.word("policy.version", Integer.toString(number));
    }

    private static String title(Map<Long, StockView> stocks, Piece piece) {
        StockView stock = stocks.get(piece.row().stockId());
        return stock == null ? "" : stock.title();
    }

    private static Piece piece(PolicyTrialStore.Row row) {
        PolicyTrialStore.Both both = row.both();
        if (both == null) {
            return new Piece(row, Change.UNKNOWN, 0);
        }
        double here = both.here().limitTonnes();
        double against = both.against().limitTonnes();
        double difference = here - against;
        Change change = difference == 0
                ? Change.STAYS
                : difference > 0 ? Change.RISES : here == 0 ? Change.CLOSES : Change.FALLS;
        return new Piece(row, change, difference == 0 ? 0 : Math.abs(difference) / Math.max(here, against));
    }

    private List<String> totals(PolicyTrialStore.Trial trial, List<Piece> pieces) {
        return pieces.isEmpty()
                ? List.of()
                : List.of(
                        words.word(
                                "policy.trial.totals",
                                pieces.size(),
                                count(pieces, Change.RISES),
                                count(pieces, Change.FALLS),
                                count(pieces, Change.CLOSES),
                                count(pieces, Change.STAYS),
                                count(pieces, Change.UNKNOWN)),
                        words.word(
                                "policy.trial.sums",
                                Figures.tonnes(sum(pieces, PolicyTrialStore.Both::against)),
                                Integer.toString(trial.against()),
                                Figures.tonnes(sum(pieces, PolicyTrialStore.Both::here)),
                                Integer.toString(trial.number())));
    }

    private static long count(List<Piece> pieces, Change change) {
        return pieces.stream().filter(p -> p.change() == change).count();
    }

    private static double sum(List<Piece> pieces, Function<PolicyTrialStore.Both, PolicyTrialRule.Trial> version) {
        return pieces.stream()
                .flatMap(p -> Stream.ofNullable(p.row().both()))
                .map(version)
                .mapToDouble(PolicyTrialRule.Trial::limitTonnes)
                .sum();
    }

    private PolicyTrialPage.Row row(PolicyTrialStore.Trial trial, Piece piece, Map<Long, StockView> stocks) {
        PolicyTrialStore.Both both = piece.row().both();
        StockView stock = stocks.get(piece.row().stockId());
        return new PolicyTrialPage.Row(
                title(stocks, piece),
                stock == null ? "/portfolio" : stock.path() + "/advice",
                Figures.tonnes(piece.row().limitNow()),
                Figures.tonnes(both == null ? null : (Double) both.against().limitTonnes()),
                Figures.tonnes(both == null ? null : (Double) both.here().limitTonnes()),
                change(piece),
                both == null ? "" : decided(trial, both),
                Figures.percent(both == null ? null : (Double) both.here().risk()));
    }

    private String change(Piece piece) {
        String key = "policy.trial.change." + piece.change();
        PolicyTrialStore.Both both = piece.row().both();
        if (both == null) {
            return words.word(key);
        }
        double against = both.against().limitTonnes();
        return against == 0 && piece.change() == Change.RISES
                ? words.word(key + ".fromNothing")
                : words.word(key, Figures.percent(Math.abs(both.here().limitTonnes() / against - 1)));
    }

    private String decided(PolicyTrialStore.Trial trial, PolicyTrialStore.Both both) {
        String here = words.word("policy.trial.decided." + both.here().decidedBy());
        return both.here().decidedBy().equals(both.against().decidedBy())
                ? here
                : words.word(
                        "policy.trial.decided.other",
                        here,
                        Integer.toString(trial.against()),
                        words.word("policy.trial.decided." + both.against().decidedBy()));
    }
}
