package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;

import org.junit.jupiter.api.Tag;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.merewarden.core.inference.statespace.Simulated.Regime;

/**
 * Simulation-based calibration at size: 400 stocks per regime, or as many as the system property {@code
 * calibration.stocks} says.
 *
 * <p>90 % intervals cover 90 ± 4 points of the stocks, ± 2.5 from 1,000 on; the ranks pass a chi-square test of ten bins.
 * An exact engine leaves ± 4 points at 400 with probability 0.006 and ± 2.5 at 1,000 with 0.007, somewhere among the 24
 * coverages in 13 and 16 of 100 choices of seeds; the chi-square tests have a joint false-alarm rate of 1 % (Bonferroni,
 * 1/2400 each). Seeds are fixed. In its own group because it takes minutes.
 */
@Tag("calibration")
class CalibrationAtSizeTest {
    private static final int STOCKS = Integer.getInteger("calibration.stocks", 400);
    private static final int BINS = 10;
    private static final double LEVEL = 0.01 / 24;
    private static final double POINTS = STOCKS >= 1000 ? 2.5 : 4;

    @ParameterizedTest
    @EnumSource
    void theTruthIsOneOfTheDraws(Regime regime) {
        Calibration calibration = Calibration.of(regime, STOCKS);
        System.out.println(regime + ": " + calibration);
        for (int q = 0; q < Calibration.QUANTITIES.length; q++) {
            assertThat(100.0 * calibration.covered(q) / STOCKS)
                    .as("%% of %d stocks whose 90 %% interval covers %s", STOCKS, Calibration.QUANTITIES[q])
                    .isBetween(90 - POINTS, 90 + POINTS);
            assertThat(calibration.chiSquare(q, BINS))
                    .as("ranks of %s", Calibration.QUANTITIES[q])
                    .isLessThan(Calibration.chiSquareBound(BINS, LEVEL));
        }
    }
}
