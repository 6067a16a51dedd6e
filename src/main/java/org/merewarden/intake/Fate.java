package org.merewarden.intake;

import java.util.List;

/** What would become of a row: new, same, changed (with what changes), or refused with the reasons. */
public record Fate(Kind kind, List<Problem> problems, String remark) {
    public enum Kind {
        NEW,
        SAME,
        CHANGED,
        REFUSED
    }

    public static final Fate NEW = new Fate(Kind.NEW, List.of(), "");
    public static final Fate SAME = new Fate(Kind.SAME, List.of(), "");

    public Fate {
        problems = List.copyOf(problems);
    }

    /** @param remark what changes, e.g. "catch_t 12.4 → 12.9" */
    public static Fate changed(String remark) {
        return new Fate(Kind.CHANGED, List.of(), remark);
    }

    public static Fate refused(Problem... problems) {
        return new Fate(Kind.REFUSED, List.of(problems), "");
    }
}
