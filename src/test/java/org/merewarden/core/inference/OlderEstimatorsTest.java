package org.merewarden.core.inference;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;
import static org.assertj.core.data.Percentage.withPercentage;

import java.util.Arrays;
import java.util.List;
import java.util.SplittableRandom;
import java.util.stream.LongStream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.merewarden.core.evidence.AreaRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.Traits;

class OlderEstimatorsTest {
    /** Arabian Sea shrimp, Cadima 2003 (a, b, r² published; MSY and effort computed). */
    @Test
    void effortSeriesComeOutWithTheirRegressions() {
        var estimates = OlderEstimators.of(
                Reference.effortSeries("series_arabian_sea_shrimp.csv").evidence(), 1978);
        assertThat(estimates.get("schaefer_msy_t")).isEqualTo(6130.92, offset(5e-3));
        assertThat(estimates.get("schaefer_effort_msy")).isEqualTo(27.5886, offset(5e-5));
        assertThat(estimates.get("schaefer_a")).isEqualTo(444.454, offset(5e-4));
        assertThat(estimates.get("schaefer_b")).isEqualTo(-8.055, offset(5e-4));
        assertThat(estimates.get("schaefer_r2")).isEqualTo(0.77, offset(5e-3));
        assertThat(estimates.get("fox_msy_t")).isEqualTo(6159.16, offset(5e-3));
        assertThat(estimates.get("fox_effort_msy")).isEqualTo(35.7210, offset(5e-5));
        var java = OlderEstimators.of(
                Reference.effortSeries("series_java_trawl.csv").evidence(), 1977);
        assertThat(java.get("fox_msy_t")).isCloseTo(60.94, withPercentage(1));
    }

    @Test
    void aSurveyIndexComesBeforeCatchPerEffort() {
        Reference both = Reference.albacore();
        for (int year = 1967; year < 1990; year++) {
            both.effort.add(new EffortRecord(year, "boats", 10 + year % 7, null));
        }
        var estimates = OlderEstimators.of(both.evidence(), 1989);
        assertThat(estimates)
                .containsKey("difference_catchability:longline")
                .doesNotContainKey("difference_catchability:boats");
        assertThat(estimates.get("difference_msy_t")).isCloseTo(19.65, withPercentage(2));
    }

    @Test
    void aStockedOnlyStockHasNoMsy() {
        Reference stocked = Reference.albacore();
        stocked.traits = new Traits("FPP", true, null, null, null, null, null);
        assertThat(OlderEstimators.of(stocked.evidence(), 1989)).isEmpty();
        assertThat(OlderEstimators.differenceEquation(stocked.evidence(), 1989, 7))
                .isEmpty();
    }

    @Test
    void aChangingAreaIsSaidNotToBeFollowed() {
        Evidence e = Reference.albacore().evidence();
        Evidence with = new Evidence(
                e.habitat(),
                e.traits(),
                e.catches(),
                e.effort(),
                e.surveys(),
                e.events(),
                List.of(new AreaRecord(1980, 2000)),
                e.priors());
        assertThat(fit(with, 1989).verdict().reasons())
                .anyMatch(s -> s.startsWith("The lake's changing area is not followed"));
    }

    @Test
    void twoIndexSeasonsAreTooFew() {
        Reference two = Reference.albacore();
        two.surveys.removeIf(s -> s.year() > 1968);
        assertThat(OlderEstimators.of(two.evidence(), 1989)).isEmpty();
    }

    @Test
    void closedSeasonsTakeTheStatedResidualCatch() {
        Reference closed = Reference.albacore();
        closed.catches.removeIf(c -> c.year() == 1983 || c.year() == 1984);
        closed.closed(1983, 14.4).closed(1984, null);
        SeasonSeries seasons = SeasonSeries.of(closed.evidence(), 1989);
        assertThat(seasons.removals()[16]).isEqualTo(14.4);
        assertThat(seasons.removals()[17]).isZero();
        assertThat(seasons.removals()[18]).isEqualTo(28.4);
    }

    @Test
    void aSeriesWhoseCatchesEndedLongAgoIsAssessedToItsEndAndSaysSo() {
        Evidence evidence = Reference.albacore().evidence();
        Posterior then = fit(evidence, 1989);
        Posterior now = fit(evidence, 2025);
        assertThat(now.lastYear()).isEqualTo(1989);
        assertThat(now.estimates()).isEqualTo(then.estimates());
        assertThat(now.verdict().reasons())
                .contains("Catches are recorded up to 1989 only: all of this speaks of the start of 1990, not of the"
                        + " present.");
        assertThat(then.verdict().reasons()).noneMatch(s -> s.contains("not of the present"));
    }

    @Test
    void aCatchMissingForAFewLastSeasonsIsHeld() {
        Posterior posterior = fit(Reference.albacore().evidence(), 1994);
        assertThat(posterior.lastYear()).isEqualTo(1994);
        assertThat(posterior.verdict().reasons()).anyMatch(s -> s.contains("its removals are held for 5 seasons"));
    }

    @ParameterizedTest
    @CsvSource({
        "3, 10, 1, 0.3",
        "20, 0, 1, 0.3",
        "20, 0.001, 1e-9, 0.3",
        "20, 1e7, 1e9, 0.3",
        "20, 1e308, 1, 0.3",
        "2, 10, 1, 0",
        "20, 10, 1, 0",
        "20, 10, 1e-300, 5",
        "250, 10, 1, 0.1"
    })
    void extremesEndInWords(int seasons, double tonnes, double unit, double noise) {
        SplittableRandom random = new SplittableRandom(3);
        Reference extreme = new Reference();
        for (int t = 0; t < seasons; t++) {
            extreme.caught(1770 + t, tonnes)
                    .index("nets", 1770 + t, 0.5, unit * Math.exp(noise * random.nextGaussian()));
        }
        sound(extreme.evidence(), 1769 + seasons, 1);
    }

