package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.merewarden.advice.LimitDesk.APPROVER;
import static org.merewarden.advice.LimitDesk.BIOLOGIST;

import java.time.Instant;
import java.util.List;
import java.util.concurrent.Callable;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.concurrent.TimeUnit;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.transaction.support.TransactionTemplate;

/** Two who decide about one stock at the same moment: one after the other, in one order, and each limit ends once. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class LimitLocksTest {
    private static final String STOCK = "/stocks/lock-lake/FPE";
    /** Enough to reach a lock, and less than the store waits for one. */
    private static final long MOMENT_MILLIS = 400;

    @Autowired
    private LimitDesk desk;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private LimitWriter writer;

    @Autowired
    private LimitHistory history;

    @Autowired
    private PendingLimits pending;

    @Autowired
    private TransactionTemplate transaction;

    private final ExecutorService other = Executors.newSingleThreadExecutor();
    private long stock;

    @BeforeAll
    void register() {
        var region = new TestRegion(jdbc);
        stock = region.stock(region.lake("lock-lake", "Busy Lake"), "FPE");
        desk.recommendNothing();
    }

    @AfterAll
    void restore() {
        other.shutdownNow();
        desk.restore();
    }

    private long issued(int season) throws Exception {
        long id = desk.propose(STOCK, desk.fields(season), BIOLOGIST);
        desk.act(id, "issue", "Agreed.", APPROVER);
        return id;
    }

    /** Starts an act while the stock is held, lets it run into the lock, and decides meanwhile. */
    private <T> T during(Callable<T> act, Runnable meanwhile) throws Exception {
        Future<T> waiting = transaction.execute(status -> {
            writer.lockStock(stock);
            Future<T> begun = other.submit(act);
            pause(MOMENT_MILLIS);
            meanwhile.run();
            return begun;
        });
        return java.util.Objects.requireNonNull(waiting).get(30, TimeUnit.SECONDS);
    }

    private static void pause(long millis) {
        try {
            Thread.sleep(millis);
        } catch (InterruptedException e) {
            throw new IllegalStateException(e);
        }
    }

    private List<String> ends(long id) {
        return jdbc.sql("select act from limit_decision where limit_id = ? and act in ('WITHDRAWN', 'SUPERSEDED')")
                .param(id)
                .query(String.class)
                .list();
    }

    @Test
    void aLimitThatIsSupersededMeanwhileIsNotWithdrawnAsWell() throws Exception {
        long first = issued(2151);
        long second = desk.propose(STOCK, desk.fields(2151), BIOLOGIST);
        NewLimit limit = history.find(second).orElseThrow();
        String said = during(
                () -> LimitDesk.said(desk.act(first, "withdraw", "Ice.", APPROVER), "refused"),
                () -> writer.putInForce(second, limit, "tobias", Instant.now()));
        assertThat(said).contains("is not in force; nothing was changed");
        assertThat(ends(first)).containsExactly("SUPERSEDED");
    }

    @Test
    void aLimitWhoseMomentComesMeanwhileDoesNotTakeEffectOnceWithdrawn() throws Exception {
        long id = desk.propose(STOCK, desk.fields(2152), BIOLOGIST);
        Instant moment = Instant.parse("2000-01-01T00:00:00Z");
        writer.decide(id, LimitWriter.ISSUED, "tobias", moment, "Agreed.");
        writer.putPending(id, moment);
        during(
                () -> {
                    pending.takeEffect(Instant.now());
                    return "";
                },
                () -> {
                    writer.lock(id);
                    writer.decide(id, LimitWriter.WITHDRAWN, "tobias", Instant.now(), "No.");
                    writer.endPending(id);
                });
        assertThat(ends(id)).containsExactly("WITHDRAWN");
        assertThat(jdbc.sql("select count(*) from limit_in_force where limit_id = ?")
                        .param(id)
                        .query(Integer.class)
                        .single())
                .isZero();
    }

    @Test
    void whoWaitsTooLongHearsThatSomebodyElseIsDeciding() throws Exception {
        long first = issued(2153);
        long open = desk.propose(STOCK, desk.fields(2153), BIOLOGIST);
        for (Callable<String> act : List.<Callable<String>>of(
                () -> LimitDesk.said(desk.act(first, "withdraw", "Ice.", APPROVER), "refused"),
                () -> LimitDesk.said(desk.act(open, "issue", "Yes.", APPROVER), "refused"),
                () -> LimitDesk.said(desk.send(STOCK + "/limits", desk.fields(2153), BIOLOGIST), "refused"))) {
            String said = transaction.execute(status -> {
                writer.lockStock(stock);
                try {
                    return other.submit(act).get(60, TimeUnit.SECONDS);
                } catch (Exception e) {
                    throw new IllegalStateException(e);
                }
            });
            assertThat(said).contains("somebody else was deciding about this stock");
        }
        assertThat(desk.state(first)).isEqualTo("ISSUED");
        assertThat(desk.state(open)).isEqualTo("PROPOSED");
    }
}
