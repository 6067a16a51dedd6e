package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Percentage.withPercentage;

import java.util.Arrays;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.inference.Posterior;

/** Properties that hold whatever the records are. */
class AnyEvidenceTest {
    private static final int STOCKS = Integer.getInteger("evidence.stocks", 24);

    private final StateSpaceAssessor assessor = new StateSpaceAssessor();

    @Test
    void anyEvidenceEndsInAPosteriorOrAReason() {
        IntStream.range(0, STOCKS).parallel().forEach(seed -> {
            AnyEvidence any = new AnyEvidence(seed);
            Posterior posterior = assessor.assess(any.cases().evidence(), any.lastClosedYear, seed);
            assertThat(posterior.verdict().reasons()).as("seed %d", seed).isNotEmpty();
            assertThat(posterior.draws() > 0 || !posterior.verdict().settled()).isTrue();
            if (!posterior.verdict().settled()
                    && posterior.draws() > 0
                    && posterior.estimates().containsKey("rung")) {
                assertThat(posterior.verdict().reasons().get(0)).startsWith("Not settled. ");
            }
            assertFinite(posterior, seed);
        });
    }

    private static void assertFinite(Posterior posterior, int seed) {
        assertThat(posterior.estimates().values())
                .as("estimates of seed %d", seed)
                .allMatch(Double::isFinite);
        assertThat(posterior.parameters())
                .as("parameters of seed %d", seed)
                .allSatisfy((name, values) -> assertThat(Arrays.stream(values)).allMatch(Double::isFinite));
        // records tell all their numbers; one that cannot be had is null
        assertThat(posterior.diagnostics().toString())
                .as("diagnostics of seed %d", seed)
                .doesNotContain("NaN", "Infinity");
        for (int k = 0; k < posterior.draws(); k++) {
            assertThat(posterior.msyTonnes()[k])
                    .as("MSY of seed %d", seed)
                    .isPositive()
                    .isFinite();
            assertThat(posterior.fmsyPerYear()[k])
                    .as("FMSY of seed %d", seed)
                    .isPositive()
                    .isFinite();
            assertThat(posterior.shape()[k])
                    .as("shape of seed %d", seed)
                    .isNotNegative()
                    .isFinite();
            assertThat(posterior.biomassTonnes()[k])
                    .as("biomass of seed %d", seed)
                    .matches(row -> Arrays.stream(row).allMatch(v -> v >= 0 && Double.isFinite(v)));
            assertThat(posterior.fishingPerYear()[k])
                    .as("harvest of seed %d", seed)
                    .matches(row -> Arrays.stream(row).allMatch(v -> v >= 0 && Double.isFinite(v)));
            assertThat(posterior.removalsTonnes()[k])
                    .as("removals of seed %d", seed)
                    .matches(row -> Arrays.stream(row).allMatch(v -> v >= 0 && Double.isFinite(v)));
        }
    }

    @Test
    void theWorkIsBoundedWhateverTheEvidence() {
        IntStream.range(0, STOCKS / 2).parallel().forEach(seed -> {
            AnyEvidence any = new AnyEvidence(1000 + seed);
            Evidence evidence = any.cases().evidence();
            ModelPriors priors = ModelPriors.of(evidence);
            SeasonData data = SeasonData.of(evidence, any.lastClosedYear, priors);
            if (data.seasons() > 0) {
                StateSpaceFit fit = StateSpaceFit.of(data, priors, seed);
                assertThat(fit.marginal().calls())
                        .as("evaluations of seed %d", seed)
                        .isLessThanOrEqualTo(Ladder.MOST_EVALUATIONS);
                assertThat(fit.marginal().innerEvaluations() * fit.marginal().density().size)
                        .as("work of seed %d: what the ladder begins below its limit it finishes", seed)
                        .isLessThanOrEqualTo(3 * Ladder.MOST_WORK);
                assertThat(fit.ladder().rungs()).hasSizeBetween(1, 3);
            }
        });
    }

    /** Tonnes in another unit throughout, the prior of MSY with them: every draw in that unit, to rounding. */
    @ParameterizedTest
    @ValueSource(doubles = {1e3, 7.3, 1e-6})
    void tonnesInAnotherUnitScaleEveryDraw(double c) {
        Posterior before = assessor.assess(Cases.everything().evidence(), 2017, 3);
        Posterior after = assessor.assess(scaled(Cases.everything(), c).evidence(), 2017, 3);
        assertThat(before.draws()).isPositive();
        for (int k = 0; k < before.draws(); k++) {
            assertThat(after.msyTonnes()[k]).isCloseTo(c * before.msyTonnes()[k], withPercentage(1e-7));
            assertThat(after.capacity(k)).isCloseTo(c * before.capacity(k), withPercentage(1e-7));
            assertThat(after.fmsyPerYear()[k]).isCloseTo(before.fmsyPerYear()[k], withPercentage(1e-7));
            for (int t = 0; t < before.biomassTonnes()[k].length; t++) {
                assertThat(after.biomassTonnes()[k][t])
                        .isCloseTo(c * before.biomassTonnes()[k][t], withPercentage(1e-7));
            }
        }
    }

    private static Cases scaled(Cases cases, double c) {
        cases.catches.replaceAll(
                r -> new CatchRecord(r.year(), r.sector(), c * r.catchTonnes(), r.cv(), r.reportedFraction()));
        cases.surveys.replaceAll(r -> new SurveyRecord(
                r.year(),
                r.series(),
                r.timeOfYear(),
                r.absoluteBiomass(),
                r.absoluteBiomass() ? c * r.value() : r.value(),
                r.cv(),
                r.nets()));
        cases.events.replaceAll(r -> r.kind().equals("fish kill") ? r : scaled(r, c));
        cases.priors.replaceAll(r -> r.parameter().equals("msy_t")
                ? new PriorRecord(r.parameter(), r.series(), c * r.median(), r.logSd(), r.reason())
                : r);
        return cases;
    }

    private static EventRecord scaled(EventRecord r, double c) {
        Double residual = r.likely() == null ? null : (Double) (c * r.likely());
        Double recruited = r.recruitedTonnes() == null ? null : (Double) (c * r.recruitedTonnes());
        return new EventRecord(r.key(), r.year(), r.kind(), r.low(), residual, r.high(), recruited, r.recruitYear());
    }
}
