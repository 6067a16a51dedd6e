package org.merewarden.assessment;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayOutputStream;
import java.io.DataOutputStream;
import java.io.IOException;
import java.util.List;
import java.util.Map;
import java.util.zip.DeflaterOutputStream;
import org.junit.jupiter.api.Test;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Verdict;

class DrawsCodecTest {
    @Test
    void whatIsWrittenIsReadBack() {
        var posterior = new Posterior(
                "a method",
                2001,
                new double[] {12.3, 14},
                new double[] {0.2, 0.3},
                new double[] {1, 0},
                new double[][] {{50, 40, 30.5f}, {60, 55, 45}},
                new double[][] {{0.25, 0.5}, {0.125, 0}},
                new double[][] {{10, 12}, {9.5, 0}},
                Map.of("process_sd", new double[] {0.11, 0.09}, "observation_sd:nets", new double[] {0.2, 0.3}),
                Map.of(),
                EvidenceStrength.FAIR,
                new Verdict(true, List.of()),
                Diagnostics.NONE);

        DrawsCodec.Draws read = DrawsCodec.decode(DrawsCodec.encode(posterior));

        assertThat(read.msy()).containsExactly(12.3, 14);
        assertThat(read.fmsy()).containsExactly(0.2, 0.3);
        assertThat(read.shape()).containsExactly(1, 0);
        assertThat(read.biomass()).isDeepEqualTo(posterior.biomassTonnes());
        assertThat(read.fishing()).isDeepEqualTo(posterior.fishingPerYear());
        assertThat(read.removals()).isDeepEqualTo(posterior.removalsTonnes());
        assertThat(read.parameters()).containsOnlyKeys("process_sd", "observation_sd:nets");
        assertThat(read.parameters().get("process_sd")).containsExactly(0.11, 0.09);
        assertThat(read.parameters().get("observation_sd:nets")).containsExactly(0.2, 0.3);
    }

    /** The bytes are laid out by hand as the first format had them: stores of earlier versions hold such. */
    @Test
    void theFirstFormatIsStillRead() throws IOException {
        var bytes = new ByteArrayOutputStream();
        try (var out = new DataOutputStream(new DeflaterOutputStream(bytes))) {
            out.writeInt(1);
            out.writeInt(1);
            out.writeInt(1);
            for (double value : new double[] {12, 0.2, 1}) {
                out.writeDouble(value);
            }
            for (float value : new float[] {50, 40, 0.25f}) {
                out.writeFloat(value);
            }
        }

        DrawsCodec.Draws read = DrawsCodec.decode(bytes.toByteArray());

        assertThat(read.msy()).containsExactly(12);
        assertThat(read.biomass()[0]).containsExactly(50, 40);
        assertThat(read.fishing()[0]).containsExactly(0.25);
        assertThat(read.removals()[0]).isEmpty();
        assertThat(read.parameters()).isEmpty();
    }
}
