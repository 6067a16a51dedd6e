package org.merewarden.jobs;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.Duration;
import java.time.Instant;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.transaction.support.TransactionTemplate;

@WholeApplication
class JobsTest {
    @Autowired
    private Jobs jobs;

    @Autowired
    private TransactionTemplate transaction;

    @Autowired
    private JdbcClient jdbc;

    private JobView ended(long id) throws InterruptedException {
        Instant end = Instant.now().plus(Duration.ofSeconds(30));
        while (jobs.find(id).orElseThrow().active() && Instant.now().isBefore(end)) {
            Thread.sleep(100);
        }
        return jobs.find(id).orElseThrow();
    }

    @Test
    void aJobIsDoneAndKeepsItsProgress() throws InterruptedException {
        JobView job = ended(jobs.submit("test-work", "two pieces", "go"));
        assertThat(job.state()).isEqualTo("DONE");
        assertThat(job.done()).isEqualTo(2);
        assertThat(job.note()).isEqualTo("whole");
        assertThat(job.finishedAt()).isNotNull();
    }

    @Test
    void anUnexpectedErrorShowsItsNumberAndNothingInside() throws InterruptedException {
        JobView job = ended(jobs.submit("test-work", "fails", "fail"));
        assertThat(job.state()).isEqualTo("FAILED");
        assertThat(job.note()).contains("its number in the log is").doesNotContain("on purpose");
        assertThat(job.done()).isEqualTo(1);
    }

    @Test
    void aJobStoppedBeforeItBeganNeverBegins() {
        long id = transaction.execute(status -> {
            long queued = jobs.submit("test-work", "stopped", "go");
            jobs.cancel(queued);
            return queued;
        });
        assertThat(jobs.find(id).orElseThrow().state()).isEqualTo("CANCELLED");
        assertThat(jobs.begin(id)).isFalse();
    }

    @Test
    void aJobWhoseProcessDiedMayBeginAgainAndOneThatEndedMayNot() throws InterruptedException {
        jdbc.sql("insert into job (kind, subject, payload, state, requested_by, requested_at)"
                        + " values ('test-work', 'died', 'go', 'RUNNING', 'ines', current_timestamp)")
                .update();
        long died = jdbc.sql("select max(id) from job where subject = 'died'")
                .query(Long.class)
                .single();
        assertThat(jobs.begin(died)).isTrue();
        long id = jobs.submit("test-work", "ended", "go");
        assertThat(ended(id).state()).isEqualTo("DONE");
        assertThat(jobs.begin(id)).isFalse();
    }
}
