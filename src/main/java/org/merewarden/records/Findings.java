package org.merewarden.records;

import java.util.ArrayList;
import java.util.Collection;
import java.util.List;
import java.util.Map;
import java.util.SortedMap;
import java.util.SortedSet;
import java.util.TreeMap;
import java.util.TreeSet;
import java.util.stream.Collectors;
import java.util.stream.DoubleStream;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.web.Cells;

/** Data-quality rules; each yields at most one finding, or one for each series, sector or event. */
final class Findings {
    /** Beyond this many spreads an index value is far from its neighbours. */
    static final double FAR_SPREADS = 5;
    /** Changes of less than 5 % are never far, however smooth the series is. */
    static final double LEAST_SPREAD = 0.05;

    private static final int FEWEST_FOR_SPREAD = 7;
    /** Turns a median absolute deviation into a standard deviation where the deviations are normal. */
    private static final double MAD_TO_SD = 1.4826;

    /** Whether a sector stated for a year which part of its catch was reported. */
    record Reported(int year, String sector, @Nullable Double fraction) {}

    private Findings() {}

    static List<Finding> of(Evidence evidence, List<Reported> reported) {
        return Stream.of(
                        catchGaps(evidence),
                        indexWithoutCatch(evidence),
                        effortWithoutCatch(evidence),
                        farValues(evidence),
                        fractionsMissing(reported),
                        unusedStockings(evidence),
                        unknownKills(evidence))
                .flatMap(s -> s)
                .toList();
    }

    static Stream<Finding> catchGaps(Evidence evidence) {
        SortedSet<Integer> years = catchYears(evidence);
        if (years.isEmpty()) {
            return Stream.empty();
        }
        List<Integer> missing = IntStream.range(years.first(), years.last())
                .boxed()
                .filter(y -> !years.contains(y))
                .toList();
        return missing.isEmpty() ? Stream.empty() : Stream.of(Finding.of("catchGaps", ranges(missing)));
    }

    static Stream<Finding> indexWithoutCatch(Evidence evidence) {
        return withoutCatch(
                "indexWithoutCatch", evidence, evidence.indices().stream().map(SurveyRecord::year));
    }

    static Stream<Finding> effortWithoutCatch(Evidence evidence) {
        return withoutCatch(
                "effortWithoutCatch",
                evidence,
                evidence.effort().stream().filter(e -> e.effort() > 0).map(EffortRecord::year));
    }

    private static Stream<Finding> withoutCatch(String rule, Evidence evidence, Stream<Integer> years) {
        SortedSet<Integer> known = catchYears(evidence);
        SortedSet<Integer> bare = years.filter(y -> !known.contains(y)).collect(Collectors.toCollection(TreeSet::new));
        return bare.isEmpty() ? Stream.empty() : Stream.of(Finding.of(rule, ranges(bare)));
    }

    private static SortedSet<Integer> catchYears(Evidence evidence) {
        return evidence.catches().stream().map(CatchRecord::year).collect(Collectors.toCollection(TreeSet::new));
    }

    static Stream<Finding> farValues(Evidence evidence) {
        return evidence.indices().stream()
                .filter(s -> s.value() > 0)
                .collect(Collectors.groupingBy(SurveyRecord::series, TreeMap::new, Collectors.toList()))
                .entrySet()
                .stream()
                .flatMap(e -> farValues(e.getKey(), e.getValue()));
    }

    /**
     * Deviation of each value's logarithm from the mean of its two neighbours' (one at the ends), against the robust
     * spread of these deviations. An outlier drags its neighbours half-way, so only the local peak is named.
     */
    private static Stream<Finding> farValues(String series, List<SurveyRecord> values) {
        if (values.size() < FEWEST_FOR_SPREAD) {
            return Stream.empty();
        }
        double[] logs = values.stream().mapToDouble(v -> Math.log(v.value())).toArray();
        double[] off = IntStream.range(0, logs.length)
                .mapToDouble(i -> Math.abs(logs[i] - neighbours(logs, i)))
                .toArray();
        double spread = Math.max(LEAST_SPREAD, MAD_TO_SD * median(off));
        return IntStream.range(0, off.length)
                .filter(i -> off[i] > FAR_SPREADS * spread && peak(off, i))
                .mapToObj(i -> Finding.of(
                        "farValue",
                        series,
                        String.valueOf(values.get(i).year()),
                        Cells.plain(values.get(i).value())));
    }

    private static double neighbours(double[] logs, int i) {
        if (i == 0) {
            return logs[1];
        }
        return i == logs.length - 1 ? logs[i - 1] : (logs[i - 1] + logs[i + 1]) / 2;
    }

    private static boolean peak(double[] off, int i) {
        return (i == 0 || off[i] > off[i - 1]) && (i == off.length - 1 || off[i] >= off[i + 1]);
    }

    private static double median(double[] values) {
        double[] sorted = DoubleStream.of(values).sorted().toArray();
        int half = sorted.length / 2;
        return sorted.length % 2 == 1 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
    }

    static Stream<Finding> fractionsMissing(List<Reported> reported) {
        SortedMap<String, List<Reported>> bySector =
                reported.stream().collect(Collectors.groupingBy(Reported::sector, TreeMap::new, Collectors.toList()));
        return bySector.entrySet().stream().flatMap(Findings::fractionsMissing);
    }

    private static Stream<Finding> fractionsMissing(Map.Entry<String, List<Reported>> sector) {
        List<Integer> bare = sector.getValue().stream()
                .filter(r -> r.fraction() == null)
                .map(Reported::year)
                .sorted()
                .toList();
        boolean some = bare.size() < sector.getValue().size();
        return bare.isEmpty() || !some
                ? Stream.empty()
                : Stream.of(Finding.of("fractionsMissing", sector.getKey(), ranges(bare)));
    }

    static Stream<Finding> unusedStockings(Evidence evidence) {
        return evidence.events().stream()
                .filter(e -> e.kind().equals("stocking"))
                .filter(e -> e.recruitedTonnes() == null || e.recruitYear() == null)
                .map(e -> Finding.of("unusedStocking", e.key(), String.valueOf(e.year())));
    }

    static Stream<Finding> unknownKills(Evidence evidence) {
        return evidence.events().stream()
                .filter(e -> e.kind().equals("fish kill"))
                .filter(Findings::lossUnknown)
                .map(e -> Finding.of("unknownKill", e.key(), String.valueOf(e.year())));
    }

    private static boolean lossUnknown(EventRecord event) {
        return event.low() == null || event.likely() == null || event.high() == null;
    }

    /** "2003, 2006–2008" */
    static String ranges(Collection<Integer> sortedYears) {
        List<int[]> ranges = new ArrayList<>();
        for (int year : sortedYears) {
            int[] last = ranges.isEmpty() ? null : ranges.get(ranges.size() - 1);
            if (last != null && last[1] == year - 1) {
                last[1] = year;
            } else {
                ranges.add(new int[] {year, year});
            }
        }
        return ranges.stream()
                .map(r -> r[0] == r[1] ? String.valueOf(r[0]) : r[0] + "–" + r[1])
                .collect(Collectors.joining(", "));
    }
}
