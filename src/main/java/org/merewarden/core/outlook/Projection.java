package org.merewarden.core.outlook;

import java.util.Arrays;
import java.util.stream.IntStream;
import org.merewarden.core.inference.Quantiles;

/**
 * Every draw run through the seasons S … S + Y − 1 under one course.
 *
 * @param biomassTonnes [draw][Y + 1], t at the seasons' starts, the last at the end of season S + Y − 1
 * @param catchTonnes [draw][Y], t in the season
 * @param limitTonnes B lim by draw, t
 */
public record Projection(double[][] biomassTonnes, double[][] catchTonnes, double[] limitTonnes) {

    public int seasons() {
        return catchTonnes[0].length;
    }

    /** Chance of B &lt; B lim at the end of each season, 0–1. */
    public double[] belowLimit() {
        return IntStream.rangeClosed(1, seasons())
                .mapToDouble(t -> share(i -> biomassTonnes[i][t] < limitTonnes[i]))
                .toArray();
    }

    /** Chance of B &lt; B lim at the end of at least one season, 0–1. */
    public double belowLimitAtLeastOnce() {
        return share(
                i -> Arrays.stream(biomassTonnes[i], 1, seasons() + 1).min().orElseThrow() < limitTonnes[i]);
    }

    /** Mean over the draws and seasons, t/yr. */
    public double expectedCatch() {
        return Arrays.stream(catchTonnes).flatMapToDouble(Arrays::stream).sum() / catchTonnes.length / seasons();
    }

    /** Quantile over all draws and seasons, t/yr: 0.1 is a bad year. */
    public double catchQuantile(double p) {
        return Quantiles.of(
                Arrays.stream(catchTonnes).flatMapToDouble(Arrays::stream).toArray(), p);
    }

    /** Quantiles of biomass at the start of season S + t (t = Y: the end of the last), t. */
    public double[] biomassQuantiles(int t, double... p) {
        return Quantiles.of(
                Arrays.stream(biomassTonnes).mapToDouble(path -> path[t]).toArray(), p);
    }

    private double share(java.util.function.IntPredicate holds) {
        return (double) IntStream.range(0, biomassTonnes.length).filter(holds).count() / biomassTonnes.length;
    }
}
