package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;
import static org.assertj.core.data.Percentage.withPercentage;

import java.lang.reflect.RecordComponent;
import java.util.List;
import java.util.Objects;
import java.util.SplittableRandom;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.Arguments;
import org.junit.jupiter.params.provider.MethodSource;
import org.merewarden.core.dynamics.ConstantMortality;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.inference.CheckBounds;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Kind;
import org.merewarden.core.inference.Diagnostics.Learned;
import org.merewarden.core.inference.Diagnostics.Residual;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;

class StateSpaceDiagnosticsTest {
    private final StateSpaceAssessor assessor = new StateSpaceAssessor();

    private Diagnostics diagnostics(Cases cases, int last) {
        return assessor.assess(cases.evidence(), last, 4).diagnostics();
    }

    /** Worked again from the posterior's own numbers with the dynamics package: ln I − ln(q B(τ)) over σ. */
    @Test
    void aResidualIsTheMeanOverDraws() {
        Posterior posterior = assessor.assess(Simulated.of(Simulated.Regime.RICH, 3).evidence, Simulated.LAST, 4);
        List<SurveyRecord> surveys =
                Simulated.of(Simulated.Regime.RICH, 3).evidence.surveys();
        List<Residual> residuals = posterior.diagnostics().residuals();
        assertThat(residuals).hasSize(surveys.size());
        int every = posterior.draws() / Residuals.MOST_DRAWS;
        for (int i = 0; i < surveys.size(); i++) {
            SurveyRecord survey = surveys.get(i);
            double sum = 0;
            for (int k = 0; k < posterior.draws(); k += every) {
                SurplusProduction law = SurplusProduction.fromReferencePoints(
                        posterior.msyTonnes()[k], posterior.fmsyPerYear()[k], 1);
                int t = survey.year() - posterior.firstYear();
                double biomass = new ConstantMortality(law, posterior.fishingPerYear()[k][t])
                        .after(posterior.biomassTonnes()[k][t], 0.5);
                double q = posterior.parameters().get("catchability:nets")[k];
                double sd = posterior.parameters().get("observation_sd:nets")[k];
                sum += Math.log(survey.value() / (q * biomass)) / sd;
            }
            assertThat(residuals.get(i).year()).isEqualTo(survey.year());
            assertThat(residuals.get(i).standardised()).isEqualTo(sum / Residuals.MOST_DRAWS, offset(1e-6));
        }
        SeriesCheck nets = posterior.diagnostics().series().get(0);
        double[] own = residuals.stream().mapToDouble(Residual::standardised).toArray();
        assertThat(nets.values()).isEqualTo(30);
        assertThat(nets.residualSd()).isEqualTo(ResidualTests.sd(own), offset(1e-12));
        assertThat(nets.residualSd()).isBetween(0.5, 1.1);
    }

    @Test
    void everyKindOfObservationHasItsPlace() {
        Diagnostics diagnostics = diagnostics(Cases.everything(), 2017);
        assertThat(diagnostics.series())
                .extracting(SeriesCheck::series)
                .containsExactly("nets", "sonar", "boats", "marked");
        assertThat(diagnostics.series())
                .extracting(SeriesCheck::kind)
                .containsExactly(Kind.INDEX, Kind.INDEX, Kind.EFFORT, Kind.BIOMASS);
        assertThat(diagnostics.series()).extracting(SeriesCheck::values).containsExactly(8, 4, 7, 1);
        // nets: 7 above detection of 8; boats: closed in 2012, 2014 and 2015
        assertThat(diagnostics.residuals().stream().filter(r -> r.series().equals("nets")))
                .hasSize(7)
                .noneMatch(r -> r.year() == 2016);
        assertThat(diagnostics.residuals().stream().filter(r -> r.series().equals("boats")))
                .hasSize(4)
                .noneMatch(r -> List.of(2012, 2014, 2015).contains(r.year()));
        assertThat(diagnostics.residuals().stream().filter(r -> r.series().equals("marked")))
                .hasSize(1)
                .allMatch(r -> r.year() == 2013 && r.timeOfYear() == 0.3);
        // sonar: 300, 260, 220, 180
        assertThat(diagnostics.series().get(1).contrast()).isCloseTo(300 / 180.0, withPercentage(1e-9));
        assertThat(diagnostics.series().get(3).contrast()).isNull();
        assertThat(diagnostics.series()).allMatch(s -> s.msyWithout() != null && s.msyWith() != null);
    }

