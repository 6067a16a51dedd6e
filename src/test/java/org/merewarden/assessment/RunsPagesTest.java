package org.merewarden.assessment;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.nio.charset.StandardCharsets;
import java.util.Collections;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Assessor;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Verdict;
import org.merewarden.records.EvidenceReader;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;

/** The page of the runs. */
@WholeApplication
class RunsPagesTest {
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
        lake = "watched-" + ++lakes;
        long water = region.lake(lake, "Watchmere " + lakes);
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

    private long job(String state, String payload) {
        jdbc.sql("insert into job (kind, subject, payload, state, progress_done, progress_total, requested_by,"
                        + " requested_at) values ('assess', 'Watchmere', ?, ?, 1, 3, 'ines', current_timestamp)")
                .params(payload, state)
                .update();
        return jdbc.sql("select max(id) from job").query(Long.class).single();
    }

    @Test
    void aRunSaysWhatBecameOfEachStock() throws Exception {
        long run = job("DONE", perch + "," + roach);
        Evidence evidence = reader.evidence(perch);
        Posterior p = assessor.assess(evidence, 2024, 1);
        Posterior unsettled = new Posterior(
                p.method(),
                p.firstYear(),
                p.msyTonnes(),
                p.fmsyPerYear(),
                p.shape(),
                p.biomassTonnes(),
                p.fishingPerYear(),
                p.estimates(),
                p.strength(),
                new Verdict(false, List.of("Too few draws agree.")));
        store.add(perch, run, "ines", evidence, unsettled, Map.of());
        String html = page("/assessments?run=" + run);
        assertThat(html)
                .contains("None has settled, one has not, one failed and is in the log.")
                .contains("href=\"/stocks/" + lake + "/FPE/assessments/1\"")
                .contains("Too few draws agree.")
                .contains("failed unexpectedly")
                .doesNotContain("??");
        jdbc.sql("update job set state = 'CANCELLED' where id = ?").param(run).update();
        assertThat(page("/assessments?run=" + run)).contains("one has not, one was not reached.");
    }

    @Test
    void aRunUnderWayCanBeWatchedWithAndWithoutScripts() throws Exception {
        long run = job("RUNNING", perch + "," + roach);
        try {
            assertThat(page("/assessments"))
                    .contains("None has settled, 2 still wait.")
                    .contains("data-active=\"true\"")
                    .contains("/js/progress.js")
                    .contains("Show progress")
                    .contains("action=\"/assessments/" + run + "/cancel\"");
        } finally {
            jdbc.sql("update job set state = 'DONE' where id = ?").param(run).update();
        }
    }

    @Test
    void aRunThatNobodyAskedForIsNotFound() throws Exception {
        job("DONE", "");
        mvc.perform(get("/assessments?run=999999").with(user("b").roles("BIOLOGIST")))
                .andExpect(status().isNotFound());
    }
}
