package org.merewarden.records;

import java.util.Collection;
import java.util.Map;
import java.util.TreeMap;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;

/**
 * A stock's share of what is recorded as taken from its water body.
 *
 * <pre>
 *   share = m / Σ m,   m: a stock's recorded removals (catch/reported fraction) a season, over its seasons with a record
 * </pre>
 */
final class RecordedShare {
    /** Keeps the share the same to the last bit in whatever order the rows come. */
    private static final double STEPS = 1e9;

    private RecordedShare() {}

    /** One recorded catch of one of the water body's stocks. */
    record Taken(String stock, int year, double removalsTonnes) {}

    /** Null unless each of the stocks has a catch on record, and something was taken. */
    static @Nullable Double of(String stock, int stocksInLake, Collection<Taken> catches) {
        Map<String, Double> means = catches.stream()
                .collect(Collectors.groupingBy(
                        Taken::stock,
                        TreeMap::new,
                        Collectors.collectingAndThen(Collectors.toList(), RecordedShare::perSeason)));
        double sum = means.values().stream().mapToDouble(Double::doubleValue).sum();
        Double own = means.get(stock);
        return own == null || means.size() < stocksInLake || !(sum > 0) ? null : Math.rint(own / sum * STEPS) / STEPS;
    }

    private static double perSeason(Collection<Taken> catches) {
        double sum = catches.stream().mapToDouble(Taken::removalsTonnes).sum();
        return sum / catches.stream().mapToInt(Taken::year).distinct().count();
    }
}
