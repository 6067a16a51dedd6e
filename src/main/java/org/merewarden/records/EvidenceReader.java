package org.merewarden.records;

import java.util.Map;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.Traits;

/** The records in force of one stock, as an assessment reads them. */
public interface EvidenceReader {
    /** @throws org.merewarden.web.NotFound where there is no such stock */
    Evidence evidence(long stockId);

    /** What every stock of a water body is and lives in, by the stock's number, without its records; two statements. */
    Map<Long, Subject> subjects(long waterBodyId);

    /** A stock's water and its traits. */
    record Subject(Habitat habitat, Traits traits) {}
}
