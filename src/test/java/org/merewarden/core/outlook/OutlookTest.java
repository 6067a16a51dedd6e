package org.merewarden.core.outlook;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;
import static org.assertj.core.api.Assertions.withinPercentage;

import java.util.List;
import java.util.Random;
import java.util.stream.DoubleStream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.merewarden.core.dynamics.AnnualMap;
import org.merewarden.core.dynamics.ConstantRemovals;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;

class OutlookTest {
    private static final SurplusProduction LOGISTIC = new SurplusProduction(0.4, 1000, 1);

    private static Outlook outlook(Posterior posterior, int horizon) {
        return new Outlook(posterior, List.of(), horizon, 0.2, 0, 17);
    }

    /** Many unlike draws with process error. */
    private static Posterior unlike(int draws) {
        Random random = new Random(5);
        double[] z = random.doubles(3L * draws).toArray();
        return MadePosterior.of(
                draws,
                i -> 20 + 100 * z[i],
                i -> 0.05 + 0.6 * z[draws + i],
                1,
                i -> (20 + 100 * z[i]) / (0.05 + 0.6 * z[draws + i]) * (0.3 + 1.4 * z[2 * draws + i]),
                0.15,
                EvidenceStrength.FAIR);
    }

    /** Without process error the annual map exactly, and the flow under continuous removals to 2e-4 of it. */
    @ParameterizedTest
    @CsvSource({"500, 50", "800, 90", "260, 75", "1000, 0"})
    void withoutNoiseIsTheAnnualMap(double start, double wanted) {
        Projection projection = outlook(MadePosterior.logistic(3, start, 0), 8).project(Course.ofCatch(wanted));
        AnnualMap map = new AnnualMap(LOGISTIC);
        double exact = start;
        for (int t = 0; t < 8; t++) {
            AnnualMap.Season season = map.take(exact, wanted);
            exact = season.biomassAfterTonnes();
            for (int i = 0; i < 3; i++) {
                assertThat(projection.catchTonnes()[i][t]).isEqualTo(season.catchTonnes());
                assertThat(projection.biomassTonnes()[i][t + 1]).isEqualTo(exact);
            }
        }
        double flow = new ConstantRemovals(LOGISTIC, wanted).after(start, 1);
        assertThat(projection.biomassTonnes()[0][1]).isCloseTo(flow, within(2e-4 * flow));
    }

    /** A constant F holds the logistic stock at K (1 − F/r), yielding F K (1 − F/r): textbook equilibrium. */
    @Test
    void aConstantMortalityComesToItsEquilibrium() {
        Projection projection = outlook(MadePosterior.logistic(1, 700, 0), 50).project(Course.ofMortality(0.1));
        assertThat(projection.biomassTonnes()[0][50]).isCloseTo(750, within(1e-3));
        assertThat(projection.catchTonnes()[0][49]).isCloseTo(75, within(1e-3));
        assertThat(projection.expectedCatch()).isBetween(70.0, 75.0);
    }

    /** Above MSY the stock is fished out when the closed form says so; then the catch is not there and is not taken. */
    @Test
    void aCatchThatIsNotThereIsNotTaken() {
        double extinct = new ConstantRemovals(LOGISTIC, 110).extinctionTime(1000);
        Projection projection = outlook(MadePosterior.logistic(1, 1000, 0), 50).project(Course.ofCatch(110));
        double[] removals = projection.catchTonnes()[0];
        // F is held at most at 3, so the last fish lasts a little longer than under continuous removals: 39.99 years
        assertThat(removals[(int) extinct - 3]).isCloseTo(110, within(1e-9));
        assertThat(removals[(int) extinct + 2]).isLessThan(20);
        assertThat(DoubleStream.of(projection.biomassTonnes()[0])).allMatch(b -> b > 0);
    }

    @Test
    void conserves() {
        Posterior posterior = unlike(300);
        Outlook outlook = outlook(posterior, 10);
        for (double wanted : new double[] {0, 5, 60, 1e9}) {
            Projection p = outlook.project(Course.ofCatch(wanted));
            for (int i = 0; i < 300; i++) {
                for (int t = 0; t < 10; t++) {
                    double biomass = p.biomassTonnes()[i][t];
                    assertThat(p.biomassTonnes()[i][t + 1]).isNotNegative();
                    assertThat(p.catchTonnes()[i][t])
                            .isBetween(
                                    0.0,
                                    Math.min(
                                            wanted * (1 + 1e-10),
                                            biomass + posterior.msyTonnes()[i]));
                }
            }
        }
    }

    @Test
    void theRiskCurveNeverFallsAndIsTheRiskOfEachCatch() {
        Outlook outlook = outlook(unlike(400), 10);
        double[] catches = DoubleStream.iterate(0, c -> c < 160, c -> c + 4).toArray();
        double[] risks = outlook.risks(Course::ofCatch, catches);
        for (int k = 0; k < catches.length; k++) {
            Course course = Course.ofCatch(catches[k]);
            assertThat(risks[k]).isEqualTo(outlook.risk(course));
            assertThat(risks[k]).isEqualTo(outlook.project(course).belowLimitAtLeastOnce());
            if (k > 0) {
                assertThat(risks[k]).isGreaterThanOrEqualTo(risks[k - 1]);
            }
        }
        assertThat(risks[risks.length - 1]).isGreaterThan(risks[0] + 0.5);
    }

    @ParameterizedTest
    @ValueSource(doubles = {0.15, 0.2, 0.35, 0.6})
    void theLargestCatchIsWhereTheRiskPassesTheTolerance(double tolerance) {
        Outlook outlook = outlook(unlike(1000), 10);
        double largest = outlook.largestCatch(tolerance);
        assertThat(outlook.risk(Course.ofCatch(largest))).isLessThanOrEqualTo(tolerance);
        assertThat(outlook.risk(Course.ofCatch(largest * (1 + 1e-5)))).isGreaterThan(tolerance);
    }

