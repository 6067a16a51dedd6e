package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.containsString;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.flash;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.time.Instant;
import java.time.LocalDate;
import java.util.List;
import java.util.Map;
import java.util.stream.DoubleStream;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.assessment.AssessForTests;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableRow;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;
import org.springframework.test.web.servlet.request.MockHttpServletRequestBuilder;
import org.springframework.test.web.servlet.request.RequestPostProcessor;

/** From proposal to notice, through the pages; each test decides about a season of its own. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class DecisionsTest {
    private static final RequestPostProcessor BIOLOGIST = user("ines").roles("BIOLOGIST");
    private static final RequestPostProcessor APPROVER = user("tobias").roles("APPROVER");
    private static final String STOCK = "/stocks/dec-lake/FPE";

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private AssessForTests assess;

    @Autowired
    private Limits limits;

    @Autowired
    private LimitsTable table;

    @Autowired
    private Seasons seasons;

    private long stock;

    @BeforeAll
    void register() {
        var region = new TestRegion(jdbc);
        long lake = region.lake("dec-lake", "Decision Lake");
        stock = region.stock(lake, "FPE");
        long north = region.cooperative("dec-north", "Decision North");
        long south = region.cooperative("dec-south", "Decision South");
        region.right(north, stock, 60);
        region.right(south, stock, 40);
        // a simulated course: logistic, r 0.5, K 200, from K down and up again
        double[] catches = {30, 40, 45, 45, 40, 30, 15, 10, 10, 10, 12, 15};
        double biomass = 200;
        double[] index = new double[catches.length];
        for (int t = 0; t < catches.length; t++) {
            double next = biomass + 0.5 * biomass * (1 - biomass / 200) - catches[t];
            index[t] = 0.1 * Math.sqrt(biomass * next) * (1 + (t % 2 == 0 ? 0.05 : -0.05));
            biomass = next;
        }
        region.catches(stock, 2014, DoubleStream.of(catches).boxed().toList());
        region.index(stock, 2014, DoubleStream.of(index).boxed().toList());
        assess.assess(stock, 2025);
    }

    private static MockHttpServletRequestBuilder proposal(int season) {
        return post(STOCK + "/limits")
                .param("season", Integer.toString(season))
                .param("kind", "catch")
                .param("key", java.util.UUID.randomUUID().toString())
                .param("amount", "12.5")
                .param("subsistence", "0.5")
                .param("angling", "1")
                .param("research", "0")
                .param("other", "1")
                .param("reportedFraction", "0.85")
                .param("validFrom", season + "-01-01")
                .param("validTo", season + "-12-31")
                .param("reason", "Held at last year’s level.")
                .param("differenceReason", "Whatever is recommended.")
                .with(csrf());
    }

    private long propose(int season, RequestPostProcessor who) throws Exception {
        mvc.perform(proposal(season).with(who)).andExpect(status().is3xxRedirection());
        return jdbc.sql("select max(id) from catch_limit where stock_id = ? and season_year = ?")
                .params(stock, season)
                .query(Long.class)
                .single();
    }

    private ResultActions act(long id, String act, String reason, RequestPostProcessor who) throws Exception {
        return mvc.perform(post("/limits/" + id + "/" + act)
                .param("reason", reason)
                .with(who)
                .with(csrf()));
    }

    @Test
    void aLimitGoesFromProposalToForceAndIsAllocatedExactly() throws Exception {
        long id = propose(2101, BIOLOGIST);
        assertThat(limits.inForce(stock, 2101)).isEmpty();
        mvc.perform(get("/notices/" + id).with(BIOLOGIST)).andExpect(content().string(containsString("DRAFT")));
        act(id, "issue", "", APPROVER).andExpect(flash().attributeExists("done"));
        LimitView limit = limits.inForce(stock, 2101).orElseThrow();
        // (12.5 − 2.5) × 0.85 = 8.5 t, 60 and 40 %
        assertThat(limit.toBeLoggedTonnes()).isEqualTo(8.5);
        assertThat(limit.issuedBy()).isEqualTo("tobias");
        assertThat(limits.allocations(2101).stream()
                        .map(AllocationView::amountKg)
                        .toList())
                .containsExactly(5100L, 3400L);
        String notice = mvc.perform(get("/notices/" + id).with(BIOLOGIST))
                .andReturn()
                .getResponse()
                .getContentAsString();
        assertThat(notice).doesNotContain("DRAFT").contains("Decision North").contains("A limit is no entitlement");
        assertThat(activity("notice " + id)).containsExactly("proposed limit", "issued limit");
    }

    private List<String> activity(String subject) {
        return jdbc.sql("select action from activity_entry where subject like ? order by id")
                .param(subject + ",%")
                .query(String.class)
                .list();
    }

    @Test
    void proposerAndIssuerDiffer() throws Exception {
        long id = propose(2102, APPROVER);
        act(id, "issue", "Mine.", APPROVER).andExpect(flash().attributeExists("refused"));
        assertThat(limits.inForce(stock, 2102)).isEmpty();
        act(id, "issue", "Yours.", user("other").roles("APPROVER")).andExpect(flash().attributeExists("done"));
        assertThat(limits.inForce(stock, 2102)).isPresent();
    }

    @Test
    void aBiologistDecidesNothing() throws Exception {
        long id = propose(2103, BIOLOGIST);
        for (String act : List.of("issue", "refuse", "withdraw")) {
            act(id, act, "No.", BIOLOGIST).andExpect(status().isForbidden());
        }
        assertThat(limits.inForce(stock, 2103)).isEmpty();
    }

    @Test
    void aNewerLimitSupersedesAndWithdrawalEndsForce() throws Exception {
        long first = propose(2104, BIOLOGIST);
        act(first, "issue", "", APPROVER);
        long second = propose(2104, BIOLOGIST);
        act(second, "issue", "", APPROVER);
        assertThat(limits.inForce(stock, 2104).orElseThrow().id()).isEqualTo(second);
        act(first, "withdraw", "Too late.", APPROVER).andExpect(flash().attributeExists("refused"));
        act(second, "withdraw", "", APPROVER).andExpect(flash().attributeExists("refused"));
        act(second, "withdraw", "Ice broke late.", APPROVER).andExpect(flash().attributeExists("done"));
        assertThat(limits.inForce(stock, 2104)).isEmpty();
        mvc.perform(get("/notices/" + first).with(BIOLOGIST))
                .andExpect(content().string(containsString("SUPERSEDED")));
    }

    @Test
    void aDecidedProposalIsDecidedOnce() throws Exception {
        long id = propose(2105, BIOLOGIST);
        act(id, "refuse", "", APPROVER).andExpect(flash().attributeExists("refused"));
        act(id, "refuse", "Too high.", APPROVER).andExpect(flash().attributeExists("done"));
        act(id, "issue", "After all.", APPROVER).andExpect(flash().attributeExists("refused"));
        assertThat(limits.inForce(stock, 2105)).isEmpty();
    }

    @Test
    void withoutASettledAssessmentTheIssuerWritesAReason() throws Exception {
        var region = new TestRegion(jdbc);
        region.stock(region.lake("dec-bare", "Bare Lake"), "FRO");
        mvc.perform(post("/stocks/dec-bare/FRO/limits")
                        .param("season", "2106")
                        .param("kind", "catch")
                        .param("key", java.util.UUID.randomUUID().toString())
                        .param("amount", "1")
                        .param("reportedFraction", "1")
                        .param("validFrom", "2106-01-01")
                        .param("validTo", "2106-12-31")
                        .param("reason", "Provisional.")
                        .with(BIOLOGIST)
                        .with(csrf()))
                .andExpect(status().is3xxRedirection());
        long id = jdbc.sql("select max(id) from catch_limit").query(Long.class).single();
        act(id, "issue", "", APPROVER).andExpect(flash().attributeExists("refused"));
        act(id, "issue", "No survey exists; review in March.", APPROVER).andExpect(flash().attributeExists("done"));
    }

    @Test
    void badProposalsNameTheFieldAndStoreNothing() throws Exception {
        int before = jdbc.sql("select count(*) from catch_limit")
                .query(Integer.class)
                .single();
        for (String[] bad : new String[][] {
            {"amount", "-1", "An amount is a number from 0"},
            {"amount", "NaN", "amount"},
            {"amount", "", "needs its amount"},
            {"subsistence", "99", "together are more than the limit"},
            {"reportedFraction", "0", "more than 0 and at most 1"},
            {"amount", "1,250", "is no number such as 1250"},
            {"validTo", "2106-01-01", "last day is before the first"},
            {"validTo", "+999999999-12-31", "between the years 1800 and 2201"},
            {"validTo", "soon", "is no date"},
            {"legalBasis", "x".repeat(1001), "At most 1000 characters"},
            {"reason", " ", "Write down why"},
            {"season", "19999", "A season is a year from 1800 to 2200"},
            {"season", "2111", "season 2111 runs from 1 Jan 2111 to 31 Dec 2111: the two share no day"},
            {"season", "1990", "Season 1990 lies more than one season before the present one"},
            {"kind", "effort", "“t” is no unit of effort"},
            {"unit", "", "“” is no unit of effort"},
            {"unit", "net-nights", "“net-nights” is no unit of a catch limit"},
            {"key", "", "the form came without its own number"}
        }) {
            var request = proposal(2107).param("unit", "t");
            if (bad[2].startsWith("“”")) {
                request.with(r -> {
                    r.setParameter("kind", "effort");
                    return r;
                });
            }
            mvc.perform(request.with(r -> {
                                r.setParameter(bad[0], bad[1]);
                                return r;
                            })
                            .with(BIOLOGIST))
                    .andExpect(status().is(422))
                    .andExpect(content().string(containsString(bad[2])));
        }
        assertThat(jdbc.sql("select count(*) from catch_limit")
                        .query(Integer.class)
                        .single())
                .isEqualTo(before);
    }

    @Test
    void anEffortLimitKeepsItsUnitAndSetsNothingAside() throws Exception {
        mvc.perform(proposal(2113)
                        .with(r -> {
                            r.setParameter("kind", "effort");
                            r.setParameter("amount", "400");
                            r.setParameter("unit", "net-nights");
                            return r;
                        })
                        .with(BIOLOGIST))
                .andExpect(status().is3xxRedirection());
        assertThat(jdbc.sql("select amount || ' ' || unit || ' ' || (set_aside_subsistence_t + set_aside_angling_t"
                                + " + set_aside_research_t + set_aside_other_t) from catch_limit"
                                + " where season_year = 2113")
                        .query(String.class)
                        .single())
                .isEqualTo("400.0 net-nights 0.0");
    }

    @Test
    void aFormWithoutItsKeyComesBackWithOne() throws Exception {
        String form = mvc.perform(proposal(2107)
                        .with(r -> {
                            r.removeParameter("key");
                            return r;
                        })
                        .with(BIOLOGIST))
                .andExpect(status().is(422))
                .andReturn()
                .getResponse()
                .getContentAsString();
        assertThat(form).containsPattern("name=\"key\" value=\"[0-9a-f-]{36}\"").contains("value=\"12.5\"");
    }

    @Test
    void amountsMayCarryADecimalComma() throws Exception {
        mvc.perform(proposal(2108)
                        .with(r -> {
                            r.setParameter("amount", "12,5");
                            return r;
                        })
                        .with(BIOLOGIST))
                .andExpect(status().is3xxRedirection());
        assertThat(jdbc.sql("select amount from catch_limit where season_year = 2108")
                        .query(Double.class)
                        .single())
                .isEqualTo(12.5);
    }

    @Test
    void aReasonTooLongForTheStoreIsRefusedWithASentence() throws Exception {
        long id = propose(2109, BIOLOGIST);
        for (String act : List.of("issue", "refuse")) {
            act(id, act, "x".repeat(4001), APPROVER)
                    .andExpect(flash().attribute("refused", containsString("at most 4000 characters")));
        }
        act(id, "issue", "x".repeat(4000), APPROVER).andExpect(flash().attributeExists("done"));
        act(id, "withdraw", "x".repeat(4001), APPROVER).andExpect(flash().attributeExists("refused"));
        assertThat(limits.inForce(stock, 2109)).isPresent();
    }

    @Test
    void aNoticeShowsTheEvidenceOfItsOwnDayNotOfALaterAssessment() throws Exception {
        var region = new TestRegion(jdbc);
        long late = region.stock(region.lake("dec-late", "Late Lake"), "FRO");
        mvc.perform(post("/stocks/dec-late/FRO/limits")
                        .param("season", "2112")
                        .param("kind", "catch")
                        .param("key", java.util.UUID.randomUUID().toString())
                        .param("amount", "1")
                        .param("reportedFraction", "1")
                        .param("validFrom", "2112-01-01")
                        .param("validTo", "2112-12-31")
                        .param("reason", "Provisional.")
                        .with(BIOLOGIST)
                        .with(csrf()))
                .andExpect(status().is3xxRedirection());
        long id = jdbc.sql("select max(id) from catch_limit").query(Long.class).single();
        region.catches(late, 2020, List.of(1.0, 1.2, 0.9, 1.1));
        assess.assess(late, 2025);
        mvc.perform(get("/notices/" + id).with(BIOLOGIST))
                .andExpect(content().string(containsString("<dd>unassessed</dd>")));
    }

    /** Who may propose may import, and only an approver decides. */
    @Test
    void papersDoNotSupersedeWhatWasDecidedHere() throws Exception {
        int season = seasons.current() - 1;
        long id = propose(season, BIOLOGIST);
        act(id, "issue", "", APPROVER);
        Fate fate = table.examine(List.of(paper(season, (season - 1) + "-11-01", 999)), (other, keys) -> false)
                .get(0);
        assertThat(fate.kind()).isEqualTo(Fate.Kind.REFUSED);
        assertThat(fate.problems().get(0).rule()).contains("notice " + id);
    }

    @Test
    void theLaterOfTwoPapersIsInForceWhicheverComesFirst() {
        store(paper(1991, "1991-03-01", 7));
        store(paper(1991, "1990-11-01", 12));
        assertThat(limits.inForce(stock, 1991).orElseThrow().amountTonnes()).isEqualTo(7);
        store(paper(1991, "1991-05-01", 5));
        assertThat(limits.inForce(stock, 1991).orElseThrow().amountTonnes()).isEqualTo(5);
        assertThat(table.examine(List.of(paper(1991, "1990-11-01", 12)), (other, keys) -> false))
                .containsExactly(Fate.SAME);
        assertThat(table.examine(List.of(paper(2110, "2110-01-01", 12)), (other, keys) -> false)
                        .get(0)
                        .problems()
                        .get(0)
                        .rule())
                .contains("lies in the future");
    }

    private void store(TableRow paper) {
        table.store(
                List.of(paper),
                new Provenance(
                        jdbc.sql("select coalesce(max(id), 0) from import_batch")
                                .query(Long.class)
                                .single(),
                        "ines",
                        Instant.parse("2026-01-01T00:00:00Z")));
    }

    private static TableRow paper(int season, String issuedOn, double tonnes) {
        return new TableRow(
                2,
                Map.of(
                        "water_body",
                        "dec-lake",
                        "species",
                        "FPE",
                        "season",
                        season,
                        "issued_on",
                        LocalDate.parse(issuedOn),
                        "kind",
                        "catch",
                        "amount",
                        tonnes));
    }
}
