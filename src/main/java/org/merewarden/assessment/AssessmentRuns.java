package org.merewarden.assessment;

import java.util.Arrays;
import java.util.List;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.stream.Collectors;
import org.merewarden.activity.ActivityLog;
import org.merewarden.intake.DemonstrationLoaded;
import org.merewarden.jobs.JobHandler;
import org.merewarden.jobs.JobView;
import org.merewarden.jobs.Jobs;
import org.merewarden.jobs.RunningJob;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.context.event.EventListener;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/**
 * Runs of assessments as queued jobs. The payload is the stocks' numbers; a run that is taken up again after its
 * process died passes over the stocks that it has stored already.
 */
@Service
class AssessmentRuns implements JobHandler {
    static final String KIND = "assess";
    private static final Logger LOG = LoggerFactory.getLogger(AssessmentRuns.class);

    private final Jobs jobs;
    private final Register register;
    private final AssessmentMaker maker;
    private final ActivityLog activity;

    AssessmentRuns(Jobs jobs, Register register, AssessmentMaker maker, ActivityLog activity) {
        this.jobs = jobs;
        this.register = register;
        this.maker = maker;
        this.activity = activity;
    }

    /** Queues a run over all stocks; returns the job's number. */
    @Transactional
    public long startAll() {
        return start(register.stocks());
    }

    /** Queues a run over these stocks; returns the job's number. */
    @Transactional
    public long start(List<StockView> stocks) {
        String subject = stocks.size() == 1 ? stocks.get(0).title() : stocks.size() + " stocks";
        String payload = stocks.stream().map(s -> Long.toString(s.id())).collect(Collectors.joining(","));
        activity.record("asked for assessment", subject, null, null);
        return jobs.submit(KIND, subject, payload);
    }

    @Transactional
    public void cancel(JobView job) {
        jobs.cancel(job.id());
        activity.record("asked to stop assessment", job.subject(), job.state(), "stopping");
    }

    List<JobView> recent() {
        return jobs.recent(KIND, 10);
    }

    /** The numbers of the stocks that a run is over, as it was asked for. */
    List<Long> stocksOf(long jobId) {
        return jobs.payload(jobId).map(AssessmentRuns::stocks).orElse(List.of());
    }

    private static List<Long> stocks(String payload) {
        return Arrays.stream(payload.split(","))
                .filter(id -> !id.isBlank())
                .map(Long::valueOf)
                .toList();
    }

    @EventListener(DemonstrationLoaded.class)
    void onDemonstrationLoaded() {
        startAll();
    }

    @Override
    public String kind() {
        return KIND;
    }

    @Override
    public void run(RunningJob job) {
        List<Long> stocks = stocks(job.payload());
        var progress = new Progress(job, stocks.size());
        job.progress(0, stocks.size(), "");
        ExecutorService workers =
                Executors.newFixedThreadPool(Runtime.getRuntime().availableProcessors());
        try {
            List<? extends Future<?>> pieces = stocks.stream()
                    .map(stock -> workers.submit(() -> assess(job, stock, progress)))
                    .toList();
            for (Future<?> piece : pieces) {
                piece.get();
            }
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            throw new IllegalStateException("interrupted", e);
        } catch (java.util.concurrent.ExecutionException e) {
            throw new IllegalStateException(e.getCause());
        } finally {
            workers.shutdownNow();
        }
    }

    private void assess(RunningJob job, long stock, Progress progress) {
        if (job.cancelRequested()) {
            return;
        }
        boolean well = true;
        try {
            maker.assess(stock, job.id(), job.requestedBy());
        } catch (RuntimeException e) {
            // one stock's failure must not keep the region waiting; it is counted on the page and kept in the log
            well = false;
            LOG.error("assessment of stock {} failed in job {}", stock, job.id(), e);
        }
        progress.made(well);
    }

    /** Counts a stock and stores the count as one step: a smaller count stored after a greater one would stay. */
    private static final class Progress {
        private final RunningJob job;
        private final int all;
        private int done;
        private int failed;

        Progress(RunningJob job, int all) {
            this.job = job;
            this.all = all;
        }

        synchronized void made(boolean well) {
            done++;
            failed += well ? 0 : 1;
            job.progress(
                    done,
                    all,
                    failed == 0 ? "" : failed + " failed unexpectedly; see the log for job " + job.id() + ".");
        }
    }
}
