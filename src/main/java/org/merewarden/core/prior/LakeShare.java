package org.merewarden.core.prior;

import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.Traits;

/**
 * A stock's share of the lake's yield of all species: as stated (log-sd 0.3), else of the recorded catch where every stock
 * of the lake has one (log-sd 0.5), else 1/number of stocks (log-sd 0.7; a lake's only stock 0.3).
 *
 * <p>Every constant here is our judgement.
 *
 * @param value 0–1, > 0
 * @param logSd how far off it may be, of the logarithm
 * @param words where it comes from
 */
public record LakeShare(double value, double logSd, String words) {
    private static final double STATED_LOG_SD = 0.3;
    private static final double RECORDED_LOG_SD = 0.5;
    private static final double EQUAL_LOG_SD = 0.7;

    public static LakeShare of(Evidence evidence) {
        return of(evidence.habitat(), evidence.traits());
    }

    /** The same of a stock whose records nobody has read: none of them matters. */
    public static LakeShare of(Habitat habitat, Traits traits) {
        Double stated = traits.shareOfLakeYield();
        Double recorded = habitat.shareOfRecordedCatch();
        int stocks = habitat.stocksInLake();
        if (stated != null && isShare(stated)) {
            return new LakeShare(stated, STATED_LOG_SD, "as stated");
        }
        if (stocks == 1) {
            return new LakeShare(1, STATED_LOG_SD, "the only stock of the lake");
        }
        if (recorded != null && isShare(recorded)) {
            return new LakeShare(recorded, RECORDED_LOG_SD, "its share of the recorded catch");
        }
        return new LakeShare(1.0 / stocks, EQUAL_LOG_SD, "equal shares, for want of a stated one");
    }

    private static boolean isShare(double value) {
        return value > 0 && value <= 1;
    }
}
