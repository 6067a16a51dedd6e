package org.merewarden.intake;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * One column of a table of the import formats.
 *
 * @param name lower case with underscores, unit at the end
 * @param key part of the row's key
 * @param required may not be empty (a key column with a default may)
 * @param defaultValue text that stands for an empty cell; null: empty means unknown
 * @param min smallest number allowed, −∞ without a bound
 * @param max greatest number allowed, +∞ without a bound; for TEXT and CODE the most characters
 * @param choices allowed words; empty: any
 * @param description one sentence for the template and the Table Schema
 */
public record Column(
        String name,
        Kind kind,
        boolean key,
        boolean required,
        @Nullable String defaultValue,
        double min,
        double max,
        List<String> choices,
        String description) {

    /** How the cell is read: TEXT and CODE as String, NUMBER as Double, INTEGER and YEAR as Integer, DATE as LocalDate. */
    public enum Kind {
        TEXT,
        CODE,
        NUMBER,
        INTEGER,
        YEAR,
        DATE
    }

    /** Up to 2,000 characters unless {@link #atMost} says otherwise. */
    public static Column text(String name, String description) {
        return of(name, Kind.TEXT, description).atMost(2000);
    }

    /** A code of up to 100 characters unless {@link #atMost} says otherwise: trimmed, without spaces; case is kept. */
    public static Column code(String name, String description) {
        return of(name, Kind.CODE, description).atMost(100);
    }

    public static Column number(String name, String description) {
        return of(name, Kind.NUMBER, description);
    }

    public static Column integer(String name, String description) {
        return of(name, Kind.INTEGER, description);
    }

    /** A season's year, 1800–2200. */
    public static Column year(String name, String description) {
        return of(name, Kind.YEAR, description).between(1800, 2200);
    }

    public static Column date(String name, String description) {
        return of(name, Kind.DATE, description);
    }

    private static Column of(String name, Kind kind, String description) {
        return new Column(
                name,
                kind,
                false,
                false,
                null,
                Double.NEGATIVE_INFINITY,
                Double.POSITIVE_INFINITY,
                List.of(),
                description);
    }

    /** Part of the key, and therefore required. */
    public Column asKey() {
        return new Column(name, kind, true, true, defaultValue, min, max, choices, description);
    }

    public Column mandatory() {
        return new Column(name, kind, key, true, defaultValue, min, max, choices, description);
    }

    public Column orElse(String value) {
        return new Column(name, kind, key, required, value, min, max, choices, description);
    }

    public Column between(double least, double greatest) {
        return new Column(name, kind, key, required, defaultValue, least, greatest, choices, description);
    }

    /** The most characters of a text or code: what the store's column holds. */
    public Column atMost(int characters) {
        return between(0, characters);
    }

    public Column oneOf(String... words) {
        return new Column(name, kind, key, required, defaultValue, min, max, List.of(words), description);
    }
}
