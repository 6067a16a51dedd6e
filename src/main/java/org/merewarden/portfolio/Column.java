package org.merewarden.portfolio;

import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;

/** A sortable column of the portfolio. Missing values come last in either direction; ties keep the default order. */
enum Column {
    WATER(e -> e.stock().lakeName().toLowerCase(Locale.ROOT), false),
    SPECIES(e -> e.stock().speciesName().toLowerCase(Locale.ROOT), false),
    STANDING(Column::severity, false),
    MARGIN(Entry::margin, true),
    MSY(Entry::msyTonnes, true),
    YIELD(Entry::msyKgPerHectare, true),
    BIOMASS(Entry::biomassOverBmsy, true),
    LIMIT(Entry::limitTonnes, true),
    TAKEN(Entry::takenTonnes, true),
    EVIDENCE(Column::strength, false),
    ASSESSED(e -> e.assessment() == null ? null : e.assessment().madeAt(), false);

    private static final List<String> WORST_FIRST = List.of("critical", "strained", "watch", "secure");
    private static final List<String> STRONGEST_FIRST = List.of("STRONG", "FAIR", "THIN", "NONE");

    private final Comparator<Entry> ascending;
    private final Comparator<Entry> descending;
    private final boolean number;

    <K extends Comparable<? super K>> Column(Function<Entry, @Nullable K> key, boolean number) {
        this.number = number;
        ascending = Comparator.comparing(key, Comparator.nullsLast(Comparator.naturalOrder()));
        descending = Comparator.comparing(key, Comparator.nullsLast(Comparator.reverseOrder()));
    }

    /** Its name in addresses and texts. */
    String key() {
        return name().toLowerCase(Locale.ROOT);
    }

    boolean number() {
        return number;
    }

    /** By this column, then worst standing, least margin, lake and species. */
    Comparator<Entry> order(boolean descend) {
        return (descend ? descending : ascending)
                .thenComparing(STANDING.ascending)
                .thenComparing(MARGIN.ascending)
                .thenComparing(WATER.ascending)
                .thenComparing(SPECIES.ascending);
    }

    static Optional<Column> of(@Nullable String key) {
        return Stream.of(values()).filter(c -> c.key().equals(key)).findFirst();
    }

    private static @Nullable Integer severity(Entry entry) {
        int rank = WORST_FIRST.indexOf(entry.standingCode());
        return rank < 0 ? null : rank;
    }

    private static @Nullable Integer strength(Entry entry) {
        return entry.assessment() == null
                ? null
                : STRONGEST_FIRST.indexOf(entry.assessment().strength());
    }
}