    @Test
    void everyParameterIsShownWithItsPriorAndPosterior() {
        Cases cases = Cases.everything();
        cases.priors.add(new PriorRecord("observation_sd", "sonar", 0.3, 0.2, "Calibrated in 2009."));
        cases.priors.add(new PriorRecord("catchability", "sonar", 2, 0.1, "Swept area."));
        Posterior posterior = assessor.assess(cases.evidence(), 2017, 4);
        List<Learned> learned = posterior.diagnostics().learned();
        assertThat(learned)
                .extracting(l -> l.prior().parameter() + ":" + l.series())
                .containsExactly(
                        "msy_t:",
                        "fmsy:",
                        "biomass_fraction_at_start:",
                        "first_harvest_rate:",
                        "process_sd:",
                        "harvest_sd:",
                        "shape:",
                        "observation_sd:nets",
                        "observation_sd:sonar",
                        "observation_sd:boats",
                        "catchability:nets",
                        "catchability:sonar",
                        "catchability:boats");
        assertThat(learned.get(0).median()).isEqualTo(Quantiles.of(posterior.msyTonnes(), 0.5), offset(1e-9));
        assertThat(learned.get(6).overlap()).isNull();
        assertThat(learned.get(6).low()).isEqualTo(1, offset(1e-12));
        assertThat(learned.get(8).prior().reason()).isEqualTo("Calibrated in 2009.");
        assertThat(learned.get(11).prior().median()).isEqualTo(2, offset(1e-9));
        assertThat(learned.get(11).median())
                .isEqualTo(Quantiles.of(posterior.parameters().get("catchability:sonar"), 0.5), offset(1e-9));
        assertThat(learned.get(10).prior().reason()).contains("records alone decide");
        assertThat(learned).allMatch(l -> l.low() <= l.median() && l.median() <= l.high());
        assertThat(learned)
                .filteredOn(l -> l.prior().logSd() > 0)
                .allMatch(l -> Objects.requireNonNull(l.overlap()) > 0 && l.overlap() <= 1);
    }

    /** A closed first season leaves the walk's F to its prior and to the seasons after. */
    @Test
    void aClosedFirstSeasonStillShowsTheWalk() {
        Cases cases = Cases.albacore(0.1);
        cases.events.add(new EventRecord("c", 1967, "closure", null, null, null, null, null));
        Learned first = diagnostics(cases, 1989).learned().get(3);
        assertThat(first.prior().parameter()).isEqualTo("first_harvest_rate");
        assertThat(first.low()).isPositive();
        assertThat(first.overlap()).isBetween(0.1, 1.0);
    }

    @Test
    void withoutAnySeasonThePriorsAreShown() {
        Diagnostics bare = diagnostics(new Cases().own("msy_t", 20, 0.5), 2019);
        assertThat(bare.learned()).hasSize(7);
        Learned msy = bare.learned().get(0);
        assertThat(msy.overlap()).isEqualTo(1);
        // 20 · e^(±1.28155 · 0.5), within four standard errors of a 10 % quantile of 1,000 normal draws:
        // sd √(p(1 − p)/n)/φ(z) = 0.5 · 0.00949/0.1755 = 0.027 on the logarithm
        assertThat(Math.log(msy.low())).isEqualTo(Math.log(10.538), offset(4 * 0.027));
        assertThat(Math.log(msy.high())).isEqualTo(Math.log(37.959), offset(4 * 0.027));
        assertThat(bare.learned().get(6).overlap()).isNull();
        assertThat(bare.retrospective()).isNull();
    }

    /** One index that tells the truth, and a second one that agrees or contradicts. */
    private static Cases twoIndices(boolean agree) {
        Cases cases = Cases.albacore(0.1);
        List<SurveyRecord> longline = List.copyOf(cases.surveys);
        SplittableRandom random = new SplittableRandom(2);
        for (SurveyRecord s : longline) {
            double noise = Math.exp(0.1 * random.nextGaussian());
            double value = agree ? s.value() * noise : Math.exp(0.1 * (s.year() - 1967)) * noise;
            cases.index("other", s.year(), 0.5, value);
        }
        return cases;
    }