    @Test
    void sayThatNoCatchIsTooLargeOrThatNoneIsSmallEnough() {
        // B lim of nothing is never crossed
        Outlook safe = new Outlook(MadePosterior.logistic(100, 500, 0.1), List.of(), 10, 0, 0, 1);
        assertThat(safe.largestCatch(0.1)).isEqualTo(Double.POSITIVE_INFINITY);
        Outlook lost = outlook(MadePosterior.logistic(100, 20, 0.1), 3);
        assertThat(lost.largestCatch(0.1)).isNaN();
        assertThat(lost.risk(Course.CLOSURE)).isEqualTo(1);
    }

    /** Logistic recovery in closed form: b(t) = 1/(1 + (1/b₀ − 1) e^(−rt)) passes 0.2 from 0.05 after 3.895 years. */
    @Test
    void recoveryTakesAsLongAsTheClosedFormSays() {
        double years = Math.log((1 / 0.05 - 1) / (1 / 0.2 - 1)) / 0.4;
        assertThat(years).isCloseTo(3.895, within(1e-3));
        assertThat(outlook(MadePosterior.logistic(10, 50, 0), 10).recovery(0.1)).hasValue((int) Math.ceil(years));
        assertThat(outlook(MadePosterior.logistic(10, 1e-9, 0), 10).recovery(0.1))
                .isEmpty();
    }

    @Test
    void seasonsBetweenAreFishedFirst() {
        Posterior posterior = MadePosterior.logistic(2, 600, 0);
        Outlook outlook =
                new Outlook(posterior, List.of(new SeasonBetween(80, 0), new SeasonBetween(0, 0.5)), 5, 0.2, 0, 3);
        AnnualMap map = new AnnualMap(LOGISTIC);
        double expected = map.take(map.take(600, 80).biomassAfterTonnes(), 0).biomassAfterTonnes();
        assertThat(outlook.startBiomass(0)).isEqualTo(expected);
        assertThat(outlook.firstSeason()).isEqualTo(2028);
    }

    /** Lognormal removals of cv 0.3: their spread passes into biomass. sd of ln C is √ln(1 + 0.09) = 0.2936. */
    @Test
    void removalsBetweenSpread() {
        assertThat(SeasonBetween.ofCv(80, 0.3).logSd()).isCloseTo(0.293560, within(1e-6));
        Outlook outlook =
                new Outlook(MadePosterior.logistic(4000, 600, 0), List.of(SeasonBetween.ofCv(80, 0.3)), 5, 0.2, 0, 3);
        AnnualMap map = new AnnualMap(LOGISTIC);
        double middle = map.take(600, 80).biomassAfterTonnes();
        long below = java.util.stream.IntStream.range(0, 4000)
                .filter(i -> outlook.startBiomass(i) < middle)
                .count();
        // half of 4,000, binomial sd 31.6: five of them, false alarm 6e-7
        assertThat((double) below).isCloseTo(2000, within(158.0));
        double low = map.take(600, 80 * Math.exp(0.293560)).biomassAfterTonnes();
        long lower = java.util.stream.IntStream.range(0, 4000)
                .filter(i -> outlook.startBiomass(i) < low)
                .count();
        // one sd above the median: 15.87 %, binomial sd 23.1
        assertThat((double) lower).isCloseTo(634.6, within(116.0));
    }

    @Test
    void theCollapseCourseIsCountedFromTheSeasonsStart() {
        // H 75: tipping biomass 250 (reference/SOURCES.md, r 0.4, K 1000)
        Posterior posterior = MadePosterior.of(
                4, i -> 100, i -> 0.2, 1, i -> new double[] {240, 260, 600, 700}[i], 0, EvidenceStrength.FAIR);
        assertThat(outlook(posterior, 10).collapseCourse(75)).isEqualTo(0.25);
        assertThat(outlook(posterior, 10).collapseCourse(101)).isEqualTo(1);
        Outlook later = new Outlook(posterior, List.of(new SeasonBetween(100, 0)), 10, 0.2, 0, 1);
        // from 260 t a season of 100 t leaves about 235 t
        assertThat(later.collapseCourse(75)).isEqualTo(0.5);
    }

    @Test
    void depensationOnlyAddsRisk() {
        Outlook outlook = outlook(unlike(200), 10);
        Outlook weakened = outlook.withDepensation(0.2);
        double[] catches = {0, 20, 40, 80};
        double[] without = outlook.risks(Course::ofCatch, catches);
        double[] with = weakened.risks(Course::ofCatch, catches);
        for (int k = 0; k < catches.length; k++) {
            assertThat(with[k]).isGreaterThanOrEqualTo(without[k]);
        }
        assertThat(with[1]).isGreaterThan(without[1]);
        assertThat(outlook.withDepensation(1e-12).project(Course.ofCatch(40)).expectedCatch())
                .isCloseTo(outlook.project(Course.ofCatch(40)).expectedCatch(), withinPercentage(1e-3));
    }

    @Test
    void theSameSeedGivesTheSameBits() {
        Posterior posterior = unlike(50);
        Projection one = outlook(posterior, 10).project(Course.ofCatch(30));
        Projection two = outlook(posterior, 10).project(Course.ofCatch(30));
        assertThat(one.biomassTonnes()).isDeepEqualTo(two.biomassTonnes());
        Projection other = new Outlook(posterior, List.of(), 10, 0.2, 0, 18).project(Course.ofCatch(30));
        assertThat(other.biomassTonnes()[0][5]).isNotEqualTo(one.biomassTonnes()[0][5]);
    }
}
