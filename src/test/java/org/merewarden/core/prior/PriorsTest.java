package org.merewarden.core.prior;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.data.Offset.offset;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.Traits;

class PriorsTest {
    private static final Traits UNKNOWN = new Traits("FPP", false, null, null, null, null, null);
    private static final Habitat DRY = new Habitat("lake", 1000, null, null, null, null, 4);

    private static Evidence evidence(Habitat habitat, Traits traits, List<CatchRecord> catches, PriorRecord... own) {
        return new Evidence(habitat, traits, catches, List.of(), List.of(), List.of(), List.of(), List.of(own));
    }

    private static Habitat lake(Double depth, Double solids, Double conductivity, Double temperature, int stocks) {
        return new Habitat("lake", 2000, depth, solids, conductivity, temperature, stocks);
    }

    @Test
    void msyIsTheLakesYieldTimesTheStatedShare() {
        Traits traits = new Traits("FPP", false, null, null, null, null, 0.25);
        Prior msy = Priors.forStock(evidence(lake(4.0, 100.0, null, null, 5), traits, List.of()))
                .msy();
        // 1.2376 √25 = 6.188 kg/ha; × 2000 ha = 12.376 t; × 0.25
        assertThat(msy.median()).isEqualTo(3.094, offset(1e-9));
        assertThat(msy.logSd()).isEqualTo(Math.hypot(0.8, 0.3), offset(1e-12));
        assertThat(msy.source()).contains("Ryder 1965");
        assertThat(msy.reason()).contains("as stated");
    }

    @Test
    void withoutAStatedShareTheStocksShareEquallyAndWidely() {
        Prior msy = Priors.forStock(evidence(lake(4.0, 100.0, null, null, 4), UNKNOWN, List.of()))
                .msy();
        assertThat(msy.median()).isEqualTo(3.094, offset(1e-9));
        assertThat(msy.logSd()).isEqualTo(Math.hypot(0.8, 0.7), offset(1e-12));
        assertThat(msy.reason()).contains("equal shares");
    }

    @Test
    void withoutAStatedShareTheRecordedCatchTellsIt() {
        Habitat lake = new Habitat("lake", 2000, 4.0, 100.0, null, null, 4, 0.6);
        Prior msy = Priors.forStock(evidence(lake, UNKNOWN, List.of())).msy();
        assertThat(msy.median()).isEqualTo(12.376 * 0.6, offset(1e-9));
        assertThat(msy.logSd()).isEqualTo(Math.hypot(0.8, 0.5), offset(1e-12));
        assertThat(msy.reason()).contains("share of the recorded catch");
    }

    @Test
    void severalFormulasWidenAndNeverNarrow() {
        Prior one = Priors.forStock(evidence(lake(4.0, 100.0, null, null, 1), UNKNOWN, List.of()))
                .msy();
        Prior two = Priors.forStock(evidence(lake(4.0, 100.0, null, 6.0, 1), UNKNOWN, List.of()))
                .msy();
        assertThat(two.source()).contains("Ryder").contains("Schlesinger");
        assertThat(two.logSd()).isGreaterThan(one.logSd());
        double ryder = LakeYield.ryder(100, 4) * 2;
        double warm = LakeYield.schlesingerRegier(6, 100, 4) * 2;
        assertThat(two.median()).isEqualTo(Math.sqrt(ryder * warm), offset(1e-9));
    }

    @Test
    void africanFormulasOnlyInWarmWater() {
        Prior warm = Priors.forStock(evidence(lake(4.0, null, 200.0, 25.0, 1), UNKNOWN, List.of()))
                .msy();
        assertThat(warm.source()).contains("Henderson").contains("Crul").doesNotContain("Ryder");
        Prior cold = Priors.forStock(evidence(lake(4.0, null, 200.0, 5.0, 1), UNKNOWN, List.of()))
                .msy();
        assertThat(cold.source())
                .doesNotContain("Henderson")
                .doesNotContain("Crul")
                .contains("Ryder");
    }