    @Test
    void aContradictoryIndexIsFoundByItsInfluence() {
        Diagnostics contradictory = diagnostics(twoIndices(false), 1989);
        Diagnostics agreeing = diagnostics(twoIndices(true), 1989);
        assertThat(contradictory.series().stream()
                        .mapToDouble(StateSpaceDiagnosticsTest::influence)
                        .max()
                        .orElseThrow())
                .isGreaterThan(CheckBounds.LARGEST_INFLUENCE);
        assertThat(agreeing.series()).allMatch(s -> influence(s) < CheckBounds.LARGEST_INFLUENCE);
        assertThat(FailedChecks.of(contradictory)).anyMatch(s -> s.contains("MSY would be"));
        assertThat(FailedChecks.of(agreeing)).noneMatch(s -> s.contains("MSY would be"));
        // without the contradicting index the result is that of the honest one alone
        double alone = new ModeSearch(HindcastTest.fit(Cases.albacore(0.1).evidence(), 1989))
                .ofAll()
                .orElseThrow()
                .msyTonnes();
        assertThat(contradictory.series().get(1).series()).isEqualTo("other");
        assertThat(contradictory.series().get(1).msyWithout()).isCloseTo(alone, withPercentage(1));
        assertThat(diagnostics(Cases.albacore(0.1), 1989).series().get(0).msyWithout())
                .isNull();
    }

    private static double influence(SeriesCheck check) {
        return Math.abs(Objects.requireNonNull(check.msyWithout()) / Objects.requireNonNull(check.msyWith()) - 1);
    }

    @Test
    void theSameSeedGivesTheSameDiagnostics() {
        assertThat(diagnostics(Cases.everything(), 2017)).isEqualTo(diagnostics(Cases.everything(), 2017));
    }

    static Stream<Arguments> odd() {
        Cases twoSeasons = new Cases()
                .caught(2000, 5, null)
                .caught(2001, 6, null)
                .index("nets", 2000, 0, 2)
                .index("nets", 2001, 0, 2);
        Cases noCatch = new Cases();
        IntStream.range(2000, 2012).forEach(y -> noCatch.index("nets", y, 0.5, 1 + 0.1 * (y % 3)));
        Cases oneBiomass = new Cases();
        oneBiomass.surveys.add(new SurveyRecord(2005, "marked", 0.2, true, 50, null, null));
        Cases closed = new Cases();
        IntStream.range(2000, 2012).forEach(y -> closed.caught(y, 0, null).index("nets", y, 0.5, 1 + 0.1 * (y % 3)));
        Cases extreme = Cases.albacore(0.2);
        extreme.surveys.replaceAll(
                s -> new SurveyRecord(s.year(), s.series(), 0, false, 1e-300 * s.value(), null, null));
        return Stream.concat(
                StateSpaceAssessorTest.stress(),
                Stream.of(
                        Arguments.of("two seasons", twoSeasons, 2001),
                        Arguments.of("no catch", noCatch, 2011),
                        Arguments.of("one biomass", oneBiomass, 2005),
                        Arguments.of("always closed", closed, 2011),
                        Arguments.of("index in 1e-300", extreme, 1989)));
    }

    @ParameterizedTest(name = "{0}")
    @MethodSource("odd")
    void noNumberIsEverNaN(String name, Cases cases, int last) throws ReflectiveOperationException {
        Posterior posterior = assessor.assess(cases.evidence(), last, 11);
        assertFinite(posterior.diagnostics(), name);
        assertThat(posterior.draws() > 0)
                .isEqualTo(!posterior.diagnostics().learned().isEmpty());
    }

    private static void assertFinite(Object value, String where) throws ReflectiveOperationException {
        if (value instanceof Double number) {
            assertThat(number).as(where).isFinite();
        } else if (value instanceof List<?> list) {
            for (Object each : list) {
                assertFinite(each, where);
            }
        } else if (value instanceof Record record) {
            for (RecordComponent component : record.getClass().getRecordComponents()) {
                Object part = component.getAccessor().invoke(record);
                if (part != null) {
                    assertFinite(part, where + "." + component.getName());
                }
            }
        }
    }
}
