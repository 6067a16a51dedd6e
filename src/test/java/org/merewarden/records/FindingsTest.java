package org.merewarden.records;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Test;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.evidence.Traits;
import org.merewarden.records.Findings.Reported;

class FindingsTest {
    @Test
    void missingYearsInsideTheCatchSeriesAreNamedTogether() {
        Evidence evidence = evidence(catches(2000, 2001, 2003, 2007), List.of(), List.of(), List.of());

        assertThat(Findings.catchGaps(evidence)).containsExactly(Finding.of("catchGaps", "2002, 2004–2006"));
        assertThat(Findings.catchGaps(evidence(catches(2000, 2001), List.of(), List.of(), List.of())))
                .isEmpty();
        assertThat(Findings.catchGaps(evidence(List.of(), List.of(), List.of(), List.of())))
                .isEmpty();
    }

    @Test
    void anIndexWithoutACatchIsNamed() {
        Evidence evidence = evidence(
                catches(2000), List.of(), List.of(index(2000, 1), index(2001, 1), biomass(2002, 30)), List.of());

        assertThat(Findings.indexWithoutCatch(evidence)).containsExactly(Finding.of("indexWithoutCatch", "2001"));
    }

    @Test
    void effortWithoutACatchIsNamedUnlessThereWasNone() {
        List<EffortRecord> effort = List.of(
                new EffortRecord(2000, "nets", 100, null),
                new EffortRecord(2001, "nets", 100, null),
                new EffortRecord(2002, "nets", 0, null));

        assertThat(Findings.effortWithoutCatch(evidence(catches(2000), effort, List.of(), List.of())))
                .containsExactly(Finding.of("effortWithoutCatch", "2001"));
    }

    @Test
    void aTenfoldValueIsFarFromItsNeighboursAndTheyAreNot() {
        double[] quiet = {3.0, 3.2, 2.9, 3.1, 31.0, 3.0, 3.3, 2.8, 3.1};
        List<SurveyRecord> series = IntStream.range(0, quiet.length)
                .mapToObj(i -> index(2000 + i, quiet[i]))
                .toList();

        assertThat(Findings.farValues(evidence(List.of(), List.of(), series, List.of())))
                .containsExactly(Finding.of("farValue", "nets", "2004", "31"));
    }

    @Test
    void aSeriesThatSwingsThroughoutHasNoFarValue() {
        double[] swings = {3.0, 1.2, 4.9, 1.1, 5.0, 1.0, 4.3, 0.8, 6.1};
        List<SurveyRecord> series = IntStream.range(0, swings.length)
                .mapToObj(i -> index(2000 + i, swings[i]))
                .toList();

        assertThat(Findings.farValues(evidence(List.of(), List.of(), series, List.of())))
                .isEmpty();
    }

    @Test
    void aMissingFractionCountsOnlyBesideAStatedOne() {
        assertThat(Findings.fractionsMissing(List.of(
                        new Reported(2000, "angling", null),
                        new Reported(2000, "commercial", 0.9),
                        new Reported(2001, "commercial", null),
                        new Reported(2002, "commercial", null))))
                .containsExactly(Finding.of("fractionsMissing", "commercial", "2001–2002"));
    }

    @Test
    void eventsThatCannotBeCountedAreNamed() {
        List<EventRecord> events = List.of(
                new EventRecord("a", 2000, "stocking", null, null, null, 0.6, 2002),
                new EventRecord("b", 2001, "stocking", null, null, null, null, 2003),
                new EventRecord("c", 2002, "fish kill", null, null, null, null, null),
                new EventRecord("d", 2003, "fish kill", 0.1, 0.2, 0.3, null, null));
        Evidence evidence = evidence(List.of(), List.of(), List.of(), events);

        assertThat(Findings.of(evidence, List.of()))
                .containsExactly(Finding.of("unusedStocking", "b", "2001"), Finding.of("unknownKill", "c", "2002"));
    }

    @Test
    void theStripCountsRecordsByKindAndYear() {
        EvidenceStrip strip = EvidenceStrip.of(
                evidence(catches(2001, 2001, 2003), List.of(), List.of(index(2000, 1), biomass(2002, 4)), List.of()));

        assertThat(strip.firstYear()).isEqualTo(2000);
        assertThat(strip.lastYear()).isEqualTo(2003);
        assertThat(strip.rows()).extracting(EvidenceStrip.Row::kind).containsExactly("catches", "index", "biomass");
        assertThat(strip.rows().get(0).records())
                .containsOnly(java.util.Map.entry(2001, 2L), java.util.Map.entry(2003, 1L));
        assertThat(strip.svg("A < B", kind -> kind)).contains("A &lt; B").doesNotContain("style=");
        assertThat(EvidenceStrip.of(evidence(List.of(), List.of(), List.of(), List.of()))
                        .rows())
                .isEmpty();
    }

    private static List<CatchRecord> catches(int... years) {
        return IntStream.of(years)
                .mapToObj(y -> new CatchRecord(y, "commercial", 5, null, 1))
                .toList();
    }

    private static SurveyRecord index(int year, double value) {
        return new SurveyRecord(year, "nets", 0.5, false, value, null, null);
    }

    private static SurveyRecord biomass(int year, double value) {
        return new SurveyRecord(year, "marks", 0.5, true, value, 0.3, null);
    }

    private static Evidence evidence(
            List<CatchRecord> catches,
            List<EffortRecord> effort,
            List<SurveyRecord> surveys,
            List<EventRecord> events) {
        return new Evidence(
                new Habitat("lake", 100, null, null, null, null, 1),
                new Traits("FPE", false, null, null, null, null, null),
                catches,
                effort,
                surveys,
                events,
                List.of(),
                List.of());
    }
}
