package org.merewarden.portfolio;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * The comparison's page in finished strings.
 *
 * @param drawing the large diagram as SVG; null with nothing to draw
 * @param json the same for the script
 */
record CompareView(
        List<String> lede,
        @Nullable String drawing,
        @Nullable String json,
        List<Link> axes,
        List<Link> focus,
        List<Row> rows,
        List<String> multiples) {

    /** @param current page for the choice in force, else null */
    record Link(String label, String address, @Nullable String current) {}

    record Row(
            String address,
            String title,
            String msy,
            String capacity,
            String fold,
            String biomass,
            String limit,
            String margin,
            String tipping,
            String distance) {}
}
