package org.merewarden.core.outlook;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import java.util.Random;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.merewarden.core.inference.EvidenceStrength;

/**
 * The projection against a simulator written apart from it: growth and catch in 100 small steps a year, F by halving, its
 * own random numbers. Nothing but the equations is shared.
 */
class SlowSimulatorTest {
    private static final int RUNS = 4000;
    private static final int SEASONS = 5;

    private final Random random = new Random(99);

    /** One stock, n = 1: chance of B under 0.2 K at a season's end, and the mean yearly catch. */
    private double[] simulate(double r, double capacity, double start, double wanted, double processSd) {
        int crossed = 0;
        double total = 0;
        for (int run = 0; run < RUNS; run++) {
            double biomass = start;
            boolean below = false;
            for (int season = 0; season < SEASONS; season++) {
                double low = 0;
                double high = 3;
                if (year(r, capacity, biomass, 3)[1] > wanted) {
                    for (int k = 0; k < 30; k++) {
                        double middle = (low + high) / 2;
                        if (year(r, capacity, biomass, middle)[1] < wanted) {
                            low = middle;
                        } else {
                            high = middle;
                        }
                    }
                }
                double[] taken = year(r, capacity, biomass, wanted == 0 ? 0 : high);
                total += taken[1];
                biomass = taken[0] * Math.exp(processSd * random.nextGaussian());
                below |= biomass < 0.2 * capacity;
            }
            crossed += below ? 1 : 0;
        }
        return new double[] {(double) crossed / RUNS, total / RUNS / SEASONS};
    }

    /** Biomass after a year under F, and the catch; midpoint steps. */
    private static double[] year(double r, double capacity, double start, double mortality) {
        double step = 1.0 / 100;
        double b = start;
        double caught = 0;
        for (int i = 0; i < 100; i++) {
            double middle = b + step / 2 * (r * b * (1 - b / capacity) - mortality * b);
            caught += step * mortality * middle;
            b += step * (r * middle * (1 - middle / capacity) - mortality * middle);
        }
        return new double[] {b, caught};
    }

    /** Two binomial shares of 4,000: five standard errors of their difference, false alarm 6e-7 each. */
    @ParameterizedTest
    @CsvSource({"0.4, 1000, 500, 90, 0.1", "0.4, 1000, 300, 60, 0.2", "0.9, 200, 60, 35, 0.15", "0.2, 50, 30, 0, 0.3"})
    void agrees(double r, double capacity, double start, double wanted, double processSd) {
        double[] slow = simulate(r, capacity, start, wanted, processSd);
        Outlook outlook = new Outlook(
                MadePosterior.of(
                        RUNS, i -> r * capacity / 4, i -> r / 2, 1, i -> start, processSd, EvidenceStrength.FAIR),
                List.of(),
                SEASONS,
                0.2,
                0,
                4711);
        Projection projection = outlook.project(Course.ofCatch(wanted));
        double p = slow[0];
        double error = Math.sqrt(2 * Math.max(p * (1 - p), 1e-3) / RUNS);
        assertThat(projection.belowLimitAtLeastOnce()).isCloseTo(p, within(5 * error));
        // the mean catch varies by less than its chance of being cut short: a generous sd of wanted/2 by run
        assertThat(projection.expectedCatch())
                .isCloseTo(slow[1], within(5 * wanted / 2 * Math.sqrt(2.0 / RUNS) + 1e-12));
    }
}
