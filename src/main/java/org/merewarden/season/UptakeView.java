package org.merewarden.season;

import java.time.LocalDate;
import org.jspecify.annotations.Nullable;

/**
 * What the log holds of one stock in one season.
 *
 * @param takenKg live weight of kept, discarded and seized commercial landings that count
 * @param recordedUpTo the date up to which every cooperative with a right is complete; null with no record at all
 * @param silentCooperatives names of cooperatives with a right whose records end more than six weeks before today
 */
public record UptakeView(
        long stockId, double takenKg, @Nullable LocalDate recordedUpTo, java.util.List<String> silentCooperatives) {}
