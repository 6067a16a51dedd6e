package org.merewarden.store;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import io.zonky.test.db.postgres.embedded.EmbeddedPostgres;
import java.io.IOException;
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
                "/notices/1"
            })
    void pagesAnswer(String path) throws Exception {
        mvc.perform(get(path).with(APPROVER)).andExpect(status().isOk());
    }

    @Test
    void aLimitIsProposedAndIssued() throws Exception {
        mvc.perform(post("/stocks/skelder-water/PLN/limits")
                        .param("season", "2026")
                        .param("kind", "catch")
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

    private int count(String table) {
        return jdbc.sql("select count(*) from " + table).query(Integer.class).single();
    }
}
