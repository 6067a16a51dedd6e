package org.merewarden.advice;

import com.github.kagkarlsson.scheduler.task.helper.RecurringTask;
import com.github.kagkarlsson.scheduler.task.helper.Tasks;
import com.github.kagkarlsson.scheduler.task.schedule.FixedDelay;
import org.springframework.context.annotation.Bean;
import org.springframework.context.annotation.Configuration;

/** Looks every hour whether a new season's limits have come into force. */
@Configuration
class SeasonTurnTask {
    @Bean
    RecurringTask<Void> standingsOfTheSeason(StandingsRefresh standings) {
        return Tasks.recurring("standings-of-the-season", FixedDelay.ofHours(1))
                .execute((instance, context) -> standings.turnOfSeason());
    }
}
