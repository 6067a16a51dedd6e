package org.merewarden.intake;

/**
 * Why a row is refused.
 *
 * @param column the column, or empty where the whole row is meant
 * @param value the cell's text as it stands in the file
 * @param rule the rule it breaks, as a sentence that also says what would be right
 */
public record Problem(String column, String value, String rule) {}
