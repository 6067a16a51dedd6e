package org.merewarden.advice;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * The upper part of the advice page in finished strings: recommendation, working, risk and alternatives. Lists are empty and
 * pictures null where the rule has nothing to work on.
 *
 * @param season the one that is advised, as in addresses
 * @param policyNumber of the version that was used; 0 where none was
 * @param interval probability of the intervals
 */
record OutlookPage(
        int season,
        int policyNumber,
        String interval,
        String lede,
        List<String> cautions,
        List<Step> steps,
        @Nullable String lastSeason,
        List<Part> parts,
        List<String> effort,
        @Nullable String riskCurve,
        List<RiskRow> risks,
        @Nullable String biomassAhead,
        List<String> alternatives,
        List<Row> rows,
        List<Row> bySeason,
        List<Row> biomass,
        @Nullable String stress) {

    /** @param amount what stands after the step; empty where the step is no amount */
    record Step(String text, String amount) {}

    /** From the limit to the logbook. */
    record Part(String name, String amount) {}

    record RiskRow(String tonnes, String chance, boolean above) {}

    record Cell(String text, boolean above) {}

    /** One cell for each alternative. */
    record Row(String name, List<Cell> cells) {}
}
