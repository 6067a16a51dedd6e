package org.merewarden.portfolio;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * One stock's page in finished strings.
 *
 * @param lede the answer; begins with the failure where the assessment is not settled
 * @param equilibrium null where no assessment has draws, or the stock lives from stocking alone
 * @param biomass null without an assessed season, as is fishing
 * @param words fold, margin to it, tipping biomass, collapse course, return time
 * @param strip evidence by kind and year as finished SVG; null without an assessment or any record
 * @param basis what the assessment rests on; null without one
 */
record StockPage(
        String title,
        String standingCode,
        String standing,
        List<String> lede,
        @Nullable String missing,
        @Nullable String assessAddress,
        @Nullable Figure equilibrium,
        List<Term> words,
        @Nullable Figure biomass,
        @Nullable Figure fishing,
        List<HistoryRow> history,
        List<Term> season,
        String takenBar,
        @Nullable String strip,
        @Nullable Basis basis,
        List<Term> estimates,
        List<Term> regressions,
        List<Link> assessments,
        List<Link> links,
        String adviceAddress,
        @Nullable Link notice) {

    /** The drawing as SVG, and its data for the script. */
    record Figure(String id, String drawing, String json) {}

    record Term(String name, String text) {}

    /**
     * What an assessment rests on.
     *
     * @param learned what the records taught and what would teach most; empty where that was not computed
     * @param verdict its checks in sentences
     */
    record Basis(String strength, List<String> learned, List<String> verdict, String method, Link assessment) {}

    record Link(String label, String address) {}

    /** @param estimated removals as the model sees them; empty where it does not estimate them */
    record HistoryRow(
            String season, String biomass, String fishing, String removals, String estimated, String surveys) {}
}
