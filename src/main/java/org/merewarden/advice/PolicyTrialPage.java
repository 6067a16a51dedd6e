package org.merewarden.advice;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * The latest trial of a version in finished strings.
 *
 * @param here name of the version, e.g. "version 2"
 * @param against name of the version that was in force
 * @param when who asked for it and when
 * @param totals how many rise, fall and close, and the sums
 * @param rows the most changed first
 */
record PolicyTrialPage(
        String here,
        String against,
        String when,
        String state,
        boolean active,
        int done,
        int total,
        @Nullable String note,
        List<String> totals,
        List<Row> rows) {

    record Row(
            String stock,
            String address,
            String now,
            String against,
            String here,
            String change,
            String decided,
            String risk) {}
}
