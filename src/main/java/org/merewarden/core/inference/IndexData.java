package org.merewarden.core.inference;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;

/**
 * The observations that the observation-error fit explains, as parallel arrays.
 *
 * <p>Relative indices come from the surveys. Only where no survey series is left, catch per unit of effort stands in:
 * removals over effort, at mid-season. Absolute biomass is an observation with catchability 1. Left out, each with a
 * sentence: values of 0 (below detection has no logarithm), series with one value (its catchability takes it up), and
 * surveys outside the assessed seasons.
 *
 * @param season index of the season
 * @param timeOfYear 0 start … 1 end
 * @param logValue ln of the value
 * @param series number of the series; −1 for absolute biomass
 * @param seriesNames by number
 * @param notes sentences for the verdict
 */
record IndexData(
        int[] season,
        double[] timeOfYear,
        double[] logValue,
        int[] series,
        List<String> seriesNames,
        List<String> notes) {

    private record Point(int season, double timeOfYear, double value) {}

    int count() {
        return season.length;
    }

    /** Number of seasons with at least one observation. */
    int seasonsSeen() {
        return (int) Arrays.stream(season).distinct().count();
    }

    static IndexData of(Evidence evidence, SeasonSeries seasons) {
        List<String> notes = new ArrayList<>();
        Map<String, List<Point>> relative = new TreeMap<>();
        List<Point> absolute = new ArrayList<>();
        sortSurveys(evidence, seasons, relative, absolute, notes);
        dropSingles(relative, notes);
        boolean fromEffort = relative.isEmpty();
        if (fromEffort) {
            relative.putAll(catchPerEffort(evidence, seasons));
            dropSingles(relative, notes);
            fromEffort = !relative.isEmpty();
        }
        if (fromEffort) {
            notes.add("No survey index: catch per unit of effort (" + String.join(", ", relative.keySet())
                    + ") stands in for it; it can stay high while the stock falls.");
        }
        if (!absolute.isEmpty()) {
            notes.add("Absolute biomass (" + absolute.size() + (absolute.size() == 1 ? " value" : " values")
                    + ") is fitted with the same scatter as an index.");
        }
        return pack(relative, absolute, notes);
    }

    private static void sortSurveys(
            Evidence evidence,
            SeasonSeries seasons,
            Map<String, List<Point>> relative,
            List<Point> absolute,
            List<String> notes) {
        int zero = 0;
        int outside = 0;
        for (SurveyRecord survey : evidence.surveys()) {
            int t = survey.year() - seasons.firstYear();
            if (survey.year() > seasons.lastYear()) {
                continue;
            }
            if (t < 0) {
                outside++;
            } else if (survey.value() == 0) {
                zero++;
            } else {
                Point point = new Point(t, survey.timeOfYear(), survey.value());
                (survey.absoluteBiomass()
                                ? absolute
                                : relative.computeIfAbsent(survey.series(), s -> new ArrayList<>()))
                        .add(point);
            }
        }
        if (zero > 0) {
            notes.add(zero + (zero == 1 ? " survey value of 0 is" : " survey values of 0 are")
                    + " left out: below detection says how little was caught, not how little is there.");
        }
        if (outside > 0) {
            notes.add(outside + (outside == 1 ? " survey value is" : " survey values are")
                    + " left out: before the first recorded catch.");
        }
    }

    /** Whether any value is of absolute biomass. */
    boolean hasBiomass() {
        return Arrays.stream(series).anyMatch(number -> number < 0);
    }

    private static void dropSingles(Map<String, List<Point>> relative, List<String> notes) {
        relative.entrySet().removeIf(entry -> {
            boolean single = entry.getValue().size() < 2;
            if (single) {
                notes.add("Series " + entry.getKey() + " is left out: a single value says nothing about change.");
            }
            return single;
        });
    }

    private static Map<String, List<Point>> catchPerEffort(Evidence evidence, SeasonSeries seasons) {
        Map<String, List<Point>> result = new TreeMap<>();
        for (EffortRecord record : evidence.effort()) {
            int t = record.year() - seasons.firstYear();
            double removals = evidence.removals(record.year()).orElse(0);
            double perUnit = removals / record.effort();
            if (t >= 0 && t < seasons.seasons() && perUnit > 0 && Double.isFinite(perUnit)) {
                result.computeIfAbsent(record.series(), s -> new ArrayList<>()).add(new Point(t, 0.5, perUnit));
            }
        }
        return result;
    }

    private static IndexData pack(Map<String, List<Point>> relative, List<Point> absolute, List<String> notes) {
        int count = absolute.size()
                + relative.values().stream().mapToInt(List::size).sum();
        IndexData data = new IndexData(
                new int[count],
                new double[count],
                new double[count],
                new int[count],
                List.copyOf(relative.keySet()),
                notes);
        int i = 0;
        int series = 0;
        for (List<Point> points : relative.values()) {
            i = data.put(points, series++, i);
        }
        data.put(absolute, -1, i);
        return data;
    }

    private int put(List<Point> points, int number, int from) {
        int i = from;
        for (Point point : points) {
            season[i] = point.season();
            timeOfYear[i] = point.timeOfYear();
            logValue[i] = Math.log(point.value());
            series[i++] = number;
        }
        return i;
    }
}
