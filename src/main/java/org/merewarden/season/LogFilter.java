package org.merewarden.season;

import java.time.LocalDate;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.springframework.format.annotation.DateTimeFormat;
import org.springframework.format.annotation.DateTimeFormat.ISO;

/** Which part of the log is shown; it stands in the address. Empty texts and nulls do not narrow it. */
record LogFilter(
        @Nullable String lake,
        @Nullable String species,
        @Nullable String cooperative,
        @DateTimeFormat(iso = ISO.DATE) @Nullable LocalDate from,
        @DateTimeFormat(iso = ISO.DATE) @Nullable LocalDate to,
        @Nullable Integer page) {
    int pageNumber() {
        return page == null || page < 1 ? 1 : page;
    }

    /** Conditions on the rows of {@link LandingStore#SELECT}, with their values. */
    Map<String, Object> values() {
        Map<String, Object> values = new LinkedHashMap<>();
        put(values, "w.code = :lake", lake);
        int dot = species == null ? -1 : species.indexOf('.');
        put(values, "l.species = :species", species == null || dot < 0 ? species : species.substring(0, dot));
        put(values, "l.population = :population", species == null || dot < 0 ? null : species.substring(dot + 1));
        put(values, "c.code = :cooperative", cooperative);
        put(values, "l.landed_on >= :from", from);
        put(values, "l.landed_on <= :to", to);
        return values;
    }

    private static void put(Map<String, Object> values, String condition, @Nullable Object value) {
        if (value != null && !value.toString().isBlank()) {
            values.put(condition, value);
        }
    }

    /** The filter as the query part of an address, without the page; empty or starting with {@code &}. */
    String query() {
        return values().isEmpty()
                ? ""
                : "&"
                        + java.util.stream.Stream.of(
                                        part("lake", lake),
                                        part("species", species),
                                        part("cooperative", cooperative),
                                        part("from", from),
                                        part("to", to))
                                .filter(p -> !p.isEmpty())
                                .collect(Collectors.joining("&"));
    }

    private static String part(String name, @Nullable Object value) {
        return value == null || value.toString().isBlank() ? "" : name + "=" + Texts.encode(value.toString());
    }
}
