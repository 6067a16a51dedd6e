package org.merewarden.web;

import java.time.Clock;
import java.time.LocalDate;
import java.time.Month;
import java.time.ZoneId;
import java.util.Map;
import java.util.Objects;
import org.springframework.stereotype.Service;

/** The fishing calendar: a season lasts twelve months and is named by the year in which it starts. */
@Service
public class Seasons {
    private final OfficeSettings settings;
    private final Clock clock;

    Seasons(OfficeSettings settings, Clock clock) {
        this.settings = settings;
        this.clock = clock;
    }

    /** Today in the office's time zone. */
    public LocalDate today() {
        return LocalDate.now(clock.withZone(settings.zone()));
    }

    public int current() {
        return of(today());
    }

    /** The current season by settings already read. */
    int current(Map<String, String> all) {
        LocalDate today = LocalDate.now(clock.withZone(ZoneId.of(setting(all, OfficeSettings.TIME_ZONE))));
        return of(today, Month.of(Integer.parseInt(setting(all, OfficeSettings.FIRST_MONTH))));
    }

    private static String setting(Map<String, String> all, String name) {
        return Objects.requireNonNull(all.get(name), name);
    }

    public int of(LocalDate date) {
        return of(date, settings.firstMonth());
    }

    static int of(LocalDate date, Month first) {
        return date.getMonthValue() < first.getValue() ? date.getYear() - 1 : date.getYear();
    }

    /** First day of the season. */
    public LocalDate start(int season) {
        return LocalDate.of(season, settings.firstMonth(), 1);
    }

    /** Last day of the season. */
    public LocalDate end(int season) {
        return start(season + 1).minusDays(1);
    }
}
