package org.merewarden.assessment;

import java.util.Map;
import java.util.TreeMap;
import org.merewarden.activity.ActivityLog;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Assessor;
import org.merewarden.core.inference.OlderEstimators;
import org.merewarden.core.inference.Posterior;
import org.merewarden.records.EvidenceReader;
import org.merewarden.waterbody.Register;
import org.merewarden.web.Seasons;
import org.springframework.context.ApplicationEventPublisher;
import org.springframework.stereotype.Service;
import org.springframework.transaction.support.TransactionTemplate;

/**
 * Makes one assessment: reads one evidence version, runs the method outside any transaction, stores the result once, with
 * the point estimates of the older estimators beside it.
 */
@Service
class AssessmentMaker {
    private final EvidenceReader reader;
    private final Register register;
    private final Assessor assessor;
    private final AssessmentStore store;
    private final Seasons seasons;
    private final ActivityLog activity;
    private final ApplicationEventPublisher events;
    private final TransactionTemplate transaction;

    AssessmentMaker(
            EvidenceReader reader,
            Register register,
            Assessor assessor,
            AssessmentStore store,
            Seasons seasons,
            ActivityLog activity,
            ApplicationEventPublisher events,
            TransactionTemplate transaction) {
        this.reader = reader;
        this.register = register;
        this.assessor = assessor;
        this.store = store;
        this.seasons = seasons;
        this.activity = activity;
        this.events = events;
        this.transaction = transaction;
    }

    /** Assesses the stock, unless the job has done so before it was interrupted. */
    void assess(long stockId, long jobId, String by) {
        if (store.madeBy(jobId, stockId)) {
            return;
        }
        Evidence evidence = reader.evidence(stockId);
        int lastClosed = seasons.current() - 1;
        Posterior posterior = assessor.assess(evidence, lastClosed, evidence.seed());
        Map<String, Double> estimates = new TreeMap<>(OlderEstimators.of(evidence, lastClosed));
        estimates.putAll(posterior.estimates());
        transaction.executeWithoutResult(status -> {
            long id = store.add(stockId, jobId, by, evidence, posterior, estimates);
            activity.record(
                    "assessed",
                    register.stock(stockId).orElseThrow().title(),
                    null,
                    posterior.method() + ", " + (posterior.verdict().settled() ? "settled" : "not settled"));
            events.publishEvent(new AssessmentStored(stockId, id));
        });
    }
}
