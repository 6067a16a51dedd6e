package org.merewarden.core.inference.statespace;

import java.util.Comparator;
import java.util.List;
import java.util.Set;
import java.util.stream.IntStream;

/**
 * Survey and effort values by season, as parallel arrays.
 *
 * @param firstOf [T + 1]: the values of season t are firstOf[t] … firstOf[t + 1] − 1
 * @param kind one of the constants of this record
 * @param time of the season, 0–1; effort 0
 * @param value logarithm: of an index or effort relative to its series' mean, of a biomass in the data's unit; below
 *     detection: of the smallest value that could have been seen
 * @param variance of the value beyond the series' scatter
 * @param series number of the series; −1 for absolute biomass
 * @param names of the series, absolute biomass included
 */
record Observations(
        int[] firstOf, int[] kind, double[] time, double[] value, double[] variance, int[] series, List<String> names) {
    static final int INDEX = 0;
    static final int BELOW_DETECTION = 1;
    static final int BIOMASS = 2;
    static final int EFFORT = 3;

    /** One value before it is packed. */
    record Point(int season, int kind, double time, double value, double variance, int series, String name) {}

    int count() {
        return kind.length;
    }

    static Observations pack(List<Point> points, int seasons) {
        List<Point> inOrder =
                points.stream().sorted(Comparator.comparingInt(Point::season)).toList();
        int[] firstOf = new int[seasons + 1];
        inOrder.forEach(p -> firstOf[p.season() + 1]++);
        for (int t = 0; t < seasons; t++) {
            firstOf[t + 1] += firstOf[t];
        }
        return new Observations(
                firstOf,
                inOrder.stream().mapToInt(Point::kind).toArray(),
                inOrder.stream().mapToDouble(Point::time).toArray(),
                inOrder.stream().mapToDouble(Point::value).toArray(),
                inOrder.stream().mapToDouble(Point::variance).toArray(),
                inOrder.stream().mapToInt(Point::series).toArray(),
                inOrder.stream().map(Point::name).toList());
    }

    /** Season of value i. */
    int season(int i) {
        int t = 0;
        while (firstOf[t + 1] <= i) {
            t++;
        }
        return t;
    }

    /** All but these values; series above number {@code gone} move down by one, none where it is negative. */
    Observations without(Set<Integer> values, int gone) {
        List<Point> kept = IntStream.range(0, count())
                .filter(i -> !values.contains(i))
                .mapToObj(i -> new Point(
                        season(i),
                        kind[i],
                        time[i],
                        value[i],
                        variance[i],
                        gone >= 0 && series[i] > gone ? series[i] - 1 : series[i],
                        names.get(i)))
                .toList();
        return pack(kept, firstOf.length - 1);
    }
}
