package org.merewarden.assessment;

import java.util.List;
import java.util.Optional;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Posterior;

/** Stored assessments, as other features read them. Never changed after they were made. */
public interface Assessments {
    /** The latest assessment of every assessed stock; one statement. */
    List<AssessmentView> latest();

    Optional<AssessmentView> latest(long stockId);

    /** All assessments of a stock, newest first. */
    List<AssessmentView> ofStock(long stockId);

    Optional<AssessmentView> find(long stockId, int number);

    /** The draws of one assessment. */
    Posterior posterior(long assessmentId);

    /** The evidence that the assessment read. */
    Evidence evidence(long assessmentId);
}
