package org.merewarden.assessment;

import java.util.Arrays;
import java.util.Locale;
import java.util.function.IntToDoubleFunction;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import org.apache.commons.math3.stat.descriptive.rank.Percentile;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Posterior;

/** The 10, 50 and 90 % quantiles that lists show, read off a posterior's draws. */
final class Summary {
    /** Three quantiles, all null where the posterior has no draws. */
    record Band(
            @Nullable Double low,
            @Nullable Double middle,
            @Nullable Double high) {}

    private final Posterior posterior;

    Summary(Posterior posterior) {
        this.posterior = posterior;
    }

    Band msy() {
        return band(i -> posterior.msyTonnes()[i]);
    }

    Band fmsy() {
        return band(i -> posterior.fmsyPerYear()[i]);
    }

    Band capacity() {
        return band(posterior::capacity);
    }

    Band biomass() {
        return band(posterior::presentBiomass);
    }

    Band biomassOverBmsy() {
        return band(i -> posterior.presentBiomass(i) / posterior.bmsy(i));
    }

    /** Median B/BMSY at the start of each season and of the coming one, three decimals, separated by blanks. */
    String trend() {
        if (posterior.draws() == 0) {
            return "";
        }
        return IntStream.rangeClosed(0, posterior.seasons())
                .mapToObj(t -> band(i -> posterior.biomassTonnes()[i][t] / posterior.bmsy(i))
                        .middle())
                .map(b -> String.format(Locale.ROOT, "%.3f", b))
                .collect(Collectors.joining(" "));
    }

    private Band band(IntToDoubleFunction ofDraw) {
        if (posterior.draws() == 0) {
            return new Band(null, null, null);
        }
        double[] values =
                IntStream.range(0, posterior.draws()).mapToDouble(ofDraw).toArray();
        Arrays.sort(values);
        var percentile = new Percentile().withEstimationType(Percentile.EstimationType.R_7);
        percentile.setData(values);
        return new Band(percentile.evaluate(10), percentile.evaluate(50), percentile.evaluate(90));
    }
}
