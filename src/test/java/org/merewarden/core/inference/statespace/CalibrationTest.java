package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;

import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.merewarden.core.inference.statespace.Simulated.Regime;

/**
 * Simulation-based calibration in small, 60 stocks per regime; {@link CalibrationAtSizeTest} is the one that shows small
 * errors. Coverage by the binomial distribution, ranks in six bins by chi-square. Joint false-alarm rate 1 % over six
 * regimes, four quantities and two tests (Bonferroni, 1/4800 each).
 */
class CalibrationTest {
    private static final int STOCKS = 60;
    private static final int BINS = 6;
    private static final double LEVEL = 0.01 / 48;

    @ParameterizedTest
    @EnumSource
    void theTruthIsOneOfTheDraws(Regime regime) {
        Calibration calibration = Calibration.of(regime, STOCKS);
        int[] bounds = calibration.bounds(LEVEL);
        for (int q = 0; q < Calibration.QUANTITIES.length; q++) {
            assertThat(calibration.covered(q))
                    .as("stocks of %d whose 90 %% interval covers %s", STOCKS, Calibration.QUANTITIES[q])
                    .isBetween(bounds[0], bounds[1]);
            assertThat(calibration.chiSquare(q, BINS))
                    .as("ranks of %s", Calibration.QUANTITIES[q])
                    .isLessThan(Calibration.chiSquareBound(BINS, LEVEL));
        }
    }
}
