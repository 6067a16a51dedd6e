package org.merewarden.web;

import java.math.BigDecimal;
import java.math.MathContext;
import java.math.RoundingMode;
import java.text.NumberFormat;
import java.time.Instant;
import java.time.LocalDate;
import java.time.ZoneId;
import java.time.format.DateTimeFormatter;
import java.time.format.FormatStyle;
import java.util.Locale;
import java.util.ResourceBundle;
import org.jspecify.annotations.Nullable;
import org.springframework.context.i18n.LocaleContextHolder;

/**
 * Numbers and dates as people read them, in the reader's language. What is not known (null, not a number) is a dash.
 * Called by controllers and services, never by templates: a call per cell in a template costs most of the page.
 */
public final class Figures {
    /** What stands where a number is not known. */
    public static final String UNKNOWN = "—";

    private static final MathContext THREE_DIGITS = new MathContext(3, RoundingMode.HALF_EVEN);
    private static final int LEAST_EXPONENT = -4;
    private static final char NO_BREAK_SPACE = '\u00a0';

    private Figures() {}

    /** Three significant digits, no trailing zeros: 12.4, 1,230, 0.0457, 2.31 × 10⁻⁵. */
    public static String sig(@Nullable Double value) {
        if (value == null || !Double.isFinite(value)) {
            return UNKNOWN;
        }
        return written(new BigDecimal(value).round(THREE_DIGITS));
    }

    /** All digits, thousands apart; under 1e-4 as a power of ten, since nobody counts so many zeros. */
    private static String written(BigDecimal rounded) {
        BigDecimal digits = rounded.stripTrailingZeros();
        int exponent = digits.precision() - digits.scale() - 1;
        boolean tiny = digits.signum() != 0 && exponent < LEAST_EXPONENT;
        BigDecimal shown = tiny ? digits.movePointLeft(exponent) : digits;
        NumberFormat format = NumberFormat.getNumberInstance(locale());
        format.setMaximumFractionDigits(Math.max(0, shown.scale()));
        String text = format.format(shown);
        return tiny ? text + NO_BREAK_SPACE + "×" + NO_BREAK_SPACE + "10⁻" + raised(-exponent) : text;
    }

    private static String raised(int number) {
        StringBuilder text = new StringBuilder();
        Integer.toString(number).chars().forEach(c -> text.append("⁰¹²³⁴⁵⁶⁷⁸⁹".charAt(c - '0')));
        return text.toString();
    }

    /** So many significant digits without trailing zeros, for results that are compared with published ones. */
    public static String digits(@Nullable Double value, int digits) {
        return value == null || !Double.isFinite(value)
                ? UNKNOWN
                : written(new BigDecimal(value).round(new MathContext(digits, RoundingMode.HALF_EVEN)));
    }

    /** Tonnes with their unit: "12.4 t". */
    public static String tonnes(@Nullable Double tonnes) {
        return withUnit(tonnes, "t");
    }

    /** A decided or recommended amount of tonnes, which is no estimate: to the kilogram, with its unit. */
    public static String decided(@Nullable Double tonnes) {
        return decided(tonnes, "t");
    }

    /** A decided amount in any unit, to three decimals; {@link #decidedFigure} with the unit, kept on one line. */
    public static String decided(@Nullable Double amount, String unit) {
        String figure = decidedFigure(amount);
        return figure.equals(UNKNOWN) ? UNKNOWN : figure + NO_BREAK_SPACE + unit;
    }

    /** A decided amount without its unit, for columns that name it. */
    public static String decidedFigure(@Nullable Double amount) {
        if (amount == null || !Double.isFinite(amount)) {
            return UNKNOWN;
        }
        NumberFormat format = NumberFormat.getNumberInstance(locale());
        format.setMaximumFractionDigits(3);
        return format.format(amount);
    }

    /** All digits of a whole number with its unit: "12,345 kg". */
    public static String whole(long count, String unit) {
        return NumberFormat.getIntegerInstance(locale()).format(count) + NO_BREAK_SPACE + unit;
    }

    /** Three significant digits and the unit, kept on one line. */
    public static String withUnit(@Nullable Double value, String unit) {
        String figure = sig(value);
        return figure.equals(UNKNOWN) ? UNKNOWN : figure + NO_BREAK_SPACE + unit;
    }

    /** "12.4 (8.1–19)"; without the bracket where the interval is not known. */
    public static String interval(@Nullable Double mid, @Nullable Double low, @Nullable Double high) {
        String middle = sig(mid);
        if (middle.equals(UNKNOWN) || sig(low).equals(UNKNOWN) || sig(high).equals(UNKNOWN)) {
            return middle;
        }
        return middle + " (" + sig(low) + "–" + sig(high) + ")";
    }

