package org.merewarden.portfolio;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * What a meeting looks at, in finished strings and drawings.
 *
 * @param sentences what was asked for and is not in the pack
 */
record MeetingPack(String season, List<String> sentences, List<Row> rows, List<Sheet> sheets) {

    /**
     * A line of the first page's table.
     *
     * @param standingCode secure, watch, strained, critical or unassessed
     * @param proposed limits that wait for a decision; empty where none does
     */
    record Row(
            String stock,
            String standingCode,
            String standing,
            String margin,
            String msy,
            String biomass,
            String limit,
            String proposed,
            String evidence) {}

    /**
     * Half a page.
     *
     * @param missing why there are no drawings; null where there are
     * @param equilibrium finished SVG; null where no assessment has draws, or the stock lives from stocking alone
     * @param biomass finished SVG; null without an assessed season
     * @param recommendation what the rule recommends, in a sentence; null where it has nothing to work on
     * @param risk its risk curve, finished SVG; null likewise
     */
    record Sheet(
            String title,
            List<String> lede,
            @Nullable String missing,
            @Nullable String equilibrium,
            @Nullable String biomass,
            @Nullable String recommendation,
            @Nullable String risk) {}
}
