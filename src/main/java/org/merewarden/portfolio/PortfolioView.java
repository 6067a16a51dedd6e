package org.merewarden.portfolio;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * The portfolio's page in finished strings: nothing is left for the template to compute.
 *
 * @param lede the answer
 * @param possible what the region could yield; null with no assessed stock
 */
record PortfolioView(
        List<String> lede,
        @Nullable String possible,
        List<Field> fields,
        List<Header> headers,
        List<Row> rows,
        String q,
        String sort,
        String dir,
        String csvAddress,
        String xlsxAddress,
        boolean anyStock) {

    /** A choice field of the filter. */
    record Field(String name, String label, List<Option> options) {}

    record Option(String value, String label, boolean selected) {}

    /** @param ariaSort ascending, descending or none */
    record Header(String label, String address, String ariaSort, String arrow, String cssClass) {}

    /** A stock's row; drawings are finished SVG, "" where there is nothing to draw. */
    record Row(
            String key,
            String choose,
            String address,
            String water,
            String species,
            String standingCode,
            String standing,
            String littleKnown,
            String margin,
            String marginBar,
            String msy,
            String yield,
            String biomass,
            String biomassLine,
            String limit,
            String taken,
            String takenBar,
            String evidence,
            String assessed) {}
}