    static LongStream seeds() {
        return LongStream.range(0, 60);
    }

    /** Whatever the records say, the answer is settled or says why not, and is made of finite numbers. */
    @ParameterizedTest
    @MethodSource("seeds")
    void anyEvidenceGivesAVerdictAndFiniteNumbers(long seed) {
        sound(random(new SplittableRandom(seed)), 2019, seed);
    }

    private static Posterior fit(Evidence evidence, int lastClosedYear) {
        return OlderEstimators.differenceEquation(evidence, lastClosedYear, 7).orElseThrow();
    }

    private static void sound(Evidence evidence, int lastClosedYear, long seed) {
        assertThat(OlderEstimators.of(evidence, lastClosedYear).values()).allMatch(Double::isFinite);
        OlderEstimators.differenceEquation(evidence, lastClosedYear, seed).ifPresent(OlderEstimatorsTest::sound);
    }

    private static void sound(Posterior posterior) {
        assertThat(posterior.verdict().reasons()).isNotEmpty().noneMatch(s -> s.contains("NaN") || s.contains("null"));
        if (posterior.verdict().settled()) {
            assertThat(posterior.draws()).isGreaterThanOrEqualTo(200);
        }
        assertThat(posterior.estimates().values()).allMatch(Double::isFinite);
        for (int i = 0; i < posterior.draws(); i++) {
            assertThat(posterior.msyTonnes()[i]).isPositive().isFinite();
            assertThat(posterior.fmsyPerYear()[i]).isPositive().isFinite();
            assertThat(posterior.biomassTonnes()[i])
                    .hasSize(posterior.seasons() + 1)
                    .matches(b -> Arrays.stream(b).allMatch(v -> v > 0 && v < 1e300));
            assertThat(posterior.fishingPerYear()[i])
                    .matches(f -> Arrays.stream(f).allMatch(v -> v >= 0 && v < 1e300));
        }
    }

    private static Evidence random(SplittableRandom random) {
        Reference any = new Reference();
        any.habitat = new Habitat(
                random.nextBoolean() ? "lake" : "reservoir",
                Math.pow(10, random.nextDouble(0, 6)),
                random.nextBoolean() ? random.nextDouble(-1, 50) : null,
                random.nextBoolean() ? random.nextDouble(0, 900) : null,
                random.nextBoolean() ? random.nextDouble(0, 900) : null,
                random.nextBoolean() ? random.nextDouble(-5, 30) : null,
                1 + random.nextInt(6));
        any.traits = new Traits(
                "FPP",
                random.nextInt(20) == 0,
                random.nextBoolean() ? "slow" : null,
                random.nextBoolean() ? random.nextDouble(0, 40) : null,
                random.nextBoolean() ? random.nextDouble(0, 1) : null,
                random.nextBoolean() ? random.nextDouble(0, 120) : null,
                random.nextBoolean() ? random.nextDouble(0, 1) : null);
        int seasons = random.nextInt(40);
        double scale = Math.pow(10, random.nextDouble(-3, 7));
        double trend = random.nextDouble(-0.15, 0.1);
        double unit = Math.pow(10, random.nextDouble(-9, 9));
        double gaps = random.nextDouble();
        boolean zeroCatches = random.nextInt(8) == 0;
        boolean surveys = random.nextInt(3) > 0;
        boolean effort = random.nextBoolean();
        for (int t = 0; t < seasons; t++) {
            int year = 2020 - seasons + t;
            if (random.nextDouble() > 0.3 * gaps) {
                any.caught(year, zeroCatches ? 0 : scale * Math.exp(0.5 * random.nextGaussian()));
            }
            if (surveys && random.nextDouble() > gaps) {
                double value = unit * Math.exp(trend * t + 0.3 * random.nextGaussian());
                any.index(
                        t % 9 == 4 ? "traps" : "nets", year, random.nextDouble(), random.nextInt(15) == 0 ? 0 : value);
            }
            if (effort && random.nextDouble() > gaps) {
                any.effort.add(new EffortRecord(year, "boats", random.nextInt(9) == 0 ? 0 : 5 + t, null));
            }
            if (random.nextInt(25) == 0) {
                any.biomass(year, random.nextDouble(), scale * random.nextDouble(1, 30), 0.3);
            }
            if (random.nextInt(20) == 0) {
                any.kill(year, random.nextDouble());
            } else if (random.nextInt(20) == 0) {
                any.closed(year, random.nextBoolean() ? null : 0.1 * scale);
            } else if (random.nextInt(20) == 0) {
                any.stocked(year, scale * random.nextDouble());
            }
        }
        if (random.nextInt(6) == 0) {
            any.own("msy_t", Math.pow(10, random.nextDouble(-300, 300)), random.nextDouble(0, 50));
        }
        if (random.nextInt(6) == 0) {
            any.own("fmsy", Math.pow(10, random.nextDouble(-9, 9)), random.nextDouble(0, 3));
        }
        if (random.nextInt(6) == 0) {
            any.own("biomass_fraction_at_start", random.nextDouble(0.01, 2), 0.2);
        }
        return any.evidence();
    }
}
