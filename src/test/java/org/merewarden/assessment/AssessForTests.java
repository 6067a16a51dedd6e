package org.merewarden.assessment;

import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Assessor;
import org.merewarden.core.inference.Posterior;
import org.merewarden.records.EvidenceReader;
import org.springframework.context.ApplicationEventPublisher;
import org.springframework.stereotype.Component;
import org.springframework.transaction.annotation.Transactional;

/** Assesses a stock at once, without a job, for tests of the features above. */
@Component
public class AssessForTests {
    private final EvidenceReader reader;
    private final Assessor assessor;
    private final AssessmentStore store;
    private final ApplicationEventPublisher events;

    AssessForTests(EvidenceReader reader, Assessor assessor, AssessmentStore store, ApplicationEventPublisher events) {
        this.reader = reader;
        this.assessor = assessor;
        this.store = store;
        this.events = events;
    }

    @Transactional
    public void assess(long stockId, int lastClosedYear) {
        Evidence evidence = reader.evidence(stockId);
        Posterior posterior = assessor.assess(evidence, lastClosedYear, 1);
        long id = store.add(stockId, null, "test", evidence, posterior, posterior.estimates());
        events.publishEvent(new AssessmentStored(stockId, id));
    }
}
