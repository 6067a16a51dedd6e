package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;
import static org.assertj.core.api.Assertions.withinPercentage;

import java.util.Random;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.merewarden.core.dynamics.AnnualMap.Season;

class AnnualMapTest {
    static Stream<SurplusProduction> laws() {
        Random random = new Random(31);
        double[] shapes = {0, 1e-9, 0.188115, 0.5, 1, 1, 2, 4};
        return IntStream.range(0, 32)
                .mapToObj(i -> new SurplusProduction(
                        0.05 + 1.4 * random.nextDouble(),
                        Math.pow(10, -3 + 9 * random.nextDouble()),
                        shapes[i % shapes.length]));
    }

    /** The search is checked on the mortality it should find: catches made from a known F give that F back. */
    @ParameterizedTest
    @MethodSource("laws")
    void findsTheMortalityOfACatch(SurplusProduction law) {
        AnnualMap map = new AnnualMap(law);
        for (double state : new double[] {0.3, 0.8, 1, 1.4}) {
            for (double mortality : new double[] {1e-6, 0.05, 0.4, 1.2}) {
                ConstantMortality known = new ConstantMortality(law, mortality);
                double start = state * law.capacity();
                double wanted = known.removals(start, 1);
                Season season = map.take(start, wanted);
                assertThat(season.mortality()).isCloseTo(mortality, withinPercentage(1e-6));
                assertThat(season.catchTonnes()).isCloseTo(wanted, withinPercentage(1e-8));
                assertThat(season.biomassAfterTonnes()).isCloseTo(known.after(start, 1), withinPercentage(1e-6));
            }
        }
    }

    /** Nothing is made or lost: catch ≤ wanted, and not more than what was there and grew; biomass ≥ 0. */
    @ParameterizedTest
    @MethodSource("laws")
    void conserves(SurplusProduction law) {
        AnnualMap map = new AnnualMap(law);
        Random random = new Random(7);
        for (int i = 0; i < 200; i++) {
            double start = 1.5 * law.capacity() * random.nextDouble() * random.nextDouble();
            double wanted = 2 * law.capacity() * random.nextDouble() * random.nextDouble();
            Season season = map.take(start, wanted);
            assertThat(season.mortality()).isBetween(0.0, 3.0);
            assertThat(season.catchTonnes()).isBetween(0.0, wanted * (1 + 1e-10));
            assertThat(season.biomassAfterTonnes()).isPositive();
            assertThat(season.catchTonnes()).isLessThanOrEqualTo(start - season.biomassAfterTonnes() + law.msy());
            if (season.catchTonnes() < wanted * (1 - 1e-9)) {
                assertThat(season.mortality()).isEqualTo(3);
            }
        }
    }

    /** A catch that no mortality up to 3 yields: a scan shows none does; where one does, the smallest is taken. */
    @ParameterizedTest
    @MethodSource("laws")
    void takesTheSmallestMortalityThatYieldsTheCatch(SurplusProduction law) {
        AnnualMap map = new AnnualMap(law);
        Random random = new Random(8);
        for (int i = 0; i < 20; i++) {
            double start = law.capacity() * random.nextDouble();
            double wanted = 1.2 * start * random.nextDouble();
            double found = map.mortality(start, wanted);
            double limit = map.removals(start, found) < wanted * (1 - 1e-9) ? 3 : found * (1 - 1e-6);
            for (int step = 1; step <= 300; step++) {
                assertThat(map.removals(start, limit * step / 300)).isLessThan(wanted);
            }
        }
    }

    /** A small fast stock yields most below F = 3: r 1.5, K 1000, start 50. */
    @Test
    void findsACatchThatTheLargestMortalityWouldMiss() {
        AnnualMap map = new AnnualMap(new SurplusProduction(1.5, 1000, 1));
        double atThree = map.removals(50, 3);
        double better = map.removals(50, 2.4);
        assertThat(better).isGreaterThan(atThree);
        Season season = map.take(50, (atThree + better) / 2);
        assertThat(season.catchTonnes()).isCloseTo((atThree + better) / 2, withinPercentage(1e-9));
        assertThat(season.mortality()).isLessThan(2.4);
        assertThat(map.take(50, 80).mortality()).isEqualTo(3);
    }

