package org.merewarden.command;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.Test;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Verdict;

/** Three draws of a logistic stock, MSY 60, 100 and 110 t, FMSY 0.2 per year: BMSY 300, 500, 550 t. Worked by hand. */
class QuantitiesTest {
    private static final double[][] BIOMASS = {{400, 290}, {500, 260}, {600, 230}};
    private static final double[][] REMOVALS = {{70}, {75}, {85}};

    private static Posterior posterior(double[][] removals) {
        return new Posterior(
                "test",
                2025,
                new double[] {60, 100, 110},
                new double[] {0.2, 0.2, 0.2},
                new double[] {1, 1, 1},
                BIOMASS,
                new double[][] {{0.1}, {0.2}, {0.3}},
                removals,
                Map.of(
                        "process_sd", new double[] {0.1, 0.1, 0.1},
                        "catchability:nets", new double[] {1, 1, 1},
                        "observation_sd:nets", new double[] {0.2, 0.3, 0.4}),
                Map.of("log_evidence", -12.5),
                EvidenceStrength.FAIR,
                new Verdict(true, List.of()),
                Diagnostics.NONE);
    }

    private static Line line(List<Line> lines, String quantity, Integer year) {
        return lines.stream()
                .filter(l -> l.quantity().equals(quantity) && java.util.Objects.equals(l.year(), year))
                .findFirst()
                .orElseThrow();
    }

    @Test
    void everyQuantityHasItsLineInTheDescribedOrder() {
        List<Line> lines = Quantities.of(posterior(REMOVALS));
        assertThat(lines.stream().map(l -> l.quantity() + (l.year() == null ? "" : " " + l.year())))
                .containsExactly(
                        "msy_t",
                        "fmsy",
                        "k_t",
                        "bmsy_t",
                        "biomass_t 2025",
                        "biomass_t 2026",
                        "b_over_bmsy 2025",
                        "b_over_bmsy 2026",
                        "f 2025",
                        "f_over_fmsy 2025",
                        "catch_t 2025",
                        "process_sd",
                        "observation_sd:nets",
                        "shape",
                        "fold_margin 2025",
                        "tipping_biomass_t 2025",
                        "collapse_course 2025",
                        "log_evidence");
    }

    @Test
    void drawsBecomeMeanDeviationAndQuantiles() {
        List<Line> lines = Quantities.of(posterior(REMOVALS));
        // mean 90, deviations −30, 10, 20: sd √(1400/2); type 7: h = 2p, so q05 = 60 + 0.1·40, q90 = 100 + 0.8·10
        assertThat(line(lines, "msy_t", null).numbers())
                .containsExactly(new double[] {90, Math.sqrt(700), 64, 68, 80, 100, 105, 108, 109}, within(1e-12));
        assertThat(line(lines, "k_t", null).quantile(0.5)).isCloseTo(1000, within(1e-9));
        assertThat(line(lines, "b_over_bmsy", 2026).quantile(0.5)).isCloseTo(260.0 / 500, within(1e-12));
        assertThat(line(lines, "f_over_fmsy", 2025).quantile(0.5)).isCloseTo(1, within(1e-12));
        assertThat(line(lines, "catch_t", 2025).quantile(0.5)).isEqualTo(75);
        assertThat(line(lines, "log_evidence", null).numbers()).containsExactly(-12.5);
    }

    @Test
    void theMedianOfTheEstimatedRemovalsIsHeldForEver() {
        List<Line> lines = Quantities.of(posterior(REMOVALS));
        assertThat(line(lines, "fold_margin", 2025).quantile(0.5)).isCloseTo(0.25, within(1e-12));
        assertThat(line(lines, "fold_margin", 2025).numbers()[0])
                .isCloseTo((-0.25 + 0.25 + 35.0 / 110) / 3, within(1e-12));
        // B− = K (1/2 − √(1/4 − H/(rK))): 250 of 1,000 t (reference/SOURCES.md), 550 − √(550² − 550·75/0.2) of 1,100 t;
        // none for MSY 60 t
        double upper = 550 - Math.sqrt(550.0 * 550 - 550 * 75 / 0.2);
        assertThat(line(lines, "tipping_biomass_t", 2025).numbers()[0]).isCloseTo((250 + upper) / 2, within(1e-9));
        // above MSY; above the tipping biomass; 230 t of 240 t
        assertThat(upper).isGreaterThan(230);
        assertThat(line(lines, "collapse_course", 2025).numbers()).containsExactly(2.0 / 3);
    }

    @Test
    void withoutEstimatedRemovalsNothingIsHeld() {
        List<Line> none = Quantities.of(posterior(new double[3][0]));
        assertThat(none).noneMatch(l -> l.quantity().equals("catch_t"));
        assertThat(line(none, "fold_margin", 2025).quantile(0.5)).isEqualTo(1);
        assertThat(line(none, "tipping_biomass_t", 2025).numbers()).isEmpty();
        assertThat(line(none, "collapse_course", 2025).numbers()).containsExactly(0);
    }

    @Test
    void aTippingBiomassThatFewDrawsHaveIsLeftEmpty() {
        List<Line> lines = Quantities.of(posterior(new double[][] {{105}, {105}, {105}}));
        assertThat(line(lines, "tipping_biomass_t", 2025).numbers()).isEmpty();
    }

    @Test
    void withoutDrawsTheHeadlinesStandEmpty() {
        Posterior nothing = new Posterior(
                "test",
                2026,
                new double[0],
                new double[0],
                new double[0],
                new double[0][],
                new double[0][],
                Map.of(),
                EvidenceStrength.NONE,
                new Verdict(false, List.of("stocked only")));
        List<Line> lines = Quantities.of(nothing);
        assertThat(lines.stream().map(Line::quantity))
                .containsExactly(
                        "msy_t",
                        "fmsy",
                        "k_t",
                        "bmsy_t",
                        "biomass_t",
                        "b_over_bmsy",
                        "fold_margin",
                        "tipping_biomass_t",
                        "collapse_course",
                        "log_evidence");
        assertThat(lines).allMatch(l -> l.numbers().length == 0);
        assertThat(line(lines, "biomass_t", 2026)).isNotNull();
        assertThat(line(lines, "fold_margin", 2025)).isNotNull();
    }
}
