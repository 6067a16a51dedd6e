package org.merewarden.assessment;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * The runs in finished strings.
 *
 * @param active whether a run waits or is under way
 * @param chosen the run whose stocks are listed; null without any run
 */
record RunsPage(
        int stocks,
        int assessed,
        boolean active,
        List<Run> runs,
        @Nullable Chosen chosen) {
    /** A run as a row. */
    record Run(
            long id,
            String subject,
            String state,
            int done,
            int total,
            String note,
            String by,
            String requested,
            String finished,
            boolean active) {}

    /** @param sentence how many settled, did not settle, failed or still wait */
    record Chosen(String caption, String sentence, List<StockRow> stocks) {}

    /**
     * What became of a stock.
     *
     * @param address its assessment of this run, else the stock
     * @param why the first of the verdict's sentences where it did not settle; else empty
     */
    record StockRow(String stock, String address, String outcome, String why, String strength, String msy) {}
}
