package org.merewarden.advice;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Choice;

/**
 * A version in finished strings.
 *
 * @param steps of the rule, in order
 * @param others what holds beside them
 * @param open waits for a decision
 * @param own proposed by who looks at it
 * @param mayBeTried against the version in force, which it is not itself
 * @param toCompare the other versions
 * @param comparison null where none was asked for
 */
record PolicyPage(
        int number,
        String lede,
        List<String> steps,
        List<String> others,
        List<Act> acts,
        boolean open,
        boolean own,
        boolean mayBeTried,
        List<Choice> toCompare,
        @Nullable Comparison comparison) {

    /** What was decided about a version. */
    record Act(String act, String at, String by, String reason) {}

    /** A version in the list of all: its state and the latest act. */
    record Row(int number, String title, String state, String at, String by, String reason) {}

    record Comparison(int against, String sentence, List<Constant> constants, List<Sentence> sentences) {}

    record Constant(String name, String other, String here, boolean differs) {}

    record Sentence(String other, String here) {}
}
