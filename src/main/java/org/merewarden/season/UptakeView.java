package org.merewarden.season;

import java.time.LocalDate;
import org.jspecify.annotations.Nullable;

/**
 * What the log holds of one stock in one season.
 *
 * @param takenKg live weight of kept, discarded and seized commercial landings that count
 * @param recordedUpTo the earliest end of records among the cooperatives with a right that have any this season, else the
 *     last landing; null with no record at all. Those without any are among the silent
 * @param silentCooperatives names of cooperatives with a right whose records end more than six weeks before today
 */
public record UptakeView(
        long stockId, double takenKg, @Nullable LocalDate recordedUpTo, java.util.List<String> silentCooperatives) {}
