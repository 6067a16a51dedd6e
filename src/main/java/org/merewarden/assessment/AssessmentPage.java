package org.merewarden.assessment;

import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;

/**
 * One stored assessment in finished strings.
 *
 * @param lede the answer, then whether it settled
 * @param learned empty where no parameter was compared with its prior
 * @param unlearned why there is nothing of what the records taught; null where there is
 * @param priors empty for a stock that lives from stocking alone
 * @param lake where MSY was first taken from the lake's formulas; else null
 * @param checks null where none were computed
 * @param helps what further evidence would do, most helpful first
 * @param seasons by season; the last row is the start of the coming one
 */
record AssessmentPage(
        String title,
        String stockPath,
        int number,
        List<String> lede,
        List<String> verdict,
        boolean weighted,
        Facts facts,
        List<Quantity> quantities,
        List<String> taught,
        String stripScale,
        List<LearnedRow> learned,
        @Nullable String unlearned,
        List<PriorRow> priors,
        LakeFormulas.@Nullable View lake,
        @Nullable Checks checks,
        List<String> helps,
        Map<String, String> estimates,
        List<Season> seasons) {

    /** What was made, from what, by whom. */
    record Facts(
            String method,
            String strength,
            String seasons,
            String madeAt,
            String madeBy,
            int draws,
            String evidenceHash) {}

    /** One quantity with its 10, 50 and 90 % quantiles. */
    record Quantity(String name, String interval) {}

    /**
     * A parameter before and after the records.
     *
     * @param strip both ranges as finished SVG
     */
    record LearnedRow(String parameter, String strip, String before, String after, String overlap) {}

    /** @param spread the factor of two cases in three */
    record PriorRow(String parameter, String before, String spread, String source, String validity, String reason) {}

    /** How the records are met. */
    record Checks(
            List<SeriesPart> series,
            List<String> influence,
            @Nullable Peels peels) {}

    /**
     * One series.
     *
     * @param drawing residuals through the seasons as finished SVG; null without any
     */
    record SeriesPart(
            String name,
            List<String> sentences,
            @Nullable String drawing,
            SeriesRow row,
            List<ResidualRow> residuals) {}

    /** The numbers behind a series' sentences. */
    record SeriesRow(
            String kind,
            int values,
            String contrast,
            String mean,
            String sd,
            String runs,
            String lagOne,
            String scaledError,
            String msyWithout,
            String msyWith,
            String ratioWithout,
            String ratioWith) {}

    /** @param time of the season, 0–1 */
    record ResidualRow(int season, String time, String standardised) {}

    /** The assessment as it would have been made some seasons ago. */
    record Peels(
            String sentence,
            String drawing,
            List<PeelRow> rows,
            String rhoBiomass,
            String rhoRelativeBiomass,
            String rhoFishing) {}

    record PeelRow(int lastYear, String msy, String biomass, String ratio, String fishing) {}

    /** One season: medians with their 80 % ranges. */
    record Season(int year, String biomass, String ratio, String fishing, String fishingRatio, String removals) {}
}
