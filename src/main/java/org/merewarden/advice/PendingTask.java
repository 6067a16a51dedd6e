package org.merewarden.advice;

import com.github.kagkarlsson.scheduler.task.helper.RecurringTask;
import com.github.kagkarlsson.scheduler.task.helper.Tasks;
import com.github.kagkarlsson.scheduler.task.schedule.FixedDelay;
import java.time.Clock;
import org.springframework.context.annotation.Bean;
import org.springframework.context.annotation.Configuration;

/** Looks twice a minute for limits whose moment has come. */
@Configuration
class PendingTask {
    private static final int SECONDS = 30;

    @Bean
    RecurringTask<Void> limitsTakeEffect(PendingLimits pending, Clock clock) {
        return Tasks.recurring("limits-take-effect", FixedDelay.ofSeconds(SECONDS))
                .execute((instance, context) -> pending.takeEffect(clock.instant()));
    }
}
