package org.merewarden.command;

import java.util.Arrays;
import java.util.Locale;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.PriorRecord;

/**
 * The growth law where {@code priors.csv} states no {@code shape} for a stock; a stated one comes first.
 *
 * <p>Logistic is the engine's own default and adds nothing, so that the evidence, its seed and its draws are the
 * server's. The others are what a row of {@code priors.csv} would say: Gompertz (Fox) a fixed shape under 0.001, which
 * the engine takes as n → 0; fitted ln n ~ N(0, 0.4), our judgement.
 */
enum Growth {
    LOGISTIC(null),
    GOMPERTZ(new PriorRecord("shape", "", 1e-6, 0, "Gompertz growth, by the command line")),
    FITTED(new PriorRecord("shape", "", 1, 0.4, "shape left open by the command line"));

    private final @Nullable PriorRecord shape;

    Growth(@Nullable PriorRecord shape) {
        this.shape = shape;
    }

    static Growth named(String word) throws UsageProblem {
        for (Growth growth : values()) {
            if (growth.word().equals(word)) {
                return growth;
            }
        }
        String words = Arrays.stream(values()).map(Growth::word).collect(Collectors.joining(", "));
        throw new UsageProblem("--growth must be one of " + words + ", got “" + word + "”");
    }

    String word() {
        return name().toLowerCase(Locale.ROOT);
    }

    Evidence appliedTo(Evidence evidence) {
        boolean stated = evidence.priors().stream().anyMatch(p -> p.parameter().equals("shape"));
        return shape == null || stated
                ? evidence
                : new Evidence(
                        evidence.habitat(),
                        evidence.traits(),
                        evidence.catches(),
                        evidence.effort(),
                        evidence.surveys(),
                        evidence.events(),
                        evidence.areas(),
                        Stream.concat(evidence.priors().stream(), Stream.of(shape))
                                .toList());
    }
}
