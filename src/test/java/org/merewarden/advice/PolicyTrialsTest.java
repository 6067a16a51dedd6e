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

import java.time.Clock;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.StatementCount;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.activity.ActivityLog;
import org.merewarden.assessment.AssessForTests;
import org.merewarden.core.policy.Policy;
import org.merewarden.jobs.Jobs;
import org.merewarden.jobs.RunningJob;
import org.merewarden.waterbody.Register;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.request.RequestPostProcessor;

/** Trials of a version: what is stored and shown for a rule made for the test, and the queue with the true one. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class PolicyTrialsTest {
    private static final RequestPostProcessor CLERK = user("pol-clerk").roles("CLERK");
    private static final RequestPostProcessor BIOLOGIST = user("pol-ines").roles("BIOLOGIST");

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private Jobs jobs;

    @Autowired
    private Register register;

    @Autowired
    private Limits limits;

    @Autowired
    private PolicyStore policies;

    @Autowired
    private PolicyTrialStore store;

    @Autowired
    private ActivityLog activity;

    @Autowired
    private Clock clock;

    @Autowired
    private AssessForTests assess;

    @Autowired
    private Adviser adviser;

    private final List<Long> stocks = new ArrayList<>();
    private long assessment;
    private int version;

    /** Rises, falls, closes, stays, cannot be advised. */
    @BeforeAll
    void fiveStocks() {
        var region = new TestRegion(jdbc);
        for (String name : List.of("Rising", "Falling", "Closing", "Staying", "Unknown")) {
            long lake = region.lake("trial-" + name.toLowerCase(java.util.Locale.ROOT), name + " Trial Lake");
            stocks.add(region.stock(lake, "FPE"));
        }
        region.catches(stocks.get(0), 2018, List.of(10.0, 11.0, 12.0, 11.0, 10.0));
        assess.assess(stocks.get(0), 2025);
        assessment = jdbc.sql("select max(id) from assessment where stock_id = ?")
                .param(stocks.get(0))
                .query(Long.class)
                .single();
    }

    @BeforeEach
    void aVersionOfItsOwn() {
        Policy d = Policy.DEFAULT;
        version = policies.add(
                new Policy(
                        d.limitFraction(),
                        d.ramp(),
                        d.quantile(),
                        d.horizonYears(),
                        0.08,
                        d.steadinessCap(),
                        d.lastSeason(),
                        d.setAsides(),
                        d.rounding(),
                        d.standing(),
                        d.pooled(),
                        d.intervalProbability()),
                "pol-ines",
                clock.instant());
        policies.decide(version, PolicyVersion.PROPOSED, "pol-ines", clock.instant(), "More careful.");
    }

    /** Tonnes by the version that is tried and by the one in force; the other stocks of the store cannot be advised. */
    private Optional<PolicyTrialRule.Trial> made(long stock, PolicyStore.Numbered asked) {
        double[][] tonnes = {{12, 10}, {9, 10}, {0, 4}, {7, 7}};
        int place = stocks.indexOf(stock);
        if (place < 0 || place >= tonnes.length) {
            return Optional.empty();
        }
        boolean here = asked.number() == version;
        return Optional.of(new PolicyTrialRule.Trial(
                2026, assessment, tonnes[place][here ? 0 : 1], here ? "RISK" : "RAMP", here ? 0.04 : 0.09));
    }

    private PolicyTrials trials(PolicyTrialRule rule) {
        return new PolicyTrials(jobs, register, limits, policies, store, rule, activity, clock);
    }

    /** A trial as it is stored when it is asked for, with a job that nobody else runs. */
    private RunningJob job(boolean cancelled) {
        jdbc.sql("insert into job (kind, subject, payload, state, requested_by, requested_at)"
                        + " values ('policy-trial', 'test', '', 'DONE', 'pol-ines', current_timestamp)")
                .update();
        long id = jdbc.sql("select max(id) from job").query(Long.class).single();
        store.add(id, version, policies.inForce().number(), "pol-ines", clock.instant());
        return new RunningJob() {
            @Override
            public long id() {
                return id;
            }

            @Override
            public String payload() {
                return Integer.toString(version);
            }

            @Override
            public String requestedBy() {
                return "pol-ines";
            }

            @Override
            public boolean cancelRequested() {
                return cancelled;
            }

            @Override
            public void progress(int done, int total, String note) {
                jdbc.sql("update job set progress_done = ?, progress_total = ?, note = ? where id = ?")
                        .params(done, total, note, id)
                        .update();
            }
        };
    }

    private String page() throws Exception {
        return mvc.perform(get("/policy/" + version).with(CLERK))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString()
                .replace('\u00a0', ' ');
    }

    @Test
    void everyStockIsShownWithBothLimitsAndTheSums() throws Exception {
        trials(this::made).run(job(false));
        int all = register.stocks().size();
        String page = page();
        assertThat(page)
                .contains("Of " + all + " stocks, 1 rise, 1 fall, 1 close (from a limit to 0) and 1 stay as they are; "
                        + (all - 4) + " cannot be advised yet.")
                .contains("Together 31 t by version ", " and 28 t by version " + version)
                .contains(">rises by 20%<", ">falls by 10%<", ">closes<", ">stays<", "step 2, risk (version ");
        // the most changed first
        assertThat(page.indexOf("Closing Trial Lake")).isPositive().isLessThan(page.indexOf("Rising Trial Lake"));
        assertThat(page.indexOf("Rising Trial Lake")).isLessThan(page.indexOf("Falling Trial Lake"));
    }

    @Test
    void aTrialTakenUpAgainAsksAndStoresEachStockOnce() {
        List<Long> asked = new ArrayList<>();
        RunningJob job = job(false);
        PolicyTrials dying = trials((stock, v) -> {
            if (asked.size() == 4) {
                throw new OutOfMemoryError("the process dies here");
            }
            asked.add(stock);
            return made(stock, v);
        });
        org.assertj.core.api.Assertions.assertThatThrownBy(() -> dying.run(job)).isInstanceOf(OutOfMemoryError.class);
        long trial = store.ofJob(job.id()).id();
        assertThat(store.rows(trial)).hasSize(2);
        List<Long> again = new ArrayList<>();
        trials((stock, v) -> {
                    again.add(stock);
                    return made(stock, v);
                })
                .run(job);
        assertThat(again).doesNotContainAnyElementsOf(asked);
        assertThat(store.rows(trial))
                .extracting(PolicyTrialStore.Row::stockId)
                .doesNotHaveDuplicates()
                .hasSize(register.stocks().size());
    }

    @Test
    void oneStocksFailureIsCountedAndKeepsNobodyWaiting() throws Exception {
        RunningJob job = job(false);
        trials((stock, v) -> {
                    if (stock == stocks.get(1)) {
                        throw new IllegalStateException("made to fail");
                    }
                    return made(stock, v);
                })
                .run(job);
        assertThat(store.rows(store.ofJob(job.id()).id()))
                .hasSize(register.stocks().size() - 1);
        assertThat(page()).contains("1 failed unexpectedly; see the log for job " + job.id());
    }

    @Test
    void aStoppedTrialStoresNothing() {
        RunningJob job = job(true);
        trials(this::made).run(job);
        assertThat(store.rows(store.ofJob(job.id()).id())).isEmpty();
    }

    @Test
    void whoMayProposeAsksForATrialAndItsResultComesToThePage() throws Exception {
        assertThat(page()).contains("Not tried yet").doesNotContain("/trial\"");
        mvc.perform(post("/policy/" + version + "/trial").with(BIOLOGIST).with(csrf()))
                .andExpect(flash().attribute("done", containsString("queued")));
        long job = store.latest(version).orElseThrow().jobId();
        for (int i = 0; i < 600 && jobs.find(job).orElseThrow().active(); i++) {
            Thread.sleep(100);
        }
        assertThat(jobs.find(job).orElseThrow().state()).isEqualTo("DONE");
        PolicyTrialStore.Both tried = store
                .rows(store.latest(version).orElseThrow().id())
                .stream()
                .filter(r -> r.stockId() == stocks.get(0))
                .findFirst()
                .orElseThrow()
                .both();
        assertThat(tried).isNotNull();
        // what the advice page says by the version in force, and less at a smaller tolerated risk
        assertThat(tried.against().limitTonnes())
                .isPositive()
                .isEqualTo(adviser.work(stocks.get(0), tried.against().season(), Policy.DEFAULT, 1)
                        .orElseThrow()
                        .recommendation()
                        .limitTonnes());
        assertThat(tried.here().limitTonnes()).isLessThan(tried.against().limitTonnes());
        if (tried.here().limitTonnes() > 0) {
            assertThat(tried.here().risk()).isBetween(0.0, 0.08);
        } else {
            // late in a year the next season is advised, and then even no catch may be too risky
            assertThat(tried.here().risk()).isGreaterThan(0);
        }
        assertThat(tried.here().decidedBy()).isEqualTo("RISK");
        assertThat(page()).contains("Asked for by pol-ines", "Unknown Trial Lake", "not advised");
        mvc.perform(get("/policy/" + version).with(BIOLOGIST))
                .andExpect(content().string(containsString("Try it once more")));
        int inForce = policies.inForce().number();
        mvc.perform(post("/policy/" + inForce + "/trial").with(BIOLOGIST).with(csrf()))
                .andExpect(flash().attribute("refused", containsString("nothing to try it against")));
        assertThat(store.latest(inForce)).isEmpty();
    }

    @Test
    void moreStocksAskTheStoreNoMoreOften() throws Exception {
        trials((stock, v) -> stock == stocks.get(0) ? made(stock, v) : Optional.empty())
                .run(job(false));
        page();
        int few = StatementCount.during(this::page);
        var region = new TestRegion(jdbc);
        long lake = region.lake("trial-more-" + version, "More Trial Lake");
        region.stock(lake, "FPE");
        region.stock(lake, "FRO");
        trials(this::made).run(job(false));
        assertThat(StatementCount.during(this::page)).isEqualTo(few);
    }
}
