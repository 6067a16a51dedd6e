package org.merewarden.advice;

import org.jspecify.annotations.Nullable;

/**
 * What is on record beside the written reason of a decision.
 *
 * @param own who issued the limit had proposed it
 * @param doubt what was wrong with the assessment behind it: missing, superseded or unsettled; null where nothing was
 * @param successor number of the limit that took its place; null where none did, or in rows that tell it in words
 */
record Beside(boolean own, @Nullable String doubt, @Nullable Long successor) {
    static final Beside NOTHING = new Beside(false, null, null);

    static Beside replacedBy(long limitId) {
        return new Beside(false, null, limitId);
    }
}
