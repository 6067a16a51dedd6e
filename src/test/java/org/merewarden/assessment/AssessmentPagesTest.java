package org.merewarden.assessment;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.nio.charset.StandardCharsets;
import java.util.Collections;
import java.util.Map;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Assessor;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Posterior;
import org.merewarden.records.EvidenceReader;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;

/** The assessment page and the lake's yield, over assessments of which the test knows the numbers. */
@WholeApplication
class AssessmentPagesTest {
    private static int lakes;

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private EvidenceReader reader;

    @Autowired
    private Assessor assessor;

    @Autowired
    private AssessmentStore store;

    private String lake;
    private long perch;
    private long roach;

    @BeforeEach
    void oneLake() {
        TestRegion region = new TestRegion(jdbc);
        lake = "diag-" + ++lakes;
        long water = region.lake(lake, "Diagmere " + lakes);
        perch = region.stock(water, "FPE");
        roach = region.stock(water, "FRO");
        region.catches(perch, 2015, Collections.nCopies(10, 3.0));
    }

    private String page(String address) throws Exception {
        return mvc.perform(get(address).with(user("b").roles("BIOLOGIST")))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString(StandardCharsets.UTF_8);
    }

    private void assess(long stock, Long job, Diagnostics diagnostics) {
        Evidence evidence = reader.evidence(stock);
        Posterior posterior = assessor.assess(evidence, 2024, 1);
        store.add(stock, job, "test", evidence, MadeDiagnostics.with(posterior, diagnostics), Map.of());
    }

    @Test
    void anAssessmentShowsWhatWasLearnedHowItIsMetAndWhatWouldHelp() throws Exception {
        assess(perch, null, MadeDiagnostics.typical());
        String html = page("/stocks/" + lake + "/FPE/assessments/1");
        assertThat(html)
                .contains("to about a third of what was thought before")
                .contains("next to nothing (95%)")
                .contains("class=\"after\"")
                .contains("Ryder 1965, exact units")
                .contains("Standardised residuals of nets through the seasons")
                .contains("it foresees this series")
                .contains("MSY leans on nets")
                .contains("Biomass over BMSY with the last seasons taken away one by one")
                .contains("12% higher on average")
                .contains("by about 18%")
                .contains("7.5 (7.5–7.5)")
                .contains("1.2376")
                .contains("Downing et al.")
                .doesNotContain("??")
                .doesNotContain("style=\"")
                .doesNotContain("NaN");
    }

    @Test
    void anAssessmentWithoutDiagnosticsSaysSo() throws Exception {
        assess(perch, null, Diagnostics.NONE);
        assertThat(page("/stocks/" + lake + "/FPE/assessments/1"))
                .contains("was not computed for this assessment")
                .contains("Where each starting value comes from")
                .contains("By season")
                .doesNotContain("How the records are met")
                .doesNotContain("What would help most")
                .doesNotContain("??");
    }

    @Test
    void aLakeOnlyStockIsCalledAnExpectation() throws Exception {
        assess(roach, null, Diagnostics.NONE);
        assertThat(page("/stocks/" + lake + "/FRO/assessments/1"))
                .contains("an expectation, not an assessment")
                .contains("the results are what was thought before")
                .contains("Schlesinger &amp; Regier 1982");
    }

    @Test
    void whereNothingIsRecordedTheMethodItselfSaysThatNothingIsLearned() throws Exception {
        Evidence evidence = reader.evidence(roach);
        store.add(roach, null, "test", evidence, assessor.assess(evidence, 2024, 1), Map.of());
        assertThat(page("/stocks/" + lake + "/FRO/assessments/1"))
                .contains("an expectation, not an assessment")
                .contains("The records taught next to nothing")
                .doesNotContain("??");
    }

    @Test
    void theLakesPageSetsTheStocksSumBesideTheFormulas() throws Exception {
        assertThat(page("/water-bodies/" + lake)).contains("2 stocks have no result yet");
        assess(perch, null, Diagnostics.NONE);
        assess(roach, null, Diagnostics.NONE);
        double sum = store.latest(perch).orElseThrow().msyTonnes()
                + store.latest(roach).orElseThrow().msyTonnes();
        String html = page("/water-bodies/" + lake);
        // by hand, 120 mg/L over 8 m on 1,000 ha at 7 °C: 1.2376 √15 = 4.793; 10^(0.35 + 0.28 · 1.17609 + 0.236) =
        // 8.228
        assertThat(html)
                .contains("<td class=\"number\" data-label=\"kg/ha a year\">4.79</td>")
                .contains("<td class=\"number\" data-label=\"kg/ha a year\">8.23</td>")
                .contains("The MSY of the 2 assessed stocks adds up to about")
                .contains("The share of these stocks, 100%, would be about 6.28\u00a0t.")
                .contains("50%, equal shares, for want of a stated one")
                .contains("none: from the lake alone")
                .contains("One stock rests on the lake alone")
                .contains("1.2376")
                .contains("Downing et al.")
                .doesNotContain("??");
        assertThat(sum).isPositive();
    }
}
