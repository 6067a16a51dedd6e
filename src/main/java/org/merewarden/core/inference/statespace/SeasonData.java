package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Set;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.AreaRecord;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;

/**
 * One stock's evidence in arrays by season t = 0 … T − 1, the last one closed; tonnes in units of the prior median of
 * MSY and indices relative to their series' mean, so that nothing depends on units.
 *
 * <p>Season 0 is the first with a catch, an effort or a survey; without any, T = 0. At most {@value #MOST_SEASONS}. Where
 * records (a closure counts as one) ended more than {@value #LONGEST_TAIL} seasons before the last closed season, the data
 * end with them, and a sentence says so.
 *
 * @param firstYear year of season 0
 * @param seasons T
 * @param unitTonnes t per unit
 * @param removals what was taken
 * @param stocked recruiting stocked fish at the season's start, units
 * @param logSurvival ln(1 − m), m the fraction lost to fish kills at the season's start
 * @param killVariance variance of ln(1 − m), first order, from the stated range taken as its middle 90 %
 * @param logArea [T + 1]: ln(K_t/K), the lake's area in the season over the register's
 * @param observations surveys and effort
 * @param series index and effort series
 * @param notes sentences on what was left out
 * @param failure why nothing can be estimated; null when it can
 */
record SeasonData(
        int firstYear,
        int seasons,
        double unitTonnes,
        Removals removals,
        double[] stocked,
        double[] logSurvival,
        double[] killVariance,
        double[] logArea,
        Observations observations,
        List<Series> series,
        List<String> notes,
        @Nullable String failure) {

    static final int MOST_SEASONS = 300;
    static final int LONGEST_TAIL = 5;
    private static final double LARGEST_KILL = 0.99;
    private static final double LARGEST_TONNES = 1e12;

    static SeasonData of(Evidence evidence, int lastClosedYear, ModelPriors priors) {
        int[] years = Stream.of(
                        evidence.catches().stream().map(CatchRecord::year),
                        evidence.effort().stream().map(EffortRecord::year),
                        evidence.surveys().stream().map(SurveyRecord::year))
                .flatMap(s -> s)
                .mapToInt(Integer::intValue)
                .filter(year -> year <= lastClosedYear)
                .toArray();
        int first = IntStream.of(years).min().orElse(lastClosedYear + 1);
        List<String> notes = new ArrayList<>();
        int last = last(evidence, years, lastClosedYear, notes);
        long length = (long) last - first + 1;
        String failure = length > MOST_SEASONS
                ? "Records from " + first + " to " + last + " span more than " + MOST_SEASONS
                        + " seasons; a year may be mistyped."
                : tooLarge(evidence);
        return build(evidence, first, failure == null ? (int) length : 0, priors, notes, failure);
    }

    private static int last(Evidence evidence, int[] years, int lastClosedYear, List<String> notes) {
        int first = IntStream.of(years).min().orElse(lastClosedYear);
        IntStream closures = evidence.events().stream()
                .filter(e -> e.kind().equals("closure"))
                .mapToInt(EventRecord::year);
        int known = IntStream.concat(IntStream.of(years), closures)
                .filter(year -> first <= year && year <= lastClosedYear)
                .max()
                .orElse(lastClosedYear);
        if ((long) lastClosedYear - known <= LONGEST_TAIL) {
            return lastClosedYear;
        }
        notes.add("Records end with " + known + ": all of this speaks of the start of " + (known + 1)
                + ", not of the present.");
        return known;
    }

    private static @Nullable String tooLarge(Evidence evidence) {
        boolean large = evidence.catches().stream().anyMatch(c -> !(c.removalsTonnes() <= LARGEST_TONNES))
                || evidence.surveys().stream().anyMatch(s -> s.absoluteBiomass() && !(s.value() <= LARGEST_TONNES));
        return large ? "A catch or biomass exceeds 1e12 t; it or its reported fraction must be wrong." : null;
    }

    private static SeasonData build(
            Evidence evidence,
            int first,
            int seasons,
            ModelPriors priors,
            List<String> notes,
            @Nullable String failure) {
        double unit = priors.msy().median();
        SurveysAndEffort values = new SurveysAndEffort(evidence, first, seasons, unit, priors, notes);
        SeasonData data = new SeasonData(
                first,
                seasons,
                unit,
                Removals.of(evidence, first, seasons, unit),
                new double[seasons],
                new double[seasons],
                new double[seasons],
                new double[seasons + 1],
                Observations.pack(values.points(), seasons),
                values.series(),
                notes,
                failure);
        evidence.events().forEach(data::apply);
        evidence.areas().forEach(area -> data.apply(area, evidence.habitat().areaHectares()));
        data.noteMissing();
        return data;
    }

    private void apply(AreaRecord area, double registered) {
        int t = area.year() - firstYear;
        if (t >= 0 && t <= seasons) {
            logArea[t] = Math.log(area.areaHectares() / registered);
        }
    }

    private void apply(EventRecord event) {
        int t = event.year() - firstYear;
        if (event.kind().equals("fish kill") && t >= 0 && t < seasons) {
            kill(event, t);
        }
        Double recruits = event.recruitedTonnes();
        if (event.kind().equals("stocking") && recruits != null && recruits > 0 && recruits <= LARGEST_TONNES) {
            Integer recruitYear = event.recruitYear();
            int into = (recruitYear == null ? event.year() : recruitYear) - firstYear;
            if (into >= 0 && into < seasons) {
                stocked[into] += recruits / unitTonnes;
            }
        }
    }

    private void kill(EventRecord event, int t) {
        double low = fraction(event.low(), 0);
        double high = fraction(event.high(), fraction(event.likely(), low));
        double likely = fraction(event.likely(), 0.5 * (low + high));
        double sd = event.low() == null || event.high() == null ? 0 : Math.max(0, high - low) / (2 * 1.645);
        logSurvival[t] += Math.log1p(-likely);
        killVariance[t] += Math.pow(sd / (1 - likely), 2);
    }

    private static double fraction(@Nullable Double stated, double otherwise) {
        return stated == null || stated.isNaN() ? otherwise : Math.max(0, Math.min(LARGEST_KILL, stated));
    }

    private void noteMissing() {
        List<String> missing = IntStream.range(0, seasons)
                .filter(t -> Double.isNaN(removals.logCatch()[t]) && !removals.closed()[t])
                .mapToObj(t -> Integer.toString(firstYear + t))
                .toList();
        if (!missing.isEmpty()) {
            notes.add("No catch is recorded for " + String.join(", ", missing)
                    + "; the harvest there is inferred from its neighbours.");
        }
    }

    /** The same seasons without some values and, where {@code gone} is not negative, that index or effort series. */
    SeasonData without(Set<Integer> values, int gone) {
        List<Series> kept = new ArrayList<>(series);
        if (gone >= 0) {
            kept.remove(gone);
        }
        return new SeasonData(
                firstYear,
                seasons,
                unitTonnes,
                removals,
                stocked,
                logSurvival,
                killVariance,
                logArea,
                observations.without(values, gone),
                kept,
                notes,
                failure);
    }

    /** Whether a season has an index or biomass value, one below detection included. */
    boolean seen(int t) {
        return IntStream.range(observations.firstOf()[t], observations.firstOf()[t + 1])
                .anyMatch(i -> observations.kind()[i] != Observations.EFFORT);
    }

    /** Number of seasons {@link #seen}. */
    int seasonsSeen() {
        return (int) IntStream.range(0, seasons).filter(this::seen).count();
    }

    /** Whether any season has a catch above 0. */
    boolean hasCatch() {
        return Arrays.stream(removals.logCatch()).anyMatch(c -> !Double.isNaN(c));
    }
}
