package org.merewarden.web;

import java.time.Clock;
import java.time.Month;
import java.time.ZoneId;
import java.util.Map;
import java.util.stream.Collectors;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;

/** What the office has settled about itself. Each setting has a default until somebody changes it. */
@Service
public class OfficeSettings {
    public static final String OFFICE_NAME = "office_name";
    public static final String TIME_ZONE = "time_zone";
    /** 1–12: the month in which a season starts; the season is named by the year in which it starts. */
    public static final String FIRST_MONTH = "first_month";
    /** yes or no: whether an approver may issue a limit that they proposed themselves. */
    public static final String OWN_PROPOSALS = "own_proposals";

    /** What a limit rests on in law, and where and by when to object to it: filled in where no earlier limit says so. */
    public static final String LEGAL_BASIS = "legal_basis";

    public static final String OBJECTION = "objection";

    static final Map<String, String> DEFAULTS = Map.of(
            OFFICE_NAME,
            "Inland Fisheries Office",
            TIME_ZONE,
            "UTC",
            FIRST_MONTH,
            "1",
            OWN_PROPOSALS,
            "no",
            LEGAL_BASIS,
            "",
            OBJECTION,
            "");

    private final JdbcClient jdbc;
    private final Clock clock;

    OfficeSettings(JdbcClient jdbc, Clock clock) {
        this.jdbc = jdbc;
        this.clock = clock;
    }

    /** All settings, the defaults where nothing was entered. */
    public Map<String, String> all() {
        Map<String, String> stored = jdbc
                .sql("select name, value_text from office_setting")
                .query((row, n) -> Map.entry(row.getString(1), row.getString(2)))
                .list()
                .stream()
                .collect(Collectors.toMap(Map.Entry::getKey, Map.Entry::getValue));
        return DEFAULTS.entrySet().stream()
                .collect(Collectors.toMap(Map.Entry::getKey, d -> stored.getOrDefault(d.getKey(), d.getValue())));
    }

    public String get(String name) {
        String fallback = DEFAULTS.get(name);
        if (fallback == null) {
            throw new IllegalArgumentException("no setting of this name: " + name);
        }
        return jdbc.sql("select value_text from office_setting where name = ?")
                .param(name)
                .query(String.class)
                .optional()
                .orElse(fallback);
    }

    /** Stores a setting; callers check the value and record the act. */
    public void set(String name, String value) {
        String by = Who.name();
        var now = clock.instant().atOffset(java.time.ZoneOffset.UTC);
        int changed = jdbc.sql(
                        "update office_setting set value_text = ?, changed_at = ?, changed_by = ? where name = ?")
                .params(value, now, by, name)
                .update();
        if (changed == 0) {
            jdbc.sql("insert into office_setting (name, value_text, changed_at, changed_by) values (?, ?, ?, ?)")
                    .params(name, value, now, by)
                    .update();
        }
    }

    public ZoneId zone() {
        return ZoneId.of(get(TIME_ZONE));
    }

    public Month firstMonth() {
        return Month.of(Integer.parseInt(get(FIRST_MONTH)));
    }
}
