package org.merewarden.core.inference.statespace;

import java.util.concurrent.TimeUnit;
import org.merewarden.core.evidence.Evidence;
import org.openjdk.jmh.annotations.AuxCounters;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Level;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Param;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;

/**
 * A whole posterior, from evidence to a thousand draws with their states, on one core; each call takes the next of 20
 * stocks. Budgets: 0.1 s with T = 30, 0.5 s with three indices, T = 60 and the shape estimated. The counters give the
 * share that settled and the effective draws per posterior.
 */
@State(Scope.Thread)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.MILLISECONDS)
@Fork(1)
@Warmup(iterations = 2, time = 3)
@Measurement(iterations = 4, time = 4)
public class PosteriorBenchmark {
    private static final int STOCKS = 20;

    @Param({"RICH", "SHORT", "GAPPY", "CATCH_ONLY", Stocks.THREE_INDICES, Stocks.THREE_INDICES_SHAPE})
    public String stock;

    private final Evidence[] evidence = new Evidence[STOCKS];
    private int next;

    /** Sums over the calls of an iteration. */
    @State(Scope.Thread)
    @AuxCounters(AuxCounters.Type.EVENTS)
    public static class Counters {
        public long calls;
        public long settled;
        public long effectiveDraws;

        @Setup(Level.Iteration)
        public void clear() {
            calls = 0;
            settled = 0;
            effectiveDraws = 0;
        }
    }

    @Setup
    public void simulate() {
        for (int i = 0; i < STOCKS; i++) {
            evidence[i] = Stocks.evidence(stock, i);
        }
    }

    @Benchmark
    public StateSpaceFit posterior(Counters counters) {
        next = (next + 1) % STOCKS;
        StateSpaceFit fit = Stocks.fit(evidence[next], next);
        counters.calls++;
        counters.settled += fit.ladder().settled() ? 1 : 0;
        counters.effectiveDraws += Math.round(fit.ladder().sample().effectiveSize());
        return fit;
    }
}
