package org.merewarden.intake;

/**
 * Why a row is refused.
 *
 * @param column the column, or empty where the whole row is meant
 * @param value the cell's text as it stands in the file, shortened where it is long
 * @param rule the rule it breaks, as a sentence that also says what would be right
 */
public record Problem(String column, String value, String rule) {
    private static final int LONGEST_VALUE = 200;
    private static final int LONGEST_RULE = 1000;

    public Problem {
        value = Excerpt.of(value, LONGEST_VALUE);
        rule = Excerpt.of(rule, LONGEST_RULE);
    }

    /** E.g. {@code catches.csv, line 7, column catch_t, “abc”: a number such as 12.4 is needed}. */
    String at(String fileName, int line) {
        return fileName + (line > 0 ? ", line " + line : "") + (column.isEmpty() ? "" : ", column " + column)
                + (value.isEmpty() ? "" : ", “" + value + "”") + ": " + rule;
    }
}
