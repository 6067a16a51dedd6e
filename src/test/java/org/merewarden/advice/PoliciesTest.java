package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.allOf;
import static org.hamcrest.Matchers.containsString;
import static org.hamcrest.Matchers.not;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.flash;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.time.Duration;
import java.time.Instant;
import java.util.List;
import java.util.Map;
import java.util.concurrent.Callable;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.merewarden.StatementCount;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.assessment.AssessForTests;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.OfficeSettings;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;
import org.springframework.test.web.servlet.request.MockHttpServletRequestBuilder;
import org.springframework.test.web.servlet.request.RequestPostProcessor;

/** The rule from version to version, through the pages. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class PoliciesTest {
    private static final RequestPostProcessor CLERK = user("pol-clerk").roles("CLERK");
    private static final RequestPostProcessor BIOLOGIST = user("pol-ines").roles("BIOLOGIST");
    private static final RequestPostProcessor APPROVER = user("pol-tobias").roles("APPROVER");

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private Policies policies;

    @Autowired
    private PolicyInForce inForce;

    @Autowired
    private OfficeSettings settings;

    @Autowired
    private AssessForTests assess;

    @Autowired
    private StandingKeeper standings;

    /** The store is shared with tests that count on the program's own constants. */
    @AfterAll
    void backToTheProgramsOwn() throws Exception {
        settings.set(OfficeSettings.OWN_PROPOSALS, "no");
        if (!inForce.policy().equals(Policy.DEFAULT)) {
            adopt(propose(Map.of(), BIOLOGIST), "Back.", APPROVER);
            refreshed();
        }
        assertThat(inForce.policy()).isEqualTo(Policy.DEFAULT);
    }

    private void refreshed() throws InterruptedException {
        Instant end = Instant.now().plus(Duration.ofSeconds(60));
        String open = "select count(*) from job where kind = 'standings' and state in ('QUEUED', 'RUNNING')";
        while (jdbc.sql(open).query(Integer.class).single() > 0 && Instant.now().isBefore(end)) {
            Thread.sleep(100);
        }
        assertThat(jdbc.sql("select distinct state from job where kind = 'standings'")
                        .query(String.class)
                        .list())
                .containsExactly("DONE");
    }

    /** The program's own constants as people type them, with these changed. */
    private static MockHttpServletRequestBuilder form(Map<String, String> changed) {
        Map<String, String> own = Map.ofEntries(
                Map.entry("limitFraction", "20"),
                Map.entry("target", "80"),
                Map.entry("low", "10"),
                Map.entry("high", "40"),
                Map.entry("quantile", "35"),
                Map.entry("horizon", "10"),
                Map.entry("tolerance", "10"),
                Map.entry("steadiness", "20"),
                Map.entry("carryOver", "0"),
                Map.entry("payback", "100"),
                Map.entry("roundingShare", "1"),
                Map.entry("roundingLeast", "10"),
                Map.entry("subsistence", "0"),
                Map.entry("angling", "0"),
                Map.entry("research", "0"),
                Map.entry("other", "0"),
                Map.entry("watch", "5"),
                Map.entry("strained", "10"),
                Map.entry("critical", "50"),
                Map.entry("interval", "80"));
        MockHttpServletRequestBuilder request = post("/policy").with(csrf());
        own.forEach((key, value) -> request.param("values[" + key + "]", changed.getOrDefault(key, value)));
        request.param("line", changed.getOrDefault("line", "MORTALITY"));
        return request.param("reason", changed.getOrDefault("reason", "After two bad years."));
    }

    private int propose(Map<String, String> changed, RequestPostProcessor who) throws Exception {
        mvc.perform(form(changed).with(who))
                .andExpect(status().is3xxRedirection())
                .andExpect(flash().attributeExists("done"));
        return jdbc.sql("select max(number) from policy_version")
                .query(Integer.class)
                .single();
    }

    private ResultActions adopt(int number, String reason, RequestPostProcessor who) throws Exception {
        return act(number, "adopt", reason, who);
    }

    private ResultActions act(int number, String act, String reason, RequestPostProcessor who) throws Exception {
        return mvc.perform(post("/policy/" + number + "/" + act)
                .param("reason", reason)
                .with(who)
                .with(csrf()));
    }

    private PolicyVersion version(int number) {
        return Policies.find(policies.all(), number);
    }

    @Test
    void theFirstVersionIsTheProgramsOwn() {
        PolicyVersion first = version(1);
        assertThat(first.policy()).isEqualTo(Policy.DEFAULT);
        assertThat(first.acts()).extracting(PolicyVersion.Act::act).containsExactly("ADOPTED");
        assertThat(first.latest().by()).isEqualTo("Merewarden");
    }

    @Test
    void everyConstantOfAProposalIsStored() throws Exception {
        Map<String, String> typed = Map.ofEntries(
                Map.entry("limitFraction", "25"),
                Map.entry("line", "CATCH"),
                Map.entry("target", "75"),
                Map.entry("low", "12,5"),
                Map.entry("high", "45"),
                Map.entry("quantile", "30"),
                Map.entry("horizon", "15"),
                Map.entry("tolerance", "7"),
                Map.entry("steadiness", "29"),
                Map.entry("carryOver", "10"),
                Map.entry("payback", "57"),
                Map.entry("roundingShare", "2"),
                Map.entry("roundingLeast", "50"),
                Map.entry("subsistence", "40"),
                Map.entry("angling", "30"),
                Map.entry("research", "20"),
                Map.entry("other", "10"),
                Map.entry("watch", "4"),
                Map.entry("strained", "8"),
                Map.entry("critical", "40"),
                Map.entry("interval", "90"));
        assertThat(version(propose(typed, BIOLOGIST)).policy())
                .isEqualTo(new Policy(
                        0.25,
                        new Policy.Ramp(Policy.Line.CATCH, 0.75, 0.125, 0.45),
                        0.3,
                        15,
                        0.07,
                        0.29,
                        new Policy.LastSeason(0.1, 0.57),
                        new Policy.SetAsides(0.4, 0.3, 0.2, 0.1),
                        new Policy.Rounding(0.02, 50),
                        new Policy.CutPoints(0.04, 0.08, 0.4),
                        false,
                        0.9));
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', textBlock = """
            limitFraction | 36.79 | B lim, as a share of K: 36.79 % is not possible; it is more than 0 and less than 36.7879 %
            limitFraction | 0     | 0 % is not possible
            target        | 100.5 | 100.5 % is not possible; it is more than 0 and at most 100 %
            low           | -1    | -1 % is not possible; it is 0 or more and less than 100 %
            high          | 101   | 101 % is not possible
            high          | 10    | 10 % is not possible; it is more than 10 % (Lower end
            quantile      | 50.1  | 50.1 % is not possible; it is more than 0 and at most 50 %
            horizon       | 51    | 51 seasons is not possible; it is from 1 to 50 seasons
            horizon       | 2.5   | 2.5 seasons is no whole number
            horizon       | many  | many
            tolerance     | 100   | 100 % is not possible; it is more than 0 and less than 100 %
            tolerance     | ''    | Tolerance of risk: enter a number, more than 0 and less than 100 %
            steadiness    | 0     | 0 % is not possible
            carryOver     | 101   | 101 % is not possible; it is from 0 to 100 %
            payback       | -5    | -5 % is not possible
            roundingShare | 11    | 11 % is not possible; it is from 0 to 10 %
            roundingLeast | 0     | 0 kg is not possible; it is more than 0 and at most 1,000,000 kg
            subsistence   | 100.1 | 100.1 % is not possible
            angling       | -1    | -1 % is not possible
            research      | 200   | 200 % is not possible
            other         | NaN   | NaN
            watch         | 0     | 0 % is not possible
            watch         | 1e400 | 1e400
            strained      | 5     | 5 % is not possible; it is more than 5 % (Watch
            critical      | 10    | 10 % is not possible; it is more than 10 % (Strained
            critical      | 100   | 100 % is not possible
            interval      | 100   | 100 % is not possible
            line          | OTHER | Choose what rises
            reason        | ''    | Write down why
            """)
    void aConstantOutOfItsRangeIsAnsweredAtItsField(String field, String typed, String answer) throws Exception {
        String name = field.equals("line") || field.equals("reason") ? field : "values[" + field + "]";
        assertThat(errorAt(name, Map.of(field, typed))).contains(answer);
    }

    @Test
    void setAsidesTogetherAreNoMoreThanTheLimit() throws Exception {
        assertThat(errorAt("values[subsistence]", Map.of("subsistence", "50", "angling", "30", "research", "20.1")))
                .contains("The set-asides are 100.1 % together");
        assertThat(errorAt("reason", Map.of("reason", "x".repeat(4001)))).contains("this one has 4,001");
    }

    /** Puts the form in, expects nothing stored, and returns the text of the error that is tied to the field. */
    private String errorAt(String name, Map<String, String> changed) throws Exception {
        int before = policies.all().size();
        String page = mvc.perform(form(changed).with(BIOLOGIST))
                .andExpect(status().isUnprocessableContent())
                .andReturn()
                .getResponse()
                .getContentAsString();
        assertThat(policies.all()).hasSize(before);
        int start = page.indexOf("id=\"" + name + "-error\"");
        assertThat(start).as("an error at " + name).isPositive();
        return page.substring(start, page.indexOf("</p>", start)).replace('\u00a0', ' ');
    }

    @Test
    void theVersionInForceIsNoProposal() throws Exception {
        Policy policy = inForce.policy();
        if (policy.equals(Policy.DEFAULT)) {
            mvc.perform(form(Map.of()).with(BIOLOGIST))
                    .andExpect(status().isUnprocessableContent())
                    .andExpect(content().string(containsString("nothing to propose")));
        }
        assertThat(inForce.policy()).isEqualTo(policy);
    }

    @Test
    void proposerAndAdopterDifferUnlessTheOfficeAllows() throws Exception {
        int number = propose(Map.of("payback", "90"), APPROVER);
        int before = inForce.number();
        adopt(number, "Mine.", APPROVER)
                .andExpect(flash().attribute("refused", containsString("proposed it yourself")));
        assertThat(inForce.number()).isEqualTo(before);
        mvc.perform(get("/policy/" + number).with(APPROVER))
                .andExpect(content().string(containsString("You proposed this version")));
        settings.set(OfficeSettings.OWN_PROPOSALS, "yes");
        adopt(number, "Mine.", APPROVER).andExpect(flash().attributeExists("done"));
        settings.set(OfficeSettings.OWN_PROPOSALS, "no");
        assertThat(inForce.number()).isEqualTo(number);
        assertThat(version(number).latest().reason()).contains("Mine.", "own proposal");
    }

    @Test
    void aProposalIsDecidedOnceAndWithAReason() throws Exception {
        int number = propose(Map.of("steadiness", "15"), BIOLOGIST);
        act(number, "refuse", " ", APPROVER).andExpect(flash().attribute("refused", containsString("needs a reason")));
        act(number, "refuse", "x".repeat(4001), APPROVER)
                .andExpect(flash().attribute("refused", containsString("at most 4000")));
        act(number, "refuse", "Too tight.", APPROVER).andExpect(flash().attributeExists("done"));
        int before = inForce.number();
        adopt(number, "After all.", APPROVER)
                .andExpect(flash().attribute("refused", containsString("decided already")));
        assertThat(inForce.number()).isEqualTo(before);
        mvc.perform(get("/policy/" + number).with(CLERK))
                .andExpect(content().string(allOf(containsString("was refused by"), containsString("Too tight."))))
                .andExpect(content().string(not(containsString("Propose a version"))));
        adopt(before, "Again.", APPROVER).andExpect(flash().attributeExists("refused"));
        adopt(99_999, "Which?", APPROVER).andExpect(status().isNotFound());
    }

    @Test
    void adoptedAndRefusedAtTheSameMomentOneOfThemHolds() throws Exception {
        int number = propose(Map.of("quantile", "33"), BIOLOGIST);
        ExecutorService both = Executors.newFixedThreadPool(2);
        try {
            for (Future<?> act : both.invokeAll(List.<Callable<ResultActions>>of(
                    () -> act(number, "adopt", "Yes.", APPROVER),
                    () -> act(number, "refuse", "No.", user("pol-other").roles("APPROVER"))))) {
                act.get();
            }
        } finally {
            both.shutdownNow();
        }
        assertThat(version(number).acts()).hasSize(2);
    }

    @Test
    void adoptingJudgesEveryStockByTheNewCutPoints() throws Exception {
        var region = new TestRegion(jdbc);
        long stock = region.stock(region.lake("pol-lake", "Policy Lake"), "FPE");
        region.catches(stock, 2015, List.of(10.0, 12.0, 14.0, 12.0, 11.0, 13.0, 12.0, 10.0));
        assess.assess(stock, 2025);
        double p = standings.of(stock).orElseThrow().probability();
        assertThat(p).isBetween(0.001, 0.999);
        String[] cuts = {plain(25 * p), plain(33 * p), plain(50 * p)};
        int number = propose(Map.of("watch", cuts[0], "strained", cuts[1], "critical", cuts[2]), BIOLOGIST);
        assertThat(standings.of(stock).orElseThrow().probability()).isEqualTo(p);
        adopt(number, "Agreed.", APPROVER).andExpect(flash().attributeExists("done"));
        refreshed();
        assertThat(standings.of(stock).orElseThrow().standing()).isEqualTo("CRITICAL");
        mvc.perform(get("/stocks/pol-lake/FPE").with(CLERK)).andExpect(content().string(containsString("critical")));
        // a decision or an assessment later judges by the version in force too
        standings.refresh(stock);
        assertThat(standings.of(stock).orElseThrow().standing()).isEqualTo("CRITICAL");
        int back = propose(Map.of("watch", plain(100 * p), "strained", "99.9", "critical", "99.95"), BIOLOGIST);
        adopt(back, "Too strict.", APPROVER);
        refreshed();
        assertThat(standings.of(stock).orElseThrow().standing()).isEqualTo("WATCH");
        assertThat(jdbc.sql("select before_text from activity_entry where action = 'adopted policy' and subject = ?")
                        .param("policy version " + back)
                        .query(String.class)
                        .single())
                .startsWith("version " + number + ": Watch from a chance of ");
    }

    private static String plain(double value) {
        return new java.math.BigDecimal(value)
                .round(new java.math.MathContext(6))
                .toPlainString();
    }

    @Test
    void aVersionIsComparedWithAnother() throws Exception {
        int number = propose(Map.of("tolerance", "5", "line", "CATCH"), BIOLOGIST);
        String page = mvc.perform(get("/policy/" + number + "?against=1").with(CLERK))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString()
                .replace('\u00a0', ' ');
        assertThat(page).contains("2 of 21 constants differ.");
        assertThat(page.split("<strong>differs</strong>", -1)).hasSize(3);
        assertThat(page)
                .contains("F is 0 at B lim (20 % of K) and 80 % of FMSY at BMSY")
                .contains("nothing is taken at 10 % of K, and at 40 % of K")
                .contains("at least once within 10 seasons is at most 10 %")
                .contains("at least once within 10 seasons is at most 5 %");
        mvc.perform(get("/policy/" + number + "?against=99999").with(CLERK)).andExpect(status().isNotFound());
    }

    @Test
    void theRuleReadsAsItIsWritten() throws Exception {
        String page = mvc.perform(get("/policy/1").with(CLERK))
                .andReturn()
                .getResponse()
                .getContentAsString()
                .replace('\u00a0', ' ');
        assertThat(page)
                .contains("the limit starts from the one below which 35 % of them lie")
                .contains("at most 20 % higher")
                .contains("Of what was taken over last season’s limit, 100 % is subtracted.")
                .contains("at most 1 % of the limit, but never less than 10 kg")
                .contains("watch from 5 %, strained from 10 %, critical from 50 %")
                .contains("Estimates of other lakes are not borrowed.");
    }

    @Test
    void theFormStartsFromTheVersionThatIsNamed() throws Exception {
        int number = propose(Map.of("tolerance", "6.5", "roundingLeast", "20"), BIOLOGIST);
        mvc.perform(get("/policy/new?from=" + number).with(BIOLOGIST))
                .andExpect(content().string(containsString("name=\"values[tolerance]\" value=\"6.5\"")))
                .andExpect(content().string(containsString("name=\"values[roundingLeast]\" value=\"20\"")));
        mvc.perform(get("/policy/new?from=99999").with(BIOLOGIST)).andExpect(status().isNotFound());
    }

    @Test
    void aProposalLeadsToItsComparisonWithTheVersionInForce() throws Exception {
        mvc.perform(form(Map.of("tolerance", "9")).with(BIOLOGIST))
                .andExpect(redirectedUrl("/policy/" + policies.all().get(0).number() + "?against=" + inForce.number()));
    }

    @Test
    void morePolicyVersionsAskTheStoreNoMoreOften() throws Exception {
        mvc.perform(get("/policy").with(CLERK));
        int few = StatementCount.during(() -> mvc.perform(get("/policy").with(CLERK)));
        propose(Map.of("payback", "80"), BIOLOGIST);
        propose(Map.of("payback", "70"), BIOLOGIST);
        assertThat(StatementCount.during(() -> mvc.perform(get("/policy").with(CLERK))))
                .isEqualTo(few);
    }
}
