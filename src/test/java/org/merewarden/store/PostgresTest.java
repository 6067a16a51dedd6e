package org.merewarden.store;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.containsString;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.multipart;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import io.zonky.test.db.postgres.embedded.EmbeddedPostgres;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.time.Instant;
import java.time.LocalDate;
import java.time.ZoneOffset;
import java.util.Random;
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
import org.springframework.beans.factory.annotation.Qualifier;
import org.springframework.boot.test.context.SpringBootTest;
import org.springframework.boot.webmvc.test.autoconfigure.AutoConfigureMockMvc;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.mock.web.MockMultipartFile;
import org.springframework.test.context.ActiveProfiles;
import org.springframework.test.context.DynamicPropertyRegistry;
import org.springframework.test.context.DynamicPropertySource;
import org.springframework.test.util.ReflectionTestUtils;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.request.AbstractMockHttpServletRequestBuilder;
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

    @Autowired
    @Qualifier("pendingLimits")
    private Object pending;

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
        // a limit of today's: one for a season that is long over is not taken
        int year = LocalDate.now(ZoneOffset.UTC).getYear();
        mvc.perform(post("/stocks/skelder-water/PLN/limits")
                        .param("season", Integer.toString(year))
                        .param("kind", "catch")
                        .param("key", java.util.UUID.randomUUID().toString())
                        .param("amount", "5.1")
                        .param("reportedFraction", "1")
                        .param("validFrom", year + "-01-01")
                        .param("validTo", year + "-12-31")
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
    void aClosureTakesEffectIsWithdrawnAndKeepsItsPapers() throws Exception {
        int season = LocalDate.now(ZoneOffset.UTC).getYear() + 1;
        String stock = "/stocks/skelder-water/PLN";
        send(
                post(stock + "/limits")
                        .param("season", Integer.toString(season))
                        .param("kind", "catch")
                        .param("amount", "5.1")
                        .param("reportedFraction", "0.8")
                        .param("validFrom", season + "-01-01")
                        .param("validTo", season + "-12-31")
                        .param("reason", "Lower than before.")
                        .param("differenceReason", "Whatever is recommended.")
                        .param("reviewBy", season + "-12-31")
                        .param("key", "postgres-limit"),
                BIOLOGIST);
        long limit = newest();
        send(post("/limits/" + limit + "/issue").param("reason", "Agreed."), APPROVER);
        var closure = post(stock + "/closures")
                .param("closeOn", season + "-06-01")
                .param("closeAt", "06:00")
                .param("closeReason", "Fish die.")
                .param("closeKey", "postgres-closure");
        send(closure, BIOLOGIST);
        send(closure, BIOLOGIST);
        long closed = newest();
        assertThat(count("catch_limit where entry_key = 'postgres-closure'")).isEqualTo(1);
        send(post("/limits/" + closed + "/issue").param("reason", "Agreed."), APPROVER);
        assertThat(count("limit_pending where limit_id = " + closed)).isEqualTo(1);
        ReflectionTestUtils.invokeMethod(pending, "takeEffect", Instant.parse(season + "-06-01T06:00:00Z"));
        assertThat(count("limit_pending where limit_id = " + closed)).isZero();
        assertThat(count("limit_in_force where limit_id = " + closed)).isEqualTo(1);
        assertThat(count("limit_decision where act = 'SUPERSEDED' and limit_id = " + limit + " and successor_id = "
                        + closed))
                .isEqualTo(1);
        assertThat(count("catch_limit where reported_fraction = 0.8 and id = " + closed))
                .isEqualTo(1);
        papers(closed);
        send(post("/limits/" + closed + "/withdraw").param("reason", "It is over."), APPROVER);
        assertThat(count("limit_in_force f join catch_limit l on l.id = f.limit_id where l.season_year = " + season
                        + " and f.limit_id in (" + limit + ", " + closed + ")"))
                .isZero();
    }

    private void papers(long limit) throws Exception {
        send(
                post("/limits/" + limit + "/objections")
                        .param("objector", "anglers’ association")
                        .param("receivedOn", LocalDate.now(ZoneOffset.UTC).toString())
                        .param("text", "Too late."),
                BIOLOGIST);
        assertThat(count("limit_objection where limit_id = " + limit)).isEqualTo(1);
        byte[] bytes = new byte[2_500_000];
        new Random(7).nextBytes(bytes);
        System.arraycopy("%PDF-1.7".getBytes(StandardCharsets.US_ASCII), 0, bytes, 0, 8);
        send(
                multipart("/limits/" + limit + "/signed-pages")
                        .file(new MockMultipartFile("file", "signed.pdf", "application/pdf", bytes)),
                APPROVER);
        long page = jdbc.sql("select id from limit_attachment where limit_id = ?")
                .param(limit)
                .query(Long.class)
                .single();
        mvc.perform(get("/limits/" + limit + "/signed-pages/" + page).with(BIOLOGIST))
                .andExpect(content().bytes(bytes));
    }

    private void send(AbstractMockHttpServletRequestBuilder<?> request, RequestPostProcessor who) throws Exception {
        mvc.perform(request.with(who).with(csrf())).andExpect(status().is3xxRedirection());
    }

    private long newest() {
        return jdbc.sql("select max(id) from catch_limit").query(Long.class).single();
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
