package org.merewarden.core.prior;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;
import static org.assertj.core.data.Percentage.withPercentage;

import org.junit.jupiter.api.Test;

/** Formulas against their sources; firmness (published, recalled, computed) as held in the reference collection. */
class FormulasTest {
    /** lb/acre with ppm and ft, the source's own units; 1 lb = 0.45359237 kg, 1 acre = 0.40468564224 ha, 1 ft = 0.3048 m. */
    @Test
    void ryder1965InItsOwnUnits() {
        double solids = 100;
        double depthFeet = 25;
        double poundsPerAcre = 2 * Math.sqrt(solids / depthFeet); // recalled, sure
        double kilogramsPerHectare = poundsPerAcre * 0.45359237 / 0.40468564224;
        assertThat(LakeYield.ryder(solids, depthFeet * 0.3048)).isCloseTo(kilogramsPerHectare, withPercentage(0.005));
    }

    /** Recalled: the metric form lies 22 % below the exact conversion. */
    @Test
    void ryderMetricIs22PercentLower() {
        assertThat(LakeYield.ryderMetric(100, 4)).isEqualTo(4.83, offset(1e-9));
        assertThat(LakeYield.ryderMetric(70, 3) / LakeYield.ryder(70, 3)).isEqualTo(0.78, offset(0.005));
    }

    /** Published coefficients: an index of 10 gives 42.058 kg/ha. */
    @Test
    void hendersonWelcomme1974() {
        assertThat(LakeYield.hendersonWelcomme(100, 10)).isEqualTo(42.058, offset(5e-4));
    }

    /** Recalled, fairly sure; worked by hand: 10 °C, index 10 → log10 Y = 0.5 + 0.28 + 0.236 = 1.016. */
    @Test
    void schlesingerRegier1982() {
        assertThat(Math.log10(LakeYield.schlesingerRegier(10, 100, 10))).isEqualTo(1.016, offset(1e-12));
    }

    /** Recalled, moderate; worked by hand: 100 km² lake 8.93 · 10^1.84, reservoir 7.09 · 10^1.88. */
    @Test
    void crul1992InSquareKilometres() {
        assertThat(LakeYield.crulLakes(1)).isEqualTo(8.93);
        assertThat(LakeYield.crulReservoirs(1)).isEqualTo(7.09);
        assertThat(LakeYield.crulLakes(100)).isEqualTo(8.93 * Math.pow(10, 1.84), offset(1e-9));
        assertThat(LakeYield.crulReservoirs(100)).isEqualTo(7.09 * Math.pow(10, 1.88), offset(1e-9));
    }

    /** Then et al. 2015: published formulas; maximum age 10 → 0.594439; K 0.2, L∞ 50 cm → 0.349766. */
    @Test
    void then2015() {
        assertThat(NaturalMortality.fromMaximumAge(10)).isEqualTo(0.594439, offset(5e-7));
        assertThat(NaturalMortality.fromGrowth(0.2, 50)).isEqualTo(0.349766, offset(5e-7));
    }

    /** Pauly 1980, recalled, sure: 50 cm, 0.2, 12 °C → 0.364875. */
    @Test
    void pauly1980() {
        assertThat(NaturalMortality.pauly(0.2, 50, 12)).isEqualTo(0.364875, offset(5e-7));
    }

    /** Zhou et al. 2012, published. */
    @Test
    void zhou2012() {
        assertThat(FishingAtMsy.bonyFish(0.5)).isEqualTo(0.435, offset(1e-12));
        assertThat(FishingAtMsy.cartilaginousFish(0.5)).isEqualTo(0.205, offset(1e-12));
    }

    /** Ranges of Froese et al. 2017, recalled, sure. */
    @Test
    void productivityClasses() {
        ProductivityClass slow = ProductivityClass.named("slow").orElseThrow();
        assertThat(slow.lowR()).isEqualTo(0.05);
        assertThat(slow.highR()).isEqualTo(0.5);
        assertThat(slow.medianR() * Math.exp(1.645 * slow.logSd())).isEqualTo(0.5, offset(1e-12));
        assertThat(ProductivityClass.named("fast").orElseThrow().highR()).isEqualTo(1.5);
        assertThat(ProductivityClass.named("moderate").orElseThrow().lowR()).isEqualTo(0.2);
        assertThat(ProductivityClass.named("very slow").orElseThrow().lowR()).isEqualTo(0.015);
        assertThat(ProductivityClass.named(null)).isEmpty();
    }
}
