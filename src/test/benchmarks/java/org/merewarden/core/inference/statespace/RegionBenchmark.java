package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.Callable;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.concurrent.TimeUnit;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Posterior;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Param;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;

/** The assessments of a region of mixed simulated stocks on two threads. Budget: 200 in 12 s, cost linear in stocks. */
@State(Scope.Benchmark)
@BenchmarkMode(Mode.SingleShotTime)
@OutputTimeUnit(TimeUnit.SECONDS)
@Fork(1)
@Warmup(iterations = 1)
@Measurement(iterations = 2)
public class RegionBenchmark {
    private static final String[] KINDS = {"RICH", "SHORT", "GAPPY", "NOISY", "CATCH_ONLY", "ABUNDANCE_ONLY"};

    @Param({"50", "200"})
    public int stocks;

    private final List<Evidence> region = new ArrayList<>();

    @Setup
    public void simulate() {
        for (int i = 0; i < stocks; i++) {
            region.add(Stocks.evidence(KINDS[i % KINDS.length], i));
        }
    }

    @Benchmark
    public int assessments() throws Exception {
        StateSpaceAssessor assessor = new StateSpaceAssessor();
        ExecutorService threads = Executors.newFixedThreadPool(2);
        try {
            List<Callable<Posterior>> jobs = new ArrayList<>();
            for (int i = 0; i < stocks; i++) {
                int number = i;
                jobs.add(() -> assessor.assess(region.get(number), Simulated.LAST, number));
            }
            int settled = 0;
            for (Future<Posterior> each : threads.invokeAll(jobs)) {
                settled += each.get().verdict().settled() ? 1 : 0;
            }
            return settled;
        } finally {
            threads.shutdown();
        }
    }
}
