package org.merewarden.core.inference;

import org.merewarden.core.evidence.Evidence;

/** A way from evidence to a posterior. The same evidence, last closed season and seed give the same bits. */
public interface Assessor {
    /**
     * @param evidence one version of the stock's records
     * @param lastClosedYear the last season whose records count
     * @param seed of the generator; derived from the content hash by callers that store results
     */
    Posterior assess(Evidence evidence, int lastClosedYear, long seed);
}
