package org.merewarden.jobs;

import com.github.kagkarlsson.scheduler.SchedulerClient;
import com.github.kagkarlsson.scheduler.task.TaskInstance;
import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.Clock;
import java.time.Instant;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.List;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Who;
import org.springframework.beans.factory.ObjectProvider;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.jdbc.support.GeneratedKeyHolder;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/**
 * Queued work. A job is a row with its state and progress; the scheduler's own table says which process does it, so
 * that a job whose process died is taken up again.
 */
@Service
public class Jobs {
    static final String TASK = "job";
    private static final String COLUMNS =
            "id, kind, subject, state, progress_done, progress_total, note, requested_by, requested_at, started_at,"
                    + " finished_at";

    private final JdbcClient jdbc;
    private final Clock clock;
    // the scheduler is made from the task that runs the handlers, which may themselves submit jobs
    private final ObjectProvider<SchedulerClient> scheduler;

    Jobs(JdbcClient jdbc, Clock clock, ObjectProvider<SchedulerClient> scheduler) {
        this.jdbc = jdbc;
        this.clock = clock;
        this.scheduler = scheduler;
    }

    /**
     * Queues a job in the caller's transaction.
     *
     * @param subject for people, e.g. "12 stocks"
     * @param payload for the handler
     * @return the job's number
     */
    @Transactional
    public long submit(String kind, String subject, String payload) {
        var keys = new GeneratedKeyHolder();
        jdbc.sql("""
                insert into job (kind, subject, payload, state, requested_by, requested_at)
                values (:kind, :subject, :payload, 'QUEUED', :by, :at)""")
                .param("kind", kind)
                .param("subject", subject)
                .param("payload", payload)
                .param("by", Who.name())
                .param("at", now())
                .update(keys, "id");
        long id = Objects.requireNonNull(keys.getKey()).longValue();
        scheduler.getObject().scheduleIfNotExists(new TaskInstance<Void>(TASK, Long.toString(id)), clock.instant());
        return id;
    }

    public Optional<JobView> find(long id) {
        return jdbc.sql("select " + COLUMNS + " from job where id = ?")
                .param(id)
                .query(Jobs::view)
                .optional();
    }

    /** What the submitter of a job handed over. */
    public Optional<String> payload(long id) {
        return jdbc.sql("select payload from job where id = ?")
                .param(id)
                .query(String.class)
                .optional();
    }

    /** The latest jobs of a kind, newest first. */
    public List<JobView> recent(String kind, int count) {
        return jdbc.sql("select " + COLUMNS + " from job where kind = ? order by id desc limit ?")
                .params(kind, count)
                .query(Jobs::view)
                .list();
    }

    /** Asks a job to stop; one that has not begun never does, a running one stops after its present piece. */
    @Transactional
    public void cancel(long id) {
        jdbc.sql("update job set cancel_requested_at = ? where id = ? and state in ('QUEUED', 'RUNNING')")
                .params(now(), id)
                .update();
        jdbc.sql("update job set state = 'CANCELLED', finished_at = ? where id = ? and state = 'QUEUED'")
                .params(now(), id)
                .update();
    }

    /** Marks the job as begun; false where it is over already and must not run. */
    boolean begin(long id) {
        return jdbc.sql(
                                "update job set state = 'RUNNING', started_at = ? where id = ? and state in ('QUEUED', 'RUNNING')")
                        .params(now(), id)
                        .update()
                == 1;
    }

    void end(long id, String state, @Nullable String note) {
        jdbc.sql("update job set state = :state, finished_at = :at, note = coalesce(:note, note) where id = :id")
                .param("state", state)
                .param("at", now())
                .param("note", note, java.sql.Types.VARCHAR)
                .param("id", id)
                .update();
    }

    RunningJob running(long id) {
        return jdbc.sql("select payload, requested_by from job where id = ?")
                .param(id)
                .query((row, n) -> (RunningJob) new Running(id, row.getString(1), row.getString(2)))
                .single();
    }

    String kind(long id) {
        return jdbc.sql("select kind from job where id = ?")
                .param(id)
                .query(String.class)
                .single();
    }

    private OffsetDateTime now() {
        return clock.instant().atOffset(ZoneOffset.UTC);
    }

    private static JobView view(ResultSet row, int n) throws SQLException {
        return new JobView(
                row.getLong("id"),
                row.getString("kind"),
                row.getString("subject"),
                row.getString("state"),
                row.getInt("progress_done"),
                row.getInt("progress_total"),
                row.getString("note"),
                row.getString("requested_by"),
                Objects.requireNonNull(instant(row, "requested_at")),
                instant(row, "started_at"),
                instant(row, "finished_at"));
    }

    private static @Nullable Instant instant(ResultSet row, String column) throws SQLException {
        OffsetDateTime at = row.getObject(column, OffsetDateTime.class);
        return at == null ? null : at.toInstant();
    }

    private final class Running implements RunningJob {
        private final long id;
        private final String payload;
        private final String requestedBy;

        Running(long id, String payload, String requestedBy) {
            this.id = id;
            this.payload = payload;
            this.requestedBy = requestedBy;
        }

        @Override
        public long id() {
            return id;
        }

        @Override
        public String payload() {
            return payload;
        }

        @Override
        public String requestedBy() {
            return requestedBy;
        }

        @Override
        public boolean cancelRequested() {
            return jdbc.sql("select count(*) from job where id = ? and cancel_requested_at is not null")
                            .param(id)
                            .query(Integer.class)
                            .single()
                    > 0;
        }

        @Override
        public void progress(int done, int total, String note) {
            jdbc.sql("update job set progress_done = ?, progress_total = ?, note = ? where id = ?")
                    .params(done, total, note, id)
                    .update();
        }
    }
}
