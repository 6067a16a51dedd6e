package org.merewarden.jobs;

import com.github.kagkarlsson.scheduler.SchedulerState;
import com.github.kagkarlsson.scheduler.task.FailureHandler;
import com.github.kagkarlsson.scheduler.task.helper.OneTimeTask;
import com.github.kagkarlsson.scheduler.task.helper.Tasks;
import java.time.Duration;
import java.util.Map;
import java.util.UUID;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.beans.factory.ObjectProvider;
import org.springframework.context.annotation.Bean;
import org.springframework.context.annotation.Configuration;

/** Hands a queued job to its handler and keeps how it ended. */
@Configuration
class JobTask {
    private static final Logger LOG = LoggerFactory.getLogger(JobTask.class);

    @Bean
    OneTimeTask<Void> job(Jobs jobs, ObjectProvider<JobHandler> handlers) {
        return Tasks.oneTime(Jobs.TASK)
                .onFailure(new FailureHandler.OnFailureRetryLater<>(Duration.ofSeconds(5)))
                .execute((instance, context) ->
                        run(jobs, handlers, Long.parseLong(instance.getId()), context.getSchedulerState()));
    }

    private static void run(Jobs jobs, ObjectProvider<JobHandler> handlers, long id, SchedulerState scheduler) {
        if (!jobs.begin(id)) {
            return;
        }
        Map<String, JobHandler> byKind =
                handlers.stream().collect(Collectors.toMap(JobHandler::kind, Function.identity()));
        RunningJob job = jobs.running(id);
        try {
            JobHandler handler = byKind.get(jobs.kind(id));
            if (handler == null) {
                throw new IllegalStateException("no handler for jobs of kind " + jobs.kind(id));
            }
            handler.run(job);
            jobs.end(id, job.cancelRequested() ? "CANCELLED" : "DONE", null);
        } catch (RuntimeException e) {
            if (scheduler.isShuttingDown()) {
                // the job did not fail: the next start takes it up where it was
                throw e;
            }
            String errorId = UUID.randomUUID().toString().substring(0, 8);
            LOG.error("job {} failed, error {}", id, errorId, e);
            jobs.end(id, "FAILED", "Stopped by an unexpected error; its number in the log is " + errorId + ".");
        }
    }
}
