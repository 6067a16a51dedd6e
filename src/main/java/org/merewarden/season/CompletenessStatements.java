package org.merewarden.season;

import java.time.Clock;
import java.time.LocalDate;
import java.time.ZoneOffset;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.waterbody.CooperativeView;
import org.merewarden.waterbody.Register;
import org.merewarden.web.Figures;
import org.merewarden.web.Seasons;
import org.merewarden.web.Who;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** "The records of this cooperative are complete up to …": statements, each kept, the latest counting. */
@Service
class CompletenessStatements {
    private final JdbcClient jdbc;
    private final Register register;
    private final ActivityLog activity;
    private final Seasons seasons;
    private final MessageSource messages;
    private final Clock clock;

    CompletenessStatements(
            JdbcClient jdbc,
            Register register,
            ActivityLog activity,
            Seasons seasons,
            MessageSource messages,
            Clock clock) {
        this.jdbc = jdbc;
        this.register = register;
        this.activity = activity;
        this.seasons = seasons;
        this.messages = messages;
        this.clock = clock;
    }

    record Answer(boolean stored, String text) {}

    @Transactional
    Answer state(String cooperativeCode, @Nullable LocalDate date) {
        Optional<CooperativeView> cooperative = register.cooperative(cooperativeCode);
        if (cooperative.isEmpty()) {
            return new Answer(false, word("season.complete.unknown", cooperativeCode));
        }
        if (date == null || date.isAfter(seasons.today()) || date.getYear() < 1800) {
            return new Answer(false, word("season.complete.date", Figures.date(date), Figures.date(seasons.today())));
        }
        String name = cooperative.get().name();
        jdbc.sql("insert into complete_up_to (cooperative_id, complete_up_to, stated_at, stated_by)"
                        + " values (:cooperative, :date, :at, :by)")
                .param("cooperative", cooperative.get().id())
                .param("date", date)
                .param("at", clock.instant().atOffset(ZoneOffset.UTC))
                .param("by", Who.name())
                .update();
        activity.record("stated records complete", name, null, "complete up to " + date);
        return new Answer(true, word("season.complete.done", name, Figures.date(date)));
    }

    private String word(String key, Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
