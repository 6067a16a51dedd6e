package org.merewarden.season;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * An entry whose references were found, ready to be stored.
 *
 * @param stockId null where mixed, or where the water holds no such stock
 * @param factor landed weight × factor = live weight
 */
record Checked(
        Entry entry,
        int season,
        long waterBodyId,
        @Nullable Long stockId,
        @Nullable Long cooperativeId,
        double factor,
        double liveWeightKg,
        List<Flag> flags) {

    /** Whether it is taken from a limit. */
    boolean taken() {
        return entry.sector().equals("commercial") && !entry.fate().equals("released");
    }
}
