package org.merewarden.core.inference;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;
import static org.assertj.core.data.Percentage.withPercentage;

import java.util.Arrays;
import org.junit.jupiter.api.Test;
import org.merewarden.core.inference.EffortYieldRegression.Line;

class EffortYieldRegressionTest {
    private static double[] column(String file, int j) {
        return Arrays.stream(Reference.rows(file)).mapToDouble(row -> row[j]).toArray();
    }

    /** Cadima 2003, FAO Fisheries Technical Paper 393, sec. 8.19: a, b, r² published; MSY and effort computed. */
    @Test
    void arabianSeaShrimp() {
        double[] catches = column("series_arabian_sea_shrimp.csv", 1);
        double[] effort = column("series_arabian_sea_shrimp.csv", 2);

        Line schaefer = EffortYieldRegression.schaefer(catches, effort).orElseThrow();
        assertThat(schaefer.a()).isEqualTo(444.454, offset(5e-4));
        assertThat(schaefer.b()).isEqualTo(-8.055, offset(5e-4));
        assertThat(schaefer.rSquared()).isEqualTo(0.77, offset(5e-3));
        assertThat(schaefer.msy().getAsDouble()).isEqualTo(6130.92, offset(5e-3));
        assertThat(schaefer.effortAtMsy().getAsDouble()).isEqualTo(27.5886, offset(5e-5));

        Line fox = EffortYieldRegression.fox(catches, effort).orElseThrow();
        assertThat(fox.a()).isEqualTo(6.150, offset(5e-4));
        assertThat(fox.b()).isEqualTo(-0.028, offset(5e-4));
        assertThat(fox.rSquared()).isEqualTo(0.78, offset(5e-3));
        assertThat(fox.msy().getAsDouble()).isEqualTo(6159.16, offset(5e-3));
        assertThat(fox.effortAtMsy().getAsDouble()).isEqualTo(35.7210, offset(5e-5));
    }

    /** Sparre &amp; Venema 1998, FAO Fisheries Technical Paper 306/1, ch. 9: data recalled; 1 % against the book. */
    @Test
    void javaTrawl() {
        double[] catches = column("series_java_trawl.csv", 1);
        double[] effort = column("series_java_trawl.csv", 2);

        Line schaefer = EffortYieldRegression.schaefer(catches, effort).orElseThrow();
        assertThat(schaefer.msy().getAsDouble()).isCloseTo(66.02, withPercentage(1));
        assertThat(schaefer.effortAtMsy().getAsDouble()).isCloseTo(1241.2, withPercentage(1));
        Line fox = EffortYieldRegression.fox(catches, effort).orElseThrow();
        assertThat(fox.msy().getAsDouble()).isCloseTo(60.94, withPercentage(1));
        assertThat(fox.effortAtMsy().getAsDouble()).isCloseTo(1273.7, withPercentage(1));
    }

    /** First-order errors against the same function of (a, b) differentiated numerically, covariance worked out here. */
    @Test
    void errorsOfMsyAndEffort() {
        double[] effort = {1, 2, 4, 7, 9};
        double[] perUnit = {9.2, 8.1, 5.8, 3.4, 0.9};
        double[] catches = new double[5];
        double mean = 0;
        for (int i = 0; i < 5; i++) {
            catches[i] = perUnit[i] * effort[i];
            mean += effort[i] / 5;
        }
        Line line = EffortYieldRegression.schaefer(catches, effort).orElseThrow();
        double varA = line.aError() * line.aError();
        double varB = line.bError() * line.bError();
        double h = 1e-6;
        double dMsyA = (msy(line.a() + h, line.b()) - msy(line.a() - h, line.b())) / (2 * h);
        double dMsyB = (msy(line.a(), line.b() + h) - msy(line.a(), line.b() - h)) / (2 * h);
        double variance = dMsyA * dMsyA * varA + dMsyB * dMsyB * varB - 2 * dMsyA * dMsyB * mean * varB;
        assertThat(line.msyError().getAsDouble()).isCloseTo(Math.sqrt(variance), withPercentage(1e-3));
        assertThat(line.effortAtMsyError().getAsDouble()).isPositive();
    }

    private static double msy(double a, double b) {
        return -a * a / (4 * b);
    }

    @Test
    void aRisingLineHasNoMsy() {
        Line line = EffortYieldRegression.schaefer(new double[] {1, 4, 9}, new double[] {1, 2, 3})
                .orElseThrow();
        assertThat(line.b()).isEqualTo(1, offset(1e-12));
        assertThat(line.msy()).isEmpty();
        assertThat(line.effortAtMsyError()).isEmpty();
    }

    @Test
    void tooFewOrConstantEffortsGiveNoLine() {
        double[] catches = {1, 2, 3};
        assertThat(EffortYieldRegression.schaefer(new double[] {1, 0, 3}, new double[] {1, 2, 0}))
                .isEmpty();
        assertThat(EffortYieldRegression.fox(catches, new double[] {2, 2, 2})).isEmpty();
    }
}
