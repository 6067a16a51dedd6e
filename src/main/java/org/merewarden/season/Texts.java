package org.merewarden.season;

import java.math.BigDecimal;
import java.net.URLEncoder;
import java.nio.charset.StandardCharsets;
import java.text.NumberFormat;
import java.util.Objects;
import java.util.Optional;
import java.util.regex.Pattern;
import org.jspecify.annotations.Nullable;
import org.springframework.context.i18n.LocaleContextHolder;

/** Small conversions between what is stored and what is typed or read in the log. */
final class Texts {
    private static final Pattern DECIMAL = Pattern.compile("\\d{1,12}([.,]\\d{1,6})?");
    private static final Pattern PERHAPS_THOUSANDS = Pattern.compile("[1-9]\\d{0,2},\\d{3}");

    private Texts() {}

    static String orEmpty(@Nullable String text) {
        return Objects.requireNonNullElse(text, "");
    }

    static @Nullable String orNull(String text) {
        return text.isBlank() ? null : text.trim();
    }

    /** A number as a form field takes it: "12.5", "12"; empty where unknown. */
    static String plain(@Nullable Double value) {
        return value == null
                ? ""
                : BigDecimal.valueOf(value).stripTrailingZeros().toPlainString();
    }

    /** Kilograms as logged, never rounded to three digits: a slip must be found again by its weight. */
    static String kg(double kilograms) {
        NumberFormat format = NumberFormat.getNumberInstance(LocaleContextHolder.getLocale());
        format.setMaximumFractionDigits(3);
        return format.format(kilograms) + "\u00a0kg";
    }

    /**
     * A number ≥ 0 with point or comma as its decimal mark; empty where it is neither, or where a comma may as well part
     * thousands (1,250).
     */
    static Optional<Double> decimal(String text) {
        String clean = text.trim();
        return DECIMAL.matcher(clean).matches()
                        && !PERHAPS_THOUSANDS.matcher(clean).matches()
                ? Optional.of(Double.valueOf(clean.replace(',', '.')))
                : Optional.empty();
    }

    static String encode(String text) {
        return URLEncoder.encode(text, StandardCharsets.UTF_8);
    }
}