    /** Against the continuous constant catch, up to MSY: the design gives about 2e-4 of K. */
    @Test
    void staysCloseToTheContinuousCatch() {
        SurplusProduction law = new SurplusProduction(0.4, 1000, 1);
        AnnualMap map = new AnnualMap(law);
        for (double wanted : new double[] {20, 50, 75, 100}) {
            for (double start : new double[] {300, 450, 700, 1000}) {
                double continuous = new ConstantRemovals(law, wanted).after(start, 1);
                double seasonal = map.take(start, wanted).biomassAfterTonnes();
                assertThat(seasonal).isCloseTo(continuous, within(2.5e-4 * 1000));
            }
        }
    }

    /** A sequence of seasons worked by bisection on F and many Runge–Kutta steps; r 0.6, K 1000, n 2. */
    @Test
    void agreesWithASlowSimulator() {
        AnnualMap map = new AnnualMap(new SurplusProduction(0.6, 1000, 2));
        double biomass = 900;
        double slow = 900;
        for (double wanted : new double[] {100, 150, 250, 60, 0, 400}) {
            Season season = map.take(biomass, wanted);
            Season slowSeason = slowSeason(slow, wanted);
            assertThat(season.mortality()).isCloseTo(slowSeason.mortality(), within(1e-9));
            assertThat(season.biomassAfterTonnes()).isCloseTo(slowSeason.biomassAfterTonnes(), withinPercentage(1e-7));
            assertThat(season.catchTonnes()).isCloseTo(slowSeason.catchTonnes(), within(1e-7));
            biomass = season.biomassAfterTonnes();
            slow = slowSeason.biomassAfterTonnes();
        }
    }

    private static Season slowSeason(double start, double wanted) {
        double low = 0;
        double high = 3;
        for (int i = 0; i < 50; i++) {
            double middle = (low + high) / 2;
            if (slowYear(start, middle).catchTonnes() < wanted) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return slowYear(start, high);
    }

    private static Season slowYear(double start, double f) {
        int steps = 1000;
        double biomass = start;
        double caught = 0;
        for (int i = 0; i < steps; i++) {
            double middle = Ode.kinked(b -> 0.3 * b * (1 - b * b / 1e6) - f * b, biomass, 0.5 / steps, 1);
            double end = Ode.kinked(b -> 0.3 * b * (1 - b * b / 1e6) - f * b, middle, 0.5 / steps, 1);
            caught += f * (biomass + 4 * middle + end) / (6 * steps);
            biomass = end;
        }
        return new Season(biomass, f, caught);
    }

    @Test
    void oddSeasons() {
        AnnualMap map = new AnnualMap(new SurplusProduction(0.4, 1000, 1));
        assertThat(map.take(0, 0)).isEqualTo(new Season(0, 0, 0));
        assertThat(map.take(0, 5)).isEqualTo(new Season(0, 3, 0));
        assertThat(map.take(500, 0).mortality()).isZero();
        assertThat(map.take(500, 0).biomassAfterTonnes())
                .isCloseTo(1000 / (1 + Math.exp(-0.4)), withinPercentage(1e-10));
        Season beyond = map.take(500, 1e9);
        assertThat(beyond.mortality()).isEqualTo(3);
        assertThat(beyond.catchTonnes()).isLessThan(600);
        assertThat(map.take(500, 1e-12).mortality()).isPositive().isLessThan(1e-14);
        assertThat(map.take(1e-200, 1e-201).catchTonnes()).isCloseTo(1e-201, withinPercentage(1e-9));
    }

    @Test
    void rejectsBadValues() {
        AnnualMap map = new AnnualMap(new SurplusProduction(0.4, 1000, 1));
        assertThatThrownBy(() -> map.take(-1, 5))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessage("0 <= B < infinity is violated: B = -1.0");
        assertThatThrownBy(() -> map.take(1, Double.NaN)).hasMessageContaining("catch = NaN");
    }
}
