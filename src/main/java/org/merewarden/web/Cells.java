package org.merewarden.web;

import java.math.BigDecimal;
import java.util.Map;
import java.util.Objects;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;

/** A stored row as column names and values, told in plain text without rounding: for import remarks and edit history. */
public final class Cells {
    private static final String UNKNOWN = "unknown";

    private Cells() {}

    /** The value in full with a decimal point; null is "unknown". */
    public static String text(@Nullable Object value) {
        if (value == null) {
            return UNKNOWN;
        }
        return value instanceof Double number && Double.isFinite(number) ? plain(number) : value.toString();
    }

    /** The number in full, without trailing zeros or exponent. */
    public static String plain(double number) {
        BigDecimal stripped = BigDecimal.valueOf(number).stripTrailingZeros();
        return stripped.signum() == 0 ? "0" : stripped.toPlainString();
    }

    /** What differs, e.g. "catch_t 12.4 → 12.9; source unknown → ledger"; empty where nothing does. */
    public static String changes(
            Map<String, ? extends @Nullable Object> before, Map<String, ? extends @Nullable Object> after) {
        return after.entrySet().stream()
                .filter(a -> !Objects.equals(before.get(a.getKey()), a.getValue()))
                .map(a -> a.getKey() + " " + text(before.get(a.getKey())) + " → " + text(a.getValue()))
                .collect(Collectors.joining("; "));
    }

    /** What is known, e.g. "name Skelder Water; area_ha 4200". */
    public static String describe(Map<String, ? extends @Nullable Object> cells) {
        return cells.entrySet().stream()
                .filter(c -> c.getValue() != null && !"".equals(c.getValue()))
                .map(c -> c.getKey() + " " + text(c.getValue()))
                .collect(Collectors.joining("; "));
    }
}
