package org.merewarden.intake;

/** How a file writes decimals. */
enum DecimalMark {
    /** The separator is a comma, so only the point is read. */
    POINT,
    /** Point or comma. */
    EITHER,
    /** Point or comma, and cells with points occur: 1,234 could then be a thousand or one and a bit. */
    MIXED
}
