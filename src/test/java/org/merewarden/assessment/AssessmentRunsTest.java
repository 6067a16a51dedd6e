package org.merewarden.assessment;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.Duration;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.concurrent.locks.LockSupport;
import java.util.function.BiConsumer;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.core.inference.Posterior;
import org.merewarden.jobs.RunningJob;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

@WholeApplication
class AssessmentRunsTest {
    private static int lakes;

    @Autowired
    private AssessmentRuns runs;

    @Autowired
    private AssessmentStore store;

    @Autowired
    private JdbcClient jdbc;

    private long first;
    private long second;

    @BeforeEach
    void twoStocks() {
        var region = new TestRegion(jdbc);
        long lake = region.lake("run-lake-" + ++lakes, "Run Lake " + lakes);
        first = region.stock(lake, "FPE");
        second = region.stock(lake, "FRO");
        region.catches(first, 2010, Collections.nCopies(10, 3.0));
    }

    /** A job as the scheduler would hand it over; the row stands in the store already. */
    private RunningJob job(boolean cancelled) {
        return job(cancelled, first + "," + second, (done, note) -> {});
    }

    private RunningJob job(boolean cancelled, String payload, BiConsumer<Integer, String> progress) {
        jdbc.sql("insert into job (kind, subject, payload, state, requested_by, requested_at)"
                        + " values ('assess', 'test', '', 'RUNNING', 'ines', current_timestamp)")
                .update();
        long id = jdbc.sql("select max(id) from job").query(Long.class).single();
        return new RunningJob() {
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
                return "ines";
            }

            @Override
            public boolean cancelRequested() {
                return cancelled;
            }

            @Override
            public void progress(int done, int total, String note) {
                progress.accept(done, note);
            }
        };
    }

    @Test
    void aRunTakenUpAgainStoresEveryResultOnce() {
        RunningJob job = job(false);
        runs.run(job);
        runs.run(job);
        assertThat(store.ofStock(first)).hasSize(1);
        assertThat(store.ofStock(second)).hasSize(1);
        runs.run(job(false));
        assertThat(store.ofStock(first).stream().map(AssessmentView::number)).containsExactly(2, 1);
    }

    @Test
    void theGreatestCountIsStoredLastHoweverSlowTheStore() {
        List<Integer> counts = Collections.synchronizedList(new ArrayList<>());
        List<String> notes = Collections.synchronizedList(new ArrayList<>());
        runs.run(job(false, "-1,-2,-3,-4", (done, note) -> {
            if (done == 1) {
                LockSupport.parkNanos(Duration.ofMillis(500).toNanos());
            }
            counts.add(done);
            notes.add(note);
        }));
        assertThat(counts).containsExactly(0, 1, 2, 3, 4);
        assertThat(notes.get(4)).startsWith("4 failed unexpectedly");
    }

    @Test
    void aStoppedRunStoresNothing() {
        runs.run(job(true));
        assertThat(store.latest(first)).isEmpty();
    }

    @Test
    void anAssessmentIsReadBackAsItWasMade() {
        runs.run(job(false));
        AssessmentView view = store.latest(first).orElseThrow();
        assertThat(view.madeBy()).isEqualTo("ines");
        assertThat(view.strength()).isEqualTo("THIN");
        assertThat(store.evidence(view.id()).contentHash()).isEqualTo(view.evidenceHash());
        Posterior posterior = store.posterior(view.id());
        double[] msy = posterior.msyTonnes().clone();
        Arrays.sort(msy);
        assertThat(view.msyTonnes()).isBetween(msy[msy.length / 2 - 1], msy[msy.length / 2]);
        assertThat(view.trend()).hasSize(posterior.seasons() + 1);
        assertThat(List.of(view.firstYear(), view.lastYear()))
                .containsExactly(posterior.firstYear(), posterior.lastYear());
    }

    @Test
    void sameEvidenceGivesTheSameDraws() {
        runs.run(job(false));
        runs.run(job(false));
        List<AssessmentView> both = store.ofStock(first);
        assertThat(store.posterior(both.get(0).id()).msyTonnes())
                .isEqualTo(store.posterior(both.get(1).id()).msyTonnes());
    }
}
