package org.merewarden.activity;

import java.time.OffsetDateTime;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Figures;
import org.merewarden.web.OfficeSettings;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Reads the record, newest first. */
@Service
@Transactional(readOnly = true)
class ActivityReader {
    /** One entry, ready to be shown; before and after are null where there is nothing. */
    public record Row(
            String when,
            String actor,
            String action,
            String subject,
            @Nullable String before,
            @Nullable String after) {}

    private final JdbcClient jdbc;
    private final OfficeSettings settings;

    ActivityReader(JdbcClient jdbc, OfficeSettings settings) {
        this.jdbc = jdbc;
        this.settings = settings;
    }

    /** The filter's page of entries. */
    public List<Row> rows(ActivityFilter filter) {
        return jdbc.sql("select happened_at, actor, action, subject, before_text, after_text from activity_entry "
                        + filter.where() + " order by happened_at desc, id desc limit :size offset :offset")
                .params(filter.parameters(settings.zone()))
                .param("size", ActivityFilter.PAGE_SIZE)
                .param("offset", filter.offset())
                .query((row, n) -> new Row(
                        Figures.dateTime(row.getObject(1, OffsetDateTime.class).toInstant()),
                        row.getString(2),
                        row.getString(3),
                        row.getString(4),
                        row.getString(5),
                        row.getString(6)))
                .list();
    }

    public long count(ActivityFilter filter) {
        return jdbc.sql("select count(*) from activity_entry " + filter.where())
                .params(filter.parameters(settings.zone()))
                .query(Long.class)
                .single();
    }

    /** Everybody who has an entry. */
    public List<String> people() {
        return jdbc.sql("select distinct actor from activity_entry order by actor")
                .query(String.class)
                .list();
    }
}