    @Test
    void outsideItsRangeAFormulaIsWidenedAndSaysSo() {
        Prior outside = Priors.forStock(evidence(lake(1.0, 500.0, null, null, 1), UNKNOWN, List.of()))
                .msy();
        assertThat(outside.validity()).contains("this lake is outside");
        assertThat(outside.logSd()).isGreaterThan(1.2);
    }

    @Test
    void withoutLimnologyAWidePriorAroundTheLargerCatches() {
        List<CatchRecord> catches = List.of(
                new CatchRecord(2001, "commercial", 2, null, 1),
                new CatchRecord(2001, "angling", 1, null, 0.5),
                new CatchRecord(2002, "commercial", 9, null, 1),
                new CatchRecord(2003, "commercial", 5, null, 1));
        Prior msy = Priors.forStock(evidence(DRY, UNKNOWN, catches)).msy();
        assertThat(msy.median()).isEqualTo(9);
        assertThat(msy.logSd()).isEqualTo(0.8);
        assertThat(msy.reason()).contains("Nothing is known of the lake's water");
    }

    @Test
    void withNothingAtAllStillAPriorThatSaysSo() {
        Priors priors = Priors.forStock(evidence(DRY, UNKNOWN, List.of()));
        assertThat(priors.msy().median()).isEqualTo(1.25, offset(1e-12));
        assertThat(priors.msy().logSd()).isEqualTo(1.5);
        assertThat(priors.msy().reason()).contains("little more than a guess");
        assertThat(priors.fmsy().reason()).startsWith("Nothing is known");
        assertThat(priors.initialFraction().median()).isEqualTo(0.8);
        assertThat(priors.initialFraction().logSd()).isEqualTo(0.3);
    }

    @Test
    void fmsyFromAgeThenGrowthThenClass() {
        Traits aged = new Traits("FPP", false, "slow", 10.0, 0.2, 50.0, null);
        Traits grown = new Traits("FPP", false, "slow", null, 0.2, 50.0, null);
        Traits judged = new Traits("FPP", false, "slow", null, null, null, null);
        assertThat(Priors.forStock(evidence(DRY, aged, List.of())).fmsy().median())
                .isEqualTo(0.87 * 0.594439, offset(1e-6));
        assertThat(Priors.forStock(evidence(DRY, grown, List.of())).fmsy().median())
                .isEqualTo(0.87 * 0.349766, offset(1e-6));
        assertThat(Priors.forStock(evidence(lake(null, null, null, 12.0, 1), grown, List.of()))
                        .fmsy()
                        .median())
                .isEqualTo(0.87 * Math.sqrt(0.349766 * 0.364875), offset(1e-6));
        assertThat(Priors.forStock(evidence(DRY, judged, List.of())).fmsy().median())
                .isEqualTo(Math.sqrt(0.05 * 0.5) / 2, offset(1e-12));
    }

    @Test
    void theOfficesStatementsComeFirstWithTheirReason() {
        Traits aged = new Traits("FPP", false, null, 10.0, null, null, null);
        Priors priors = Priors.forStock(evidence(
                lake(4.0, 100.0, null, 6.0, 2),
                aged,
                List.of(),
                new PriorRecord("msy_t", "", 7, 0.2, "Yield of the twin lake"),
                new PriorRecord("fmsy", "", 0.3, 0, null),
                new PriorRecord("biomass_fraction_at_start", "", 0.4, 0.1, "Fished since 1950")));
        assertThat(priors.msy())
                .isEqualTo(new Prior("msy_t", 7, 0.2, "stated by the office", "Yield of the twin lake", ""));
        assertThat(priors.fmsy().median()).isEqualTo(0.3);
        assertThat(priors.fmsy().reason()).isEqualTo("No reason was given.");
        assertThat(priors.initialFraction().median()).isEqualTo(0.4);
    }

    @Test
    void aPriorNeedsAPositiveMedian() {
        assertThatThrownBy(() -> new Prior("msy_t", 0, 1, "", "", ""))
                .hasMessage("needs 0 < median < infinity, got 0.0");
    }
}
