package org.merewarden.advice;

import java.util.List;
import org.jspecify.annotations.Nullable;

/**
 * A limit as its notice says it, in finished strings.
 *
 * @param kind catch, effort, measures-only or closure
 * @param amount total removals for a catch limit
 * @param issued when it was issued; null for a draft
 * @param effective the moment from which a revision or closure holds, or is to hold while it is not issued; null for a
 *     season's limit
 * @param review the day by which a provisional ceiling is looked at again; null where it is none
 * @param recommended what the rule recommended; null where it recommended nothing
 * @param difference why the amount is another one; null where it is not
 * @param objections how many are noted
 * @param reason of the act that issued it; of the proposal where it was never issued
 * @param strength of the evidence, in a text's key; null where nothing was assessed
 * @param state the latest act
 */
record Notice(
        long number,
        String office,
        @Nullable String issued,
        String stock,
        String stockPath,
        String season,
        String kind,
        String amount,
        List<SetAside> setAsides,
        String reported,
        String toBeLogged,
        String validity,
        @Nullable String effective,
        @Nullable String review,
        @Nullable String recommended,
        @Nullable String difference,
        @Nullable String measures,
        @Nullable String legalBasis,
        @Nullable String objection,
        String reason,
        @Nullable String strength,
        String state,
        List<Part> parts,
        List<Act> acts,
        int objections) {

    /** What of the limit is kept for a purpose. */
    record SetAside(String purpose, String amount) {}

    /** What a cooperative may log. */
    record Part(String cooperative, String share, String amount) {}

    /** @param reason null where there is none, or it is the notice's own, told above */
    record Act(String act, String at, String by, @Nullable String reason) {}

    /** Whether the notice binds nobody: not issued, or no longer in force. */
    public boolean draftOrEnded() {
        return !state.equals(LimitWriter.ISSUED);
    }
}
