package org.merewarden.core.inference.statespace;

import java.util.Arrays;
import java.util.List;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.statespace.ModeSearch.Fit;

/**
 * One-year-ahead predictions of values that a peel has not seen, against "same as last time".
 *
 * <pre>
 *   e = ln observed − ln predicted        MASE = mean |e| / mean |ln y_i − ln y_{i−1}|
 * </pre>
 *
 * <p>Mean absolute scaled error of Hyndman &amp; Koehler 2006, Int. J. Forecast. 22: 679–688 (recalled): the scale is the
 * mean change from one value of the series to the next, over the values before the first predicted season. Each
 * {@link Peels peel} predicts the values of the season after its last one: its state carried on without noise, through
 * that season's stocking and kills, under the F that yields that season's recorded catch; without a recorded catch, under
 * the last F of the walk. The catch is taken as known, since it is the survey that is being predicted. Values below
 * detection, effort of a closed season, and series that the peel did not use are not predicted.
 */
final class Hindcast {
    static final int LEAST_PREDICTIONS = 3;

    private final SeasonData data;
    private final StateDensity density;
    private final Expected expected;
    private final double[] errors;
    private int firstPredicted;

    /** {@code theta}: of all records; what the peels do not estimate is taken from it. */
    Hindcast(Fit full, ModelPriors priors, List<Fit> peels) {
        data = full.data();
        density = new StateDensity(data, priors);
        expected = new Expected(density);
        errors = new double[data.observations().count()];
        Arrays.fill(errors, Double.NaN);
        firstPredicted = data.seasons();
        for (Fit peel : peels) {
            predict(peel, full.theta().clone());
        }
    }

    private void predict(Fit peel, double[] theta) {
        int t = peel.data().seasons();
        firstPredicted = Math.min(firstPredicted, t);
        System.arraycopy(peel.theta(), 0, theta, 0, OuterParameters.FIRST_SCATTER);
        density.parameters(theta, 0);
        double x = Math.log(peel.biomassTonnes(t) / data.unitTonnes()) - density.logCapacity(t);
        expected.seasonOfKnownCatch(t, x, peel.lastHarvest());
        int[] firstOf = data.observations().firstOf();
        for (int i = firstOf[t]; i < firstOf[t + 1]; i++) {
            if (Expected.comparable(data, i, t)) {
                errors[i] = data.observations().value()[i] - expected.log(i, logQ(peel, i));
            }
        }
    }

    /** ln q on the scale of all records, which count an index from another mean; NaN where the peel has none. */
    private double logQ(Fit peel, int i) {
        int j = data.observations().series()[i];
        if (j < 0) {
            return 0;
        }
        Series series = data.series().get(j);
        int own = ModeSearch.place(peel.data(), series);
        if (own < 0) {
            return Double.NaN;
        }
        double shift = peel.data().series().get(own).logMean() - series.logMean();
        return peel.path().logQ()[0][own] + (series.effort() ? -shift : shift);
    }

    /** Errors of the series' predictions. */
    double[] errors(ValuesOfSeries series) {
        return series.values().stream()
                .mapToDouble(i -> errors[i])
                .filter(Double::isFinite)
                .toArray();
    }

    /** MASE of the series; null with fewer than {@value #LEAST_PREDICTIONS} predictions or nothing to compare with. */
    @Nullable
    Double scaledError(ValuesOfSeries series) {
        Observations o = data.observations();
        double[] before = series.values().stream()
                .filter(i -> i < o.firstOf()[firstPredicted])
                .filter(i -> o.kind()[i] != Observations.BELOW_DETECTION)
                .mapToDouble(i -> o.value()[i])
                .toArray();
        return scaledError(errors(series), before);
    }

    static @Nullable Double scaledError(double[] errors, double[] before) {
        double change = IntStream.range(1, before.length)
                .mapToDouble(i -> Math.abs(before[i] - before[i - 1]))
                .average()
                .orElse(0);
        return errors.length < LEAST_PREDICTIONS || !(change > 0)
                ? null
                : (Double) (Arrays.stream(errors).map(Math::abs).average().orElseThrow() / change);
    }
}
