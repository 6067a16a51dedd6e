package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.merewarden.core.inference.EvidenceStrength.FAIR;
import static org.merewarden.core.inference.EvidenceStrength.STRONG;
import static org.merewarden.core.inference.EvidenceStrength.THIN;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.junit.jupiter.api.Test;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Kind;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.statespace.StateSpaceStrength.Facts;

class StateSpaceStrengthTest {
    private static final List<String> NONE_FAILED = List.of();

    private static EvidenceStrength strength(int seen, double contrast, double spread, double ofPrior) {
        return StateSpaceStrength.of(new Facts(true, true, seen, contrast, spread, ofPrior), NONE_FAILED)
                .strength();
    }

    @Test
    void eachBoundBelongsToTheBetterClass() {
        assertThat(strength(15, 2, 0.25, 0.5)).isEqualTo(STRONG);
        assertThat(strength(14, 2, 0.25, 0.5)).isEqualTo(FAIR);
        assertThat(strength(15, 1.999, 0.25, 0.5)).isEqualTo(FAIR);
        assertThat(strength(15, 2, 0.2501, 0.5)).isEqualTo(FAIR);
        assertThat(strength(15, 2, 0.25, 0.501)).isEqualTo(FAIR);
        assertThat(strength(8, 1.4, 0.4, 0.7)).isEqualTo(FAIR);
        assertThat(strength(7, 1.4, 0.4, 0.7)).isEqualTo(THIN);
        assertThat(strength(8, 1.399, 0.4, 0.7)).isEqualTo(THIN);
        assertThat(strength(8, 1.4, 0.401, 0.7)).isEqualTo(THIN);
        assertThat(strength(8, 1.4, 0.4, 0.701)).isEqualTo(THIN);
    }

    @Test
    void unsettledOrWithoutRemovalsIsThin() {
        assertThat(StateSpaceStrength.of(new Facts(false, true, 30, 3, 0.1, 0.2), NONE_FAILED)
                        .strength())
                .isEqualTo(THIN);
        assertThat(StateSpaceStrength.of(new Facts(true, false, 30, 3, 0.1, 0.2), NONE_FAILED)
                        .strength())
                .isEqualTo(THIN);
    }

    @Test
    void oneFailedCheckIsFairAndTwoAreThin() {
        Facts best = new Facts(true, true, 30, 3, 0.1, 0.2);
        assertThat(StateSpaceStrength.of(best, List.of("a.")).strength()).isEqualTo(FAIR);
        StateSpaceStrength two = StateSpaceStrength.of(best, List.of("a.", "b."));
        assertThat(two.strength()).isEqualTo(THIN);
        assertThat(two.reasons())
                .containsExactly("The evidence is thin: 2 of the checks failed (at most 1, 0).", "a.", "b.");
    }

    @Test
    void theReasonsNameWhatFallsShort() {
        StateSpaceStrength fair = StateSpaceStrength.of(new Facts(true, true, 12, 1.5, 0.2, 0.4), NONE_FAILED);
        assertThat(fair.reasons())
                .containsExactly("The evidence is fair, not strong: abundance is seen in 12 seasons (fair needs 8,"
                        + " strong 15); biomass there differs by a factor of 1.50 (1.4, 2).");
        StateSpaceStrength strong = StateSpaceStrength.of(new Facts(true, true, 20, 3, 0.2, 0.4), NONE_FAILED);
        assertThat(strong.reasons()).containsExactly("The evidence is strong.");
    }

    private static List<String> failed(
            @Nullable Double runs,
            @Nullable Double scaledError,
            @Nullable Double without,
            @Nullable Double with,
            @Nullable Double rho) {
        SeriesCheck check = new SeriesCheck(
                "nets", Kind.INDEX, 20, 3.0, 0.0, 0.9, runs, 0.1, scaledError, 5, without, with, null, null);
        Retrospective retrospective = rho == null ? null : new Retrospective(List.of(), 9, rho, 9);
        return FailedChecks.of(new Diagnostics(List.of(), List.of(check), List.of(), retrospective, List.of()));
    }

    @Test
    void checksFailBeyondTheirBoundsOnly() {
        assertThat(failed(null, null, null, null, null)).isEmpty();
        assertThat(failed(0.05, 1.5, 12.5, 10.0, 0.2)).isEmpty();
        assertThat(failed(0.05, 1.5, 7.5, 10.0, -0.2)).isEmpty();
        assertThat(failed(0.0499, null, null, null, null)).hasSize(1).allMatch(s -> s.contains("nets"));
        assertThat(failed(null, 1.501, null, null, null)).hasSize(1).allMatch(s -> s.contains("1.50"));
        assertThat(failed(null, null, 12.51, 10.0, null)).hasSize(1).allMatch(s -> s.contains("+25 %"));
        assertThat(failed(null, null, 7.49, 10.0, null)).hasSize(1).allMatch(s -> s.contains("-25 %"));
        assertThat(failed(null, null, null, null, 0.201)).hasSize(1);
        assertThat(failed(null, null, null, null, -0.201)).hasSize(1);
        assertThat(failed(0.01, 2.0, 20.0, 10.0, 0.5)).hasSize(4);
    }
}
