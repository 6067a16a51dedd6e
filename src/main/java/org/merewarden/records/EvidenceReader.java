package org.merewarden.records;

import org.merewarden.core.evidence.Evidence;

/** The records in force of one stock, as an assessment reads them. */
public interface EvidenceReader {
    /** @throws org.merewarden.web.NotFound where there is no such stock */
    Evidence evidence(long stockId);
}
