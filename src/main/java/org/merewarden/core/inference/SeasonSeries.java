package org.merewarden.core.inference;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Objects;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;

/**
 * Removals and events by season, without gaps, as the difference equation wants them.
 *
 * <p>Seasons run from the first with a recorded catch to the last closed one; without any catch there is none. Where
 * catches and closures ended more than {@link #LONGEST_TAIL} seasons before the last closed one, the series ends with
 * them, and the result speaks of that time. Rules, each of which leaves a sentence:
 *
 * <ul>
 *   <li>a closed season takes the closure's residual catch if it states one, else the recorded catch, else 0;
 *   <li>a missing catch between two known ones is interpolated in a straight line;
 *   <li>a missing catch after the last known one is held at that one;
 *   <li>a fish kill takes its likely fraction, else the middle of low and high, at the season's start; stocked fish
 *       arrive at the start of the season in which they recruit.
 * </ul>
 *
 * @param firstYear first season
 * @param removals t by season
 * @param stocked recruiting stocked fish, t by season
 * @param killed fraction lost to fish kills by season, in [0, 1)
 * @param notes sentences for the verdict
 * @param failure why no estimation may rest on this series; null when it may
 */
record SeasonSeries(
        int firstYear,
        double[] removals,
        double[] stocked,
        double[] killed,
        List<String> notes,
        @Nullable String failure) {

    static final int LONGEST_TAIL = 5;
    static final int MOST_SEASONS = 300;
    private static final double LARGEST_REMOVALS = 1e12;
    private static final double LARGEST_KILL = 0.99;

    int seasons() {
        return removals.length;
    }

    int lastYear() {
        return firstYear + removals.length - 1;
    }

    double largest() {
        return Arrays.stream(removals).max().orElse(0);
    }

    static SeasonSeries of(Evidence evidence, int lastClosedYear) {
        int first = evidence.catches().stream()
                .mapToInt(CatchRecord::year)
                .filter(y -> y <= lastClosedYear)
                .min()
                .orElse(lastClosedYear + 1);
        List<String> notes = new ArrayList<>();
        int last = last(evidence, first, lastClosedYear, notes);
        long length = (long) last - first + 1;
        if (length > MOST_SEASONS) {
            String failure = "Catches from " + first + " to " + last + " are more than " + MOST_SEASONS
                    + " seasons; a year may be mistyped.";
            return new SeasonSeries(first, new double[0], new double[0], new double[0], notes, failure);
        }
        int seasons = (int) length;
        double[] removals = new double[seasons];
        for (int t = 0; t < seasons; t++) {
            removals[t] = recorded(evidence, first + t);
        }
        fill(removals, first, notes);
        double[] stocked = new double[seasons];
        double[] killed = new double[seasons];
        for (EventRecord event : evidence.events()) {
            apply(event, first, stocked, killed, notes);
        }
        String failure = null;
        if (Arrays.stream(removals).anyMatch(c -> !(c <= LARGEST_REMOVALS))) {
            failure = "A season's estimated removals exceed " + String.format(Locale.ROOT, "%.0e", LARGEST_REMOVALS)
                    + " t; a catch or a reported fraction must be wrong.";
        }
        return new SeasonSeries(first, removals, stocked, killed, notes, failure);
    }

    /** The last season of the series; leaves a sentence where records ended long before the last closed season. */
    private static int last(Evidence evidence, int first, int lastClosedYear, List<String> notes) {
        int known = IntStream.concat(
                        evidence.catches().stream().mapToInt(CatchRecord::year),
                        evidence.events().stream()
                                .filter(e -> e.kind().equals("closure"))
                                .mapToInt(EventRecord::year))
                .filter(year -> first <= year && year <= lastClosedYear)
                .max()
                .orElse(lastClosedYear);
        if (lastClosedYear - known <= LONGEST_TAIL) {
            return lastClosedYear;
        }
        notes.add("Catches are recorded up to " + known + " only: all of this speaks of the start of " + (known + 1)
                + ", not of the present.");
        return known;
    }

    private static double recorded(Evidence evidence, int year) {
        double recorded = evidence.removals(year).orElse(Double.NaN);
        List<EventRecord> closures = evidence.events().stream()
                .filter(e -> e.year() == year && e.kind().equals("closure"))
                .toList();
        if (closures.isEmpty()) {
            return recorded;
        }
        return closures.stream()
                .map(EventRecord::likely)
                .filter(Objects::nonNull)
                .mapToDouble(v -> Math.max(0, v))
                .max()
                .orElse(Double.isNaN(recorded) ? 0 : recorded);
    }

    private static void fill(double[] removals, int first, List<String> notes) {
        List<String> between = new ArrayList<>();
        int known = 0;
        for (int t = 1; t < removals.length; t++) {
            if (Double.isNaN(removals[t])) {
                continue;
            }
            for (int gap = known + 1; gap < t; gap++) {
                double weight = (double) (gap - known) / (t - known);
                removals[gap] = (1 - weight) * removals[known] + weight * removals[t];
                between.add(Integer.toString(first + gap));
            }
            known = t;
        }
        if (!between.isEmpty()) {
            notes.add("No catch was recorded for " + String.join(", ", between)
                    + "; a straight line between the neighbouring seasons stands in.");
        }
        int tail = removals.length - 1 - known;
        if (tail > 0) {
            Arrays.fill(removals, known + 1, removals.length, removals[known]);
            notes.add("No catch was recorded after " + (first + known) + "; its removals are held for " + tail
                    + (tail == 1 ? " season." : " seasons."));
        }
    }

    private static void apply(EventRecord event, int first, double[] stocked, double[] killed, List<String> notes) {
        if (event.kind().equals("fish kill") && within(event.year() - first, killed)) {
            int t = event.year() - first;
            double fraction = Math.max(0, Math.min(LARGEST_KILL, killFraction(event)));
            killed[t] = 1 - (1 - killed[t]) * (1 - fraction);
            notes.add(String.format(
                    Locale.ROOT, "A fish kill takes %.0f %% at the start of %d.", 100 * fraction, event.year()));
        }
        Double recruits = event.recruitedTonnes();
        if (event.kind().equals("stocking") && recruits != null) {
            int year = event.recruitYear() == null ? event.year() : event.recruitYear();
            if (within(year - first, stocked) && recruits > 0 && recruits <= LARGEST_REMOVALS) {
                stocked[year - first] += recruits;
            }
        }
    }

    private static boolean within(int t, double[] array) {
        return t >= 0 && t < array.length;
    }

    private static double killFraction(EventRecord event) {
        if (event.likely() != null) {
            return event.likely();
        }
        double low = event.low() == null ? 0 : event.low();
        double high = event.high() == null ? low : event.high();
        return 0.5 * (low + high);
    }
}
