package org.merewarden.store;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.containsString;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import io.zonky.test.db.postgres.embedded.EmbeddedPostgres;
import java.io.IOException;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.merewarden.Demonstration;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.boot.test.context.SpringBootTest;
import org.springframework.boot.webmvc.test.autoconfigure.AutoConfigureMockMvc;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.context.ActiveProfiles;
import org.springframework.test.context.DynamicPropertyRegistry;
import org.springframework.test.context.DynamicPropertySource;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.request.RequestPostProcessor;

/** The same jar on a real PostgreSQL: migrations, the demonstration through the importer, jobs, pages and decisions. */
@SpringBootTest(properties = "spring.jpa.hibernate.ddl-auto=validate")
@AutoConfigureMockMvc
@ActiveProfiles({"demo", "test"})
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class PostgresTest {
    private static final RequestPostProcessor BIOLOGIST = user("biologist").roles("BIOLOGIST");
    private static final RequestPostProcessor APPROVER = user("approver").roles("APPROVER");

    private static EmbeddedPostgres postgres;

    @DynamicPropertySource
    static void address(DynamicPropertyRegistry registry) throws IOException {
        postgres = EmbeddedPostgres.start();
        registry.add("spring.datasource.url", () -> postgres.getJdbcUrl("postgres", "postgres"));
        registry.add("spring.datasource.username", () -> "postgres");
        registry.add("spring.datasource.password", () -> "postgres");
    }

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @BeforeAll
    void assessed() throws InterruptedException {
        Demonstration.assessed(jdbc);
    }

    @AfterAll
    static void stop() throws IOException {
        postgres.close();
    }

    @Test
    void holdsTheWholeRegion() {
        assertThat(jdbc.sql("select version()").query(String.class).single()).startsWith("PostgreSQL");
        assertThat(count("water_body")).isEqualTo(24);
        assertThat(count("stock")).isEqualTo(30);
        assertThat(count("landing")).isEqualTo(3650);
        assertThat(count("limit_in_force")).isPositive();
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "/portfolio",
                "/portfolio.csv",
                "/portfolio/compare?stock=skelder-water:PLN&stock=mizzow-lake:FPI",
                "/stocks/pellowin-lake/PLN",
                "/stocks/pellowin-lake/PLN/evidence",
                "/stocks/pellowin-lake/PLN/advice",
                "/stocks/pellowin-lake/PLN/assessments/1",
                "/water-bodies",
                "/water-bodies/skelder-water",
                "/water-bodies/skelder-water/events",
                "/cooperatives",
                "/imports",
                "/imports/1",
                "/season/2026",
                "/season/2026/landings",
                "/season/2026/landings.csv",
                "/landings/new",
                "/assessments",
                "/shares",
                "/activity",
                "/policy",
                "/policy/1?against=1",
                "/policy/new",
                "/notices/1",
                "/notices/1.pdf",
                "/returns/2026",
                "/portfolio/pack.pdf?stock=skelder-water:PLN"
            })
    void pagesAnswer(String path) throws Exception {
        mvc.perform(get(path).with(APPROVER)).andExpect(status().isOk());
    }

    @Test
    void aLimitIsProposedAndIssued() throws Exception {
        mvc.perform(post("/stocks/skelder-water/PLN/limits")
                        .param("season", "2026")
                        .param("kind", "catch")
                        .param("key", java.util.UUID.randomUUID().toString())
                        .param("amount", "5.1")
                        .param("reportedFraction", "1")
                        .param("validFrom", "2026-01-01")
                        .param("validTo", "2026-12-31")
                        .param("reason", "Lower than before.")
                        .param("differenceReason", "Whatever is recommended.")
                        .with(BIOLOGIST)
                        .with(csrf()))
                .andExpect(status().is3xxRedirection());
        long id = jdbc.sql("select max(limit_id) from limit_decision where act = 'PROPOSED'")
                .query(Long.class)
                .single();
        mvc.perform(post("/limits/" + id + "/issue")
                        .param("reason", "Agreed.")
                        .with(APPROVER)
                        .with(csrf()))
                .andExpect(status().is3xxRedirection());
        assertThat(jdbc.sql("select removals_t from stock_standing where limit_id = ?")
                        .param(id)
                        .query(Double.class)
                        .single())
                .isEqualTo(5.1);
        mvc.perform(post("/limits/" + id + "/issue")
                        .param("reason", "Again.")
                        .with(APPROVER)
                        .with(csrf()))
                .andExpect(status().is3xxRedirection());
        assertThat(jdbc.sql("select count(*) from limit_decision where limit_id = ? and act = 'ISSUED'")
                        .param(id)
                        .query(Integer.class)
                        .single())
                .isEqualTo(1);
    }

    @Test
    void aPolicyIsProposedAndAdoptedOnce() throws Exception {
        String form = mvc.perform(get("/policy/new").with(BIOLOGIST))
                .andReturn()
                .getResponse()
                .getContentAsString();
        var proposal = post("/policy").param("line", "CATCH").param("reason", "Tried on the other store.");
        Matcher field =
                Pattern.compile("name=\"(values\\[\\w+])\" value=\"([^\"]*)\"").matcher(form);
        while (field.find()) {
            proposal.param(field.group(1), field.group(2));
        }
        mvc.perform(proposal.with(BIOLOGIST).with(csrf())).andExpect(redirectedUrl("/policy/2?against=1"));
        mvc.perform(post("/policy/2/trial").with(BIOLOGIST).with(csrf())).andExpect(status().is3xxRedirection());
        for (int i = 0; i < 600 && count("job where kind = 'policy-trial' and state = 'DONE'") == 0; i++) {
            Thread.sleep(100);
        }
        assertThat(count("policy_trial_stock where limit_t is not null")).isPositive();
        mvc.perform(get("/policy/2").with(APPROVER))
                .andExpect(status().isOk())
                .andExpect(content().string(containsString("Of 30 stocks")));
        for (int i = 0; i < 2; i++) {
            mvc.perform(post("/policy/2/adopt")
                            .param("reason", "Agreed.")
                            .with(APPROVER)
                            .with(csrf()))
                    .andExpect(status().is3xxRedirection());
        }
        assertThat(count("policy_act where policy_number = 2 and act = 'ADOPTED'"))
                .isEqualTo(1);
        assertThat(count("job where kind = 'standings'")).isEqualTo(1);
        mvc.perform(get("/policy").with(APPROVER)).andExpect(content().string(containsString("Version 2 is in force")));
    }

    private int count(String table) {
        return jdbc.sql("select count(*) from " + table).query(Integer.class).single();
    }
}
