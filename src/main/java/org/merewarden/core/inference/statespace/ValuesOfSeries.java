package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.TreeMap;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Diagnostics.Kind;

/**
 * The values of one index, effort series or kind of absolute biomass, in order of time.
 *
 * @param name as in the tables
 * @param kind what it measures
 * @param series its number; −1 for absolute biomass
 * @param values numbers of its values
 */
record ValuesOfSeries(String name, Kind kind, int series, List<Integer> values) {
    ValuesOfSeries {
        values = List.copyOf(values);
    }

    /** Indices by name, then effort by name, then absolute biomass by name. */
    static List<ValuesOfSeries> of(SeasonData data) {
        Observations o = data.observations();
        List<ValuesOfSeries> all = new ArrayList<>();
        for (int j = 0; j < data.series().size(); j++) {
            int number = j;
            Series series = data.series().get(j);
            List<Integer> values = IntStream.range(0, o.count())
                    .filter(i -> o.series()[i] == number)
                    .boxed()
                    .toList();
            all.add(new ValuesOfSeries(series.name(), series.effort() ? Kind.EFFORT : Kind.INDEX, j, values));
        }
        TreeMap<String, List<Integer>> biomass = new TreeMap<>();
        for (int i = 0; i < o.count(); i++) {
            if (o.kind()[i] == Observations.BIOMASS) {
                biomass.computeIfAbsent(o.names().get(i), name -> new ArrayList<>())
                        .add(i);
            }
        }
        biomass.forEach((name, values) -> all.add(new ValuesOfSeries(name, Kind.BIOMASS, -1, values)));
        return all;
    }

    /** Largest over smallest value above zero; null with fewer than two. */
    @Nullable
    Double contrast(Observations o) {
        double[] logs = values.stream()
                .filter(i -> o.kind()[i] != Observations.BELOW_DETECTION)
                .mapToDouble(i -> o.value()[i])
                .sorted()
                .toArray();
        double contrast = logs.length < 2 ? Double.NaN : Math.exp(logs[logs.length - 1] - logs[0]);
        return Double.isFinite(contrast) ? (Double) contrast : null;
    }
}
