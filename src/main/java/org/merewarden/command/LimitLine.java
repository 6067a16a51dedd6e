package org.merewarden.command;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Locale;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Verdict;
import org.merewarden.core.policy.EarlierSeason;
import org.merewarden.core.policy.Recommendation;
import org.merewarden.core.policy.Recommendation.Rule;

/**
 * A row of LIMITS.csv: the recommendation for one stock.
 *
 * @param advised null where the assessment has no draws
 */
record LimitLine(
        String waterBody,
        String speciesKey,
        int season,
        @Nullable Advised advised,
        EvidenceStrength strength,
        Verdict verdict) {

    static final String HEADER = "water_body,species,season,limit_t,decided_by,ramp_t,ceiling_t,earlier_limit_t,"
            + "earlier_removals_t,below_limit_chance,below_limit_chance_closed,collapse_course,expected_catch_t,"
            + "bad_year_catch_t,recovered_by,strength,verdict,note";

    /**
     * @param riskClosed chance of B &lt; B lim at least once with nothing taken
     * @param expectedCatch mean over the horizon, t/yr
     * @param badYear 10 % quantile of the yearly catch, t/yr
     */
    record Advised(
            Recommendation recommendation,
            EarlierSeason earlier,
            double riskClosed,
            double collapseCourse,
            double expectedCatch,
            double badYear) {}

    List<String> cells() {
        List<String> cells = new ArrayList<>(List.of(waterBody, speciesKey, Integer.toString(season)));
        if (advised == null) {
            cells.addAll(Collections.nCopies(12, ""));
        } else {
            cells.addAll(numbers(advised));
        }
        cells.add(strength.name().toLowerCase(Locale.ROOT));
        cells.add(StockResult.word(verdict));
        cells.add(note());
        return cells;
    }

    private List<String> numbers(Advised a) {
        Recommendation r = a.recommendation();
        Integer recovery = r.recoverySeasons();
        return List.of(
                ResultsFile.number(r.limitTonnes()),
                word(r.decidedBy()),
                ResultsFile.number(r.after(Rule.RAMP)),
                ResultsFile.number(r.ceilingTonnes()),
                ResultsFile.number(a.earlier().limitTonnes()),
                ResultsFile.number(a.earlier().removalsTonnes()),
                ResultsFile.number(r.risk()),
                ResultsFile.number(a.riskClosed()),
                ResultsFile.number(a.collapseCourse()),
                ResultsFile.number(a.expectedCatch()),
                ResultsFile.number(a.badYear()),
                recovery == null ? "" : Integer.toString(season + recovery - 1));
    }

    private static String word(Rule rule) {
        return rule.name().toLowerCase(Locale.ROOT).replace('_', ' ');
    }

    private String note() {
        List<String> notes = new ArrayList<>();
        if (advised == null) {
            notes.add("no usable estimates: nothing is recommended");
        }
        if (!verdict.settled()) {
            notes.add("not settled: a limit needs a written reason");
        }
        if (strength == EvidenceStrength.NONE && advised != null) {
            notes.add("provisional ceiling: needs a review date");
        }
        return String.join("; ", notes);
    }

    /** As people read it. */
    static String table(List<LimitLine> lines) {
        List<List<String>> rows = Stream.concat(
                        Stream.of(List.of("stock", "limit, t", "decided by", "below B lim at least once", "verdict")),
                        lines.stream().map(LimitLine::row))
                .toList();
        return ReadableTable.aligned(rows) + """

                Below B lim at least once: the chance at the end of at least one of the coming seasons of the policy's horizon, if
                the limit were taken in each. No season in progress is known from a folder.
                Model estimates; to be reviewed by a qualified fisheries scientist before any limit rests on them.
                """;
    }

    private List<String> row() {
        return advised == null
                ? List.of(waterBody + " " + speciesKey, "-", "-", "-", StockResult.word(verdict))
                : List.of(
                        waterBody + " " + speciesKey,
                        ResultsFile.number(advised.recommendation().limitTonnes()),
                        word(advised.recommendation().decidedBy()),
                        ReadableTable.chance(advised.recommendation().risk()),
                        StockResult.word(verdict));
    }
}
