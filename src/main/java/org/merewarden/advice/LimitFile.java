package org.merewarden.advice;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;

/** A limit with what was decided about it, oldest first. */
record LimitFile(long id, NewLimit limit, List<LimitHistory.Decision> acts) {
    LimitHistory.Decision first() {
        return acts.get(0);
    }

    List<LimitHistory.Decision> newestFirst() {
        List<LimitHistory.Decision> reversed = new ArrayList<>(acts);
        Collections.reverse(reversed);
        return reversed;
    }

    LimitHistory.Decision latest() {
        return acts.get(acts.size() - 1);
    }

    /** The latest act. */
    String state() {
        return latest().act();
    }

    boolean draft() {
        return state().equals(LimitWriter.DRAFTED);
    }

    /** Proposed, and neither issued nor refused. */
    boolean open() {
        return state().equals(LimitWriter.PROPOSED);
    }

    /** Issued and neither superseded nor withdrawn: in force, or waiting for its moment. */
    boolean standing() {
        return state().equals(LimitWriter.ISSUED);
    }
}
