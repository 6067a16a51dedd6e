package org.merewarden.intake;

import java.math.BigDecimal;
import java.time.LocalDate;
import java.time.format.DateTimeParseException;
import java.util.List;
import java.util.Locale;
import java.util.regex.Pattern;
import org.jspecify.annotations.Nullable;

/** Understands one cell by its column. A text that breaks a rule of the column is refused, never repaired. */
final class CellReader {
    private static final Pattern POINT_NUMBER = Pattern.compile("[+-]?(\\d+\\.?\\d*|\\.\\d+)([eE][+-]?\\d{1,3})?");
    private static final Pattern COMMA_NUMBER = Pattern.compile("[+-]?(\\d+,\\d*|,\\d+)([eE][+-]?\\d{1,3})?");
    private static final Pattern COULD_BE_THOUSANDS = Pattern.compile("[+-]?[1-9]\\d{0,2},\\d{3}");
    private static final Pattern THOUSANDS =
            Pattern.compile("[+-]?\\d{1,3}([.,' \\u00a0\\u202f\\u2019]\\d{3})+([.,]\\d+)?");
    private static final Pattern INTEGER = Pattern.compile("[+-]?\\d{1,9}");
    private static final Pattern CONTROL = Pattern.compile("[\\p{Cntrl}&&[^\\t\\r\\n]]|\\p{Cs}");
    private static final int LONGEST_NUMBER = 40;
    private static final int FIRST_YEAR = 1800;
    private static final int LAST_YEAR = 2200;

    private CellReader() {}

    /** The rule that a cell breaks. */
    static final class Broken extends Exception {
        private static final long serialVersionUID = 1L;

        Broken(String rule) {
            super(rule, null, false, false);
        }

        String rule() {
            return String.valueOf(getMessage());
        }
    }

    /** @return the cell's value, or null where it is empty and the column has no default */
    static @Nullable Object read(Column column, @Nullable String cell, DecimalMark mark) throws Broken {
        String text = cell == null ? "" : trimmed(cell);
        if (text.isEmpty()) {
            return empty(column);
        }
        Object value = switch (column.kind()) {
            case TEXT, CODE -> text(column, text);
            case NUMBER -> number(text, mark);
            case INTEGER -> integer(text);
            case YEAR -> year(text);
            case DATE -> date(text);
        };
        if (value instanceof Number number) {
            checkBounds(column, number.doubleValue());
        }
        return value;
    }

    private static String trimmed(String cell) {
        return cell.replace('\u00a0', ' ').strip();
    }

    private static @Nullable Object empty(Column column) throws Broken {
        String fallback = column.defaultValue();
        if (fallback == null) {
            if (column.required()) {
                throw new Broken("may not be empty");
            }
            return null;
        }
        return fallback.isEmpty() ? "" : read(column, fallback, DecimalMark.POINT);
    }

    private static String text(Column column, String text) throws Broken {
        if (CONTROL.matcher(text).find()) {
            throw new Broken("holds a control character; type the text anew");
        }
        if (!column.choices().isEmpty()) {
            return choice(column.choices(), text);
        }
        if (text.length() > column.max()) {
            throw new Broken(text.length() + " characters; at most " + plain(column.max()) + " are kept");
        }
        if (column.kind() == Column.Kind.CODE && text.chars().anyMatch(Character::isWhitespace)) {
            throw new Broken("a code has no spaces");
        }
        return text;
    }

    private static String choice(List<String> choices, String text) throws Broken {
        String wanted = word(text);
        for (String choice : choices) {
            if (word(choice).equals(wanted)) {
                return choice;
            }
        }
        throw new Broken("must be one of: " + String.join(", ", choices));
    }

    private static String word(String text) {
        return text.toLowerCase(Locale.ROOT).replaceAll("[\\s_-]+", " ");
    }

    private static Double number(String text, DecimalMark mark) throws Broken {
        if (text.length() > LONGEST_NUMBER) {
            throw new Broken("a number of at most " + LONGEST_NUMBER + " characters is needed");
        }
        if (POINT_NUMBER.matcher(text).matches()) {
            return finite(text);
        }
        if (!COMMA_NUMBER.matcher(text).matches()) {
            throw new Broken(
                    THOUSANDS.matcher(text).matches()
                            ? "write numbers without separators between the thousands, such as 1234.5"
                            : "a number such as 12.4 is needed, without unit; leave the cell empty where it is unknown");
        }
        if (mark == DecimalMark.POINT) {
            throw new Broken("write decimals with a point, such as 12.4; a decimal comma is read only where the"
                    + " separator is no comma");
        }
        if (mark == DecimalMark.MIXED && COULD_BE_THOUSANDS.matcher(text).matches()) {
            throw new Broken("could mean thousands or decimals, as other cells of the file have decimal points;"
                    + " write 1234 or 1.234");
        }
        return finite(text.replace(',', '.'));
    }

    private static Double finite(String text) throws Broken {
        double value = Double.parseDouble(text);
        if (Double.isInfinite(value)) {
            throw new Broken("the number is too large");
        }
        // no negative zero in the store
        return value == 0 ? 0.0 : value;
    }

    private static Integer integer(String text) throws Broken {
        if (!INTEGER.matcher(text).matches()) {
            throw new Broken("a whole number such as 12 is needed");
        }
        return Integer.valueOf(text);
    }

    private static Integer year(String text) throws Broken {
        if (!INTEGER.matcher(text).matches()) {
            throw new Broken("a year such as 2024 is needed");
        }
        return Integer.valueOf(text);
    }

    private static LocalDate date(String text) throws Broken {
        try {
            LocalDate date = LocalDate.parse(text);
            if (date.getYear() >= FIRST_YEAR && date.getYear() <= LAST_YEAR) {
                return date;
            }
        } catch (DateTimeParseException e) {
            throw new Broken("a date such as 2024-06-30 is needed (year-month-day, ISO 8601), without time");
        }
        throw new Broken("the year must lie between " + FIRST_YEAR + " and " + LAST_YEAR);
    }

    private static void checkBounds(Column column, double value) throws Broken {
        if (value >= column.min() && value <= column.max()) {
            return;
        }
        if (Double.isInfinite(column.max())) {
            throw new Broken("must be at least " + plain(column.min()));
        }
        if (Double.isInfinite(column.min())) {
            throw new Broken("must be at most " + plain(column.max()));
        }
        throw new Broken("must lie between " + plain(column.min()) + " and " + plain(column.max()));
    }

    static String plain(double number) {
        return BigDecimal.valueOf(number).stripTrailingZeros().toPlainString();
    }
}
