package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.stream.IntStream;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.merewarden.core.inference.statespace.Simulated.Regime;

/**
 * Simulation-based calibration at size: 400 stocks per regime, or as many as the system property {@code
 * calibration.stocks} says.
 *
 * <p>90 % intervals cover 90 ± 4 points of the stocks. A regime with a quantity outside is judged by 1,000 stocks instead,
 * the first 400 among them, at 90 ± 2.5 points: more stocks, never other ones. An exact engine leaves ± 4 points at 400
 * with probability 0.006, both bounds with 0.001; somewhere among the 24 coverages in 2.4 of 100 choices of seeds
 * (simulated binomials). The ranks pass a chi-square test of ten bins, jointly with a false-alarm rate of 1 % (Bonferroni,
 * 1/2400 each). Seeds are fixed. In its own group because it takes minutes.
 */
@Tag("calibration")
class CalibrationAtSizeTest {
    private static final int STOCKS = Integer.getInteger("calibration.stocks", 400);
    private static final int MORE = 1000;
    private static final int BINS = 10;
    private static final double LEVEL = 0.01 / 24;

    @ParameterizedTest
    @EnumSource
    void theTruthIsOneOfTheDraws(Regime regime) {
        Calibration calibration = Calibration.of(regime, STOCKS);
        System.out.println(regime + ": " + calibration);
        if (STOCKS < MORE && !within(calibration, 4)) {
            calibration = Calibration.of(regime, MORE);
            System.out.println(regime + ", run on to " + MORE + ": " + calibration);
        }
        double points = calibration.stocks() < MORE ? 4 : 2.5;
        for (int q = 0; q < Calibration.QUANTITIES.length; q++) {
            assertThat(calibration.coverage(q))
                    .as(
                            "%% of %d stocks whose 90 %% interval covers %s",
                            calibration.stocks(), Calibration.QUANTITIES[q])
                    .isBetween(90 - points, 90 + points);
            assertThat(calibration.chiSquare(q, BINS))
                    .as("ranks of %s", Calibration.QUANTITIES[q])
                    .isLessThan(Calibration.chiSquareBound(BINS, LEVEL));
        }
    }

    private static boolean within(Calibration calibration, double points) {
        return IntStream.range(0, Calibration.QUANTITIES.length)
                .allMatch(q -> Math.abs(calibration.coverage(q) - 90) <= points);
    }
}
