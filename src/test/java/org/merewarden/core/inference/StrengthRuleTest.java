package org.merewarden.core.inference;

import static org.assertj.core.api.Assertions.assertThat;

import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/** The written rule at its edges: each line misses STRONG or FAIR by one condition. */
class StrengthRuleTest {
    @ParameterizedTest
    @CsvSource({
        "true,  true,  15, 2.0, 0.30, 0.20, 0.05, STRONG",
        "false, true,  15, 2.0, 0.30, 0.20, 0.05, THIN",
        "true,  false, 15, 2.0, 0.30, 0.20, 0.05, FAIR",
        "true,  true,  14, 2.0, 0.30, 0.20, 0.05, FAIR",
        "true,  true,  15, 1.9, 0.30, 0.20, 0.05, FAIR",
        "true,  true,  15, 2.0, 0.31, 0.20, 0.05, FAIR",
        "true,  true,  15, 2.0, 0.30, 0.21, 0.05, FAIR",
        "true,  true,  15, 2.0, 0.30, 0.20, 0.06, FAIR",
        "true,  false,  8, 1.4, 0.50, 0.40, 0.25, FAIR",
        "true,  true,   7, 1.4, 0.50, 0.40, 0.25, THIN",
        "true,  true,   8, 1.3, 0.50, 0.40, 0.25, THIN",
        "true,  true,   8, 1.4, 0.51, 0.40, 0.25, THIN",
        "true,  true,   8, 1.4, 0.50, 0.41, 0.25, THIN",
        "true,  true,   8, 1.4, 0.50, 0.40, 0.26, THIN"
    })
    void followsTheWrittenRule(
            boolean settled,
            boolean survey,
            int seasons,
            double contrast,
            double sigma,
            double spread,
            double edge,
            EvidenceStrength expected) {
        assertThat(StrengthRule.of(settled, survey, seasons, contrast, sigma, spread, edge))
                .isEqualTo(expected);
    }
}
