package org.merewarden.portfolio;

import java.util.List;

/**
 * A season's return in finished strings.
 *
 * @param empty nothing is removed and no limit set
 * @param removals cells district, species, sector, basis, stocks, recorded, corrected
 * @param limits cells district, species, stocks, limits, without, total removals, set-asides, to be logged,
 *     remark
 */
record ReturnView(
        String season,
        List<String> lede,
        boolean empty,
        List<List<String>> removals,
        List<List<String>> limits,
        List<Totals> totals,
        String earlier,
        String later) {

    /** @param rows cells name, recorded, corrected, stocks, limits, without, total removals, set-asides, to be logged, remark */
    record Totals(String caption, String head, List<List<String>> rows) {}
}
