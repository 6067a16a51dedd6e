package org.merewarden.core.evidence;

import java.util.Comparator;
import java.util.List;
import java.util.OptionalDouble;
import java.util.stream.IntStream;
import java.util.stream.Stream;

/**
 * Everything an assessment of one stock reads: one immutable version of its records.
 *
 * <p>Lists are kept in canonical order, so two versions with the same records are equal and share a
 * {@link #contentHash() content hash}, whatever the order in which the records were entered.
 *
 * @param habitat the lake
 * @param traits the stock's life history and standing knowledge
 * @param catches removals as reported, by season and sector
 * @param effort effort by season and series
 * @param surveys indices and absolute biomass, by season, series and time of the season
 * @param events stockings, fish kills and closures
 * @param areas the lake's area in seasons in which it differed from the register's
 * @param priors statements of the office that override the default priors
 */
public record Evidence(
        Habitat habitat,
        Traits traits,
        List<CatchRecord> catches,
        List<EffortRecord> effort,
        List<SurveyRecord> surveys,
        List<EventRecord> events,
        List<AreaRecord> areas,
        List<PriorRecord> priors) {

    public Evidence {
        catches = sorted(catches, Comparator.comparingInt(CatchRecord::year).thenComparing(CatchRecord::sector));
        effort = sorted(effort, Comparator.comparing(EffortRecord::series).thenComparingInt(EffortRecord::year));
        surveys = sorted(
                surveys,
                Comparator.comparing(SurveyRecord::series)
                        .thenComparingInt(SurveyRecord::year)
                        .thenComparingDouble(SurveyRecord::timeOfYear));
        events = sorted(events, Comparator.comparingInt(EventRecord::year).thenComparing(EventRecord::key));
        areas = sorted(areas, Comparator.comparingInt(AreaRecord::year));
        priors = sorted(priors, Comparator.comparing(PriorRecord::parameter).thenComparing(PriorRecord::series));
    }

    private static <T> List<T> sorted(List<T> records, Comparator<T> order) {
        return records.stream().sorted(order).toList();
    }

    /** Seasons with a catch, an effort or a survey, first to last without gaps; empty when there is none. */
    public List<Integer> seasons() {
        int[] years = Stream.of(
                        catches.stream().map(CatchRecord::year),
                        effort.stream().map(EffortRecord::year),
                        surveys.stream().map(SurveyRecord::year))
                .flatMap(s -> s)
                .mapToInt(Integer::intValue)
                .toArray();
        if (years.length == 0) {
            return List.of();
        }
        int first = IntStream.of(years).min().getAsInt();
        int last = IntStream.of(years).max().getAsInt();
        return IntStream.rangeClosed(first, last).boxed().toList();
    }

    /** Estimated removals of a season in t: Σ catch / reported fraction; empty when no sector reported. */
    public OptionalDouble removals(int year) {
        return catches.stream().anyMatch(c -> c.year() == year)
                ? OptionalDouble.of(catches.stream()
                        .filter(c -> c.year() == year)
                        .mapToDouble(CatchRecord::removalsTonnes)
                        .sum())
                : OptionalDouble.empty();
    }

    /** The relative-index surveys, without absolute biomass. */
    public List<SurveyRecord> indices() {
        return surveys.stream().filter(s -> !s.absoluteBiomass()).toList();
    }

    /** SHA-256 over the canonical text of all records, 64 lower-case hexadecimal digits. */
    public String contentHash() {
        return ContentHash.of(this);
    }

    /** The first 15 hexadecimal digits of the content hash: seeded with it, the same evidence gives the same draws. */
    public long seed() {
        return Long.parseLong(contentHash().substring(0, 15), 16);
    }
}