    /** A share as whole per cent; never "0%" or "100%" unless it is exactly that. */
    public static String percent(@Nullable Double share) {
        if (share == null || !Double.isFinite(share)) {
            return UNKNOWN;
        }
        NumberFormat format = NumberFormat.getPercentInstance(locale());
        format.setRoundingMode(RoundingMode.HALF_EVEN);
        if (share > 0 && share < 0.005) {
            return "<" + format.format(0.01);
        }
        if (share < 1 && share > 0.995) {
            return ">" + format.format(0.99);
        }
        // no minus sign before a zero
        return format.format(share <= 0 && share > -0.005 ? 0.0 : share);
    }

    /** A share that was set and not estimated: per cent with up to two decimals, "7.5%", "10%". */
    public static String setPercent(@Nullable Double share) {
        return share == null || !Double.isFinite(share) ? UNKNOWN : percent(share, 2, RoundingMode.HALF_EVEN);
    }

    /**
     * A chance beside a bound that was set: as {@link #percent}, but never rounded to the other side of the bound. What is
     * above it then has one decimal, rounded up, and what is not has up to two.
     *
     * @param bound with at most two decimals of a per cent
     */
    public static String percentBeside(@Nullable Double chance, double bound) {
        if (chance == null || !Double.isFinite(chance) || chance == bound) {
            return chance == null ? UNKNOWN : setPercent(chance);
        }
        boolean above = chance > bound;
        boolean roundedAbove = Math.rint(100 * chance) / 100 > bound + 1e-12;
        if (above == roundedAbove) {
            return percent(chance);
        }
        return above ? percent(chance, 1, RoundingMode.CEILING) : setPercent(chance);
    }

    private static String percent(double share, int decimals, RoundingMode rounding) {
        NumberFormat format = NumberFormat.getPercentInstance(locale());
        format.setMaximumFractionDigits(decimals);
        return format.format(BigDecimal.valueOf(share).setScale(decimals + 2, rounding));
    }

    /** A probability in natural frequencies: "about 1 of 6 cases". */
    public static String chances(@Nullable Double probability) {
        if (probability == null || !(probability >= 0 && probability <= 1)) {
            return UNKNOWN;
        }
        if (probability == 0 || probability == 1) {
            return word(probability == 0 ? "chances.none" : "chances.all");
        }
        if (probability < 0.001 || probability > 0.999) {
            return word(probability < 0.5 ? "chances.hardly" : "chances.nearly");
        }
        int[] fraction = fraction(probability);
        return String.format(locale(), word("chances.about"), fraction[0], fraction[1]);
    }

    /**
     * A fraction that people can picture: between a tenth and nine tenths the smallest denominator up to ten that comes
     * within two points and within a tenth of the rarer side, else one (or all but one) of so many.
     */
    private static int[] fraction(double p) {
        if (p < 0.1 || p > 0.9) {
            int of = round(1 / Math.min(p, 1 - p));
            return new int[] {p < 0.5 ? 1 : of - 1, of};
        }
        double near = Math.min(0.02, 0.1 * Math.min(p, 1 - p));
        int[] best = {1, 2};
        for (int of = 2; of <= 10; of++) {
            int part = (int) Math.max(1, Math.min(of - 1, Math.rint(p * of)));
            if (error(p, part, of) < error(p, best[0], best[1]) - 1e-12) {
                best = new int[] {part, of};
            }
            if (error(p, best[0], best[1]) <= near) {
                return best;
            }
        }
        return best;
    }

    private static double error(double p, int part, int of) {
        return Math.abs(p - (double) part / of);
    }

    /** Two significant digits, for "1 of so many". */
    private static int round(double count) {
        return new BigDecimal(count)
                .round(new MathContext(2, RoundingMode.HALF_EVEN))
                .intValue();
    }

    /** A day: "3 Sept 2026". */
    public static String date(@Nullable LocalDate date) {
        return date == null
                ? UNKNOWN
                : DateTimeFormatter.ofLocalizedDate(FormatStyle.MEDIUM)
                        .withLocale(locale())
                        .format(date);
    }

    /** A moment in the office's time zone (inside a request; elsewhere the machine's). */
    public static String dateTime(@Nullable Instant instant) {
        ZoneId zone = LocaleContextHolder.getTimeZone().toZoneId();
        return instant == null
                ? UNKNOWN
                : DateTimeFormatter.ofLocalizedDateTime(FormatStyle.MEDIUM, FormatStyle.SHORT)
                        .withLocale(locale())
                        .format(instant.atZone(zone));
    }

    private static Locale locale() {
        return LocaleContextHolder.getLocale();
    }

    private static String word(String key) {
        ResourceBundle.Control noFallback =
                ResourceBundle.Control.getNoFallbackControl(ResourceBundle.Control.FORMAT_PROPERTIES);
        return ResourceBundle.getBundle("messages.common", locale(), noFallback).getString(key);
    }
}
