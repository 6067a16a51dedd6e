package org.merewarden.command;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Verdict;

/**
 * What came out for one stock.
 *
 * @param speciesKey species code, or code.population
 * @param effectiveDraws how many independent draws the assessment's sample is worth; null without draws
 */
record StockResult(
        String waterBody,
        String speciesKey,
        List<Line> lines,
        @Nullable Double effectiveDraws,
        Verdict verdict) {

    /** The quantity, of its last season where it has one. */
    Line line(String quantity) {
        return lines.stream()
                .filter(l -> l.quantity().equals(quantity))
                .reduce((first, last) -> last)
                .orElseGet(() -> Line.unknown(quantity, null));
    }

    String verdictWord() {
        return word(verdict);
    }

    static String word(Verdict verdict) {
        return verdict.settled() ? "settled" : "not-settled";
    }
}
