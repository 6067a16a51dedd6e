package org.merewarden.advice;

import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Set;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Figures;
import org.merewarden.web.Seasons;
import org.merewarden.web.Texts;
import org.merewarden.web.Who;
import org.springframework.stereotype.Component;

/** What was drafted, proposed and decided about a stock's limits, in finished strings. */
@Component
class DecisionsView {
    private final OpenProposals proposals;
    private final Decisions decisions;
    private final LimitStore limits;
    private final Seasons seasons;
    private final DecisionWords words;
    private final Texts texts;

    DecisionsView(
            OpenProposals proposals,
            Decisions decisions,
            LimitStore limits,
            Seasons seasons,
            DecisionWords words,
            Texts texts) {
        this.proposals = proposals;
        this.decisions = decisions;
        this.limits = limits;
        this.seasons = seasons;
        this.words = words;
        this.texts = texts;
    }

    /** Something written down that is not in force: a draft, or a limit that waits for its moment. */
    record Waiting(String id, String what) {}

    /**
     * A limit that is issued and holds or will hold.
     *
     * @param left what its withdrawal would leave; null where another limit stays in force
     * @param revisable it is in force for this season or a later one
     */
    record Standing(
            String id, String season, String what, @Nullable String left, boolean revisable) {}

    /** A past act. */
    record Past(
            String limitId,
            String act,
            String what,
            String at,
            String by,
            String reason,
            boolean issued,
            boolean inForce,
            @Nullable String from) {}

    /**
     * The page's strings.
     *
     * @param revisable those of the standing ones that may be revised
     * @param standing all limits in force and those that wait for their moment
     * @param closesAtOnce the reader's closure is issued in the act that proposes it
     */
    record Page(
            List<OpenProposals.Open> open,
            List<Waiting> pending,
            List<Waiting> drafts,
            List<Standing> revisable,
            List<Standing> standing,
            List<Past> past,
            boolean closesAtOnce) {}

    Page page(long stockId, List<LimitFile> files) {
        Set<Long> inForce = limits.numbersInForce(stockId);
        int current = seasons.current();
        List<Standing> standing = files.stream()
                .filter(LimitFile::standing)
                .sorted(Comparator.comparing((LimitFile f) -> -f.limit().season()))
                .map(f -> standing(f, files, inForce.contains(f.id()), current))
                .toList();
        return new Page(
                proposals.open(stockId, files),
                files.stream()
                        .filter(f -> f.standing() && !inForce.contains(f.id()))
                        .map(this::pending)
                        .toList(),
                files.stream().filter(LimitFile::draft).map(this::draft).toList(),
                standing.stream().filter(Standing::revisable).toList(),
                standing,
                past(files, inForce, current),
                Who.has("APPROVER") && decisions.ownProposals());
    }

    private Standing standing(LimitFile file, List<LimitFile> files, boolean inForce, int current) {
        boolean revisable = inForce && file.limit().season() >= current;
        return new Standing(
                Long.toString(file.id()),
                AdviceView.season(file.limit().season()),
                proposals.what(file.limit()),
                inForce ? left(file, files, revisable) : null,
                revisable);
    }

    private String left(LimitFile file, List<LimitFile> files, boolean revisable) {
        String season = AdviceView.season(file.limit().season());
        return files.stream()
                .filter(f -> revisable && f.state().equals(LimitWriter.SUPERSEDED))
                .filter(f -> Objects.equals(f.latest().beside().successor(), file.id()))
                .findFirst()
                .map(f -> texts.of(
                        "advice.withdraw.left.before", season, Long.toString(f.id()), proposals.what(f.limit())))
                .orElseGet(() -> texts.of("advice.withdraw.left", season));
    }

    private Waiting pending(LimitFile file) {
        LimitHistory.Decision issued = file.latest();
        return new Waiting(
                Long.toString(file.id()),
                texts.of(
                        "advice.pending.what",
                        Long.toString(file.id()),
                        proposals.what(file.limit()),
                        Figures.dateTime(issued.effectiveAt()),
                        issued.decidedBy()));
    }

    private Waiting draft(LimitFile file) {
        return new Waiting(
                Long.toString(file.id()),
                texts.of(
                        "advice.draft.what",
                        Long.toString(file.id()),
                        proposals.what(file.limit()),
                        file.first().decidedBy(),
                        file.first().when()));
    }

    private List<Past> past(List<LimitFile> files, Set<Long> inForce, int current) {
        Map<Long, NewLimit> byId = new HashMap<>();
        files.forEach(f -> byId.put(f.id(), f.limit()));
        return files.stream()
                .flatMap(f -> f.newestFirst().stream())
                .sorted(Comparator.comparing(LimitHistory.Decision::at).reversed())
                .map(act -> {
                    NewLimit limit = Objects.requireNonNull(byId.get(act.limitId()));
                    return past(act, limit, limit.season() >= current && inForce.contains(act.limitId()));
                })
                .toList();
    }

    /** @param now whether the limit is in force for the current season or a coming one */
    private Past past(LimitHistory.Decision act, NewLimit limit, boolean now) {
        return new Past(
                Long.toString(act.limitId()),
                texts.of("advice.act." + act.act()),
                proposals.what(limit),
                act.when(),
                act.decidedBy(),
                words.reason(act),
                act.act().equals(LimitWriter.ISSUED),
                now && act.act().equals(LimitWriter.ISSUED),
                act.laterEffect() ? texts.of("advice.past.from", Figures.dateTime(act.effectiveAt())) : null);
    }
}
