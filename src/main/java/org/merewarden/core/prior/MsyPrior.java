package org.merewarden.core.prior;

import java.util.List;
import java.util.Locale;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.Evidence;

/**
 * Prior of MSY without a statement of the office.
 *
 * <pre>
 *   with limnology:   MSY = Y · s,   log-sd² = log-sd(Y)² + log-sd(s)²
 *   with catches:     MSY = the 90 % quantile of the seasons' removals, log-sd 0.8
 *   with neither:     MSY = 5 kg/ha · A · s, log-sd 1.5
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>Y</td><td>yield of the lake, all species, t/yr: {@link LakeYield}, several formulas combined by widening</td></tr>
 * <tr><td>s</td><td>this stock's share: {@link LakeShare}</td></tr>
 * <tr><td>A</td><td>area, ha</td></tr>
 * </table>
 *
 * <p>Every constant here is our judgement. The quantile is of order: the k-th largest of N with k = ⌈N/10⌉.
 */
final class MsyPrior {
    private static final double CATCHES_LOG_SD = 0.8;
    private static final double NOTHING_LOG_SD = 1.5;
    private static final double NOTHING_KG_PER_HECTARE = 5;
    private static final double LEAST_TONNES = 1e-9;
    private static final double MOST_TONNES = 1e12;

    private MsyPrior() {}

    static Prior of(Evidence evidence) {
        List<Estimate> lake = LakeYield.predictTonnes(evidence.habitat());
        if (!lake.isEmpty()) {
            return fromLake(Estimate.combined(lake), evidence);
        }
        double large = largeCatch(evidence);
        if (large > 0) {
            return prior(
                    large,
                    CATCHES_LOG_SD,
                    "the larger recorded catches",
                    "Nothing is known of the lake's water: a wide prior around the larger catches.",
                    "our judgement; catches tell what was taken, not what can be");
        }
        double guess = NOTHING_KG_PER_HECTARE
                * evidence.habitat().areaHectares()
                / 1000
                * LakeShare.of(evidence).value();
        return prior(
                guess,
                NOTHING_LOG_SD,
                "5 kg/ha over the lake's area",
                "Neither the lake's water nor any catch is known: little more than a guess.",
                "our judgement");
    }

    private static Prior fromLake(Estimate lake, Evidence evidence) {
        LakeShare share = LakeShare.of(evidence);
        String reason = String.format(
                Locale.ROOT,
                "The lake's yield of all species (%.3g t) times this stock's share (%.2g, %s).",
                lake.value(),
                share.value(),
                share.words());
        return prior(
                lake.value() * share.value(),
                Math.hypot(lake.logSd(), share.logSd()),
                lake.source(),
                reason,
                lake.validity() + "; prediction error our judgement");
    }

    private static double largeCatch(Evidence evidence) {
        double[] removals = evidence.catches().stream()
                .mapToInt(CatchRecord::year)
                .distinct()
                .mapToDouble(year -> evidence.removals(year).orElse(0))
                .sorted()
                .toArray();
        return removals.length == 0 ? 0 : removals[removals.length - (removals.length + 9) / 10];
    }

    private static Prior prior(double tonnes, double logSd, String source, String reason, String validity) {
        double median = Math.max(LEAST_TONNES, Math.min(MOST_TONNES, tonnes));
        return new Prior("msy_t", median, logSd, source, reason, validity);
    }
}
