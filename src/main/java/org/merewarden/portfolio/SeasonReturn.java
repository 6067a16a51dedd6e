package org.merewarden.portfolio;

import java.time.LocalDate;
import java.util.Comparator;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.TreeMap;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.LimitView;

/**
 * A season's removals and limits, to be summed.
 *
 * @param ended whether the season is over
 * @param unplacedTonnes logged, but not of any stock: not split by species yet, or no stock of its water
 * @param lastLanding of what is logged; null where nothing is
 */
record SeasonReturn(
        int season,
        boolean ended,
        List<Removal> removals,
        List<Limited> limited,
        double unplacedTonnes,
        @Nullable LocalDate lastLanding) {
    private static final Comparator<String> NAMES =
            String.CASE_INSENSITIVE_ORDER.thenComparing(Comparator.naturalOrder());

    /**
     * A stock by where it counts.
     *
     * @param district empty where the register names none
     */
    record Place(long stock, String district, String species) {}

    /**
     * Of one stock and sector.
     *
     * @param tonnes as recorded or logged
     * @param correctedTonnes for the part that is not reported; null where it is not known yet
     * @param logged from the log, so far; else from the evidence
     */
    record Removal(
            Place place,
            String sector,
            double tonnes,
            @Nullable Double correctedTonnes,
            boolean logged) {}

    /**
     * A registered stock with its limit at the season's end, or before the closure that ended its season early.
     *
     * @param limit null where there is none
     * @param closedOn null where the stock was not closed early
     */
    record Limited(
            Place place,
            @Nullable LimitView limit,
            @Nullable LocalDate closedOn) {}

    /** Removals of some stocks. Corrected is null where it is unknown for one of them. */
    record Removed(int stocks, double tonnes, @Nullable Double correctedTonnes) {}

    /**
     * Limits of some stocks, of every kind; tonnes of the catch limits, null where there is none among them.
     *
     * @param closed days on which some of the stocks were closed early, in order
     */
    record Allowed(
            int stocks,
            int limits,
            @Nullable Double tonnes,
            @Nullable Double setAsides,
            @Nullable Double toBeLogged,
            List<LocalDate> closed) {
        int without() {
            return stocks - limits;
        }
    }

    /** What a line of removals is about. */
    record RemovalKey(String district, String species, String sector, boolean logged) {}

    /** What a line of limits is about. */
    record LimitKey(String district, String species) {}

    /** Nothing removed and no limit. */
    boolean empty() {
        return removals.isEmpty() && limited.stream().allMatch(l -> l.limit() == null) && unplacedTonnes == 0;
    }

    Map<RemovalKey, Removed> removalsByKey() {
        Comparator<RemovalKey> order = Comparator.comparing(RemovalKey::district, NAMES)
                .thenComparing(RemovalKey::species, NAMES)
                .thenComparing(RemovalKey::sector)
                .thenComparing(RemovalKey::logged);
        return grouped(
                removals,
                r -> new RemovalKey(r.place().district(), r.place().species(), r.sector(), r.logged()),
                order,
                SeasonReturn::removed);
    }

    Map<LimitKey, Allowed> limitsByKey() {
        Comparator<LimitKey> order =
                Comparator.comparing(LimitKey::district, NAMES).thenComparing(LimitKey::species, NAMES);
        return grouped(
                limited, l -> new LimitKey(l.place().district(), l.place().species()), order, SeasonReturn::allowed);
    }

    /** By district or species; every one with a registered stock. */
    Map<String, Removed> removedBy(Function<Place, String> part) {
        Map<String, Removed> sums = new TreeMap<>(NAMES);
        limited.forEach(l -> sums.put(part.apply(l.place()), removed(List.of())));
        sums.putAll(grouped(removals, r -> part.apply(r.place()), NAMES, SeasonReturn::removed));
        return sums;
    }

    Map<String, Allowed> allowedBy(Function<Place, String> part) {
        return grouped(limited, l -> part.apply(l.place()), NAMES, SeasonReturn::allowed);
    }

    Removed removed() {
        return removed(removals);
    }

    Allowed allowed() {
        return allowed(limited);
    }

    private static <T, K, S> Map<K, S> grouped(
            List<T> all, Function<T, K> key, Comparator<? super K> order, Function<List<T>, S> sum) {
        return all.stream()
                .collect(Collectors.groupingBy(
                        key, () -> new TreeMap<>(order), Collectors.collectingAndThen(Collectors.toList(), sum)));
    }

    private static Removed removed(List<Removal> some) {
        return new Removed(
                (int) some.stream().map(r -> r.place().stock()).distinct().count(),
                some.stream().mapToDouble(Removal::tonnes).sum(),
                some.stream().allMatch(r -> r.correctedTonnes() != null)
                        ? sum(some, Removal::correctedTonnes, 0.0)
                        : null);
    }

    private static Allowed allowed(List<Limited> some) {
        List<LimitView> limits =
                some.stream().map(Limited::limit).filter(Objects::nonNull).toList();
        List<LimitView> catches =
                limits.stream().filter(l -> l.amountTonnes() != null).toList();
        return new Allowed(
                some.size(),
                limits.size(),
                sum(catches, LimitView::amountTonnes, null),
                sum(catches, LimitView::setAsidesTonnes, null),
                sum(catches, LimitView::toBeLoggedTonnes, null),
                some.stream()
                        .map(Limited::closedOn)
                        .filter(Objects::nonNull)
                        .sorted()
                        .toList());
    }

    private static <T> @Nullable Double sum(
            List<T> some, Function<T, @Nullable Double> quantity, @Nullable Double ofNone) {
        return some.isEmpty()
                ? ofNone
                : (Double) some.stream()
                        .map(quantity)
                        .filter(Objects::nonNull)
                        .mapToDouble(Double::doubleValue)
                        .sum();
    }
}
