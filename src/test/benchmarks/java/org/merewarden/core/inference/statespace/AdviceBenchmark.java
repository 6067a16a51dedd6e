package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.Callable;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.concurrent.TimeUnit;
import java.util.stream.IntStream;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.outlook.SeasonBetween;
import org.merewarden.core.policy.EarlierSeason;
import org.merewarden.core.policy.LimitRule;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.RampCourse;
import org.merewarden.core.policy.Recommendation;
import org.openjdk.jmh.annotations.Benchmark;
import org.openjdk.jmh.annotations.BenchmarkMode;
import org.openjdk.jmh.annotations.Fork;
import org.openjdk.jmh.annotations.Measurement;
import org.openjdk.jmh.annotations.Mode;
import org.openjdk.jmh.annotations.OutputTimeUnit;
import org.openjdk.jmh.annotations.Scope;
import org.openjdk.jmh.annotations.Setup;
import org.openjdk.jmh.annotations.State;
import org.openjdk.jmh.annotations.Warmup;

/**
 * Advice after the assessments, 1,000 draws, one season between, ten seasons ahead. Budgets: one stock 0.3 s, a region of
 * 200 on two threads 8 s.
 */
@State(Scope.Benchmark)
@BenchmarkMode(Mode.SingleShotTime)
@OutputTimeUnit(TimeUnit.MILLISECONDS)
@Fork(1)
@Warmup(iterations = 2)
@Measurement(iterations = 5)
public class AdviceBenchmark {
    private static final String[] KINDS = {"RICH", "SHORT", "GAPPY", "NOISY", "CATCH_ONLY", "ABUNDANCE_ONLY"};
    private static final int STOCKS = 200;
    private static final int FIRST_FEW = 20;
    private static final LimitRule RULE = new LimitRule(Policy.DEFAULT);

    private final List<Posterior> region = new ArrayList<>();

    @Setup
    public void assess() {
        StateSpaceAssessor assessor = new StateSpaceAssessor();
        for (int i = 0; i < STOCKS; i++) {
            region.add(assessor.assess(Stocks.evidence(KINDS[i % KINDS.length], i), Simulated.LAST, i));
        }
    }

    private static Outlook outlook(Posterior posterior) {
        double between = posterior.lastRemovals().orElse(0);
        return new Outlook(posterior, List.of(SeasonBetween.ofCv(between, 0.2)), 10, 0.2, 0, 1);
    }

    private static Recommendation limit(Posterior posterior) {
        return RULE.recommend(outlook(posterior), new EarlierSeason(10, 9));
    }

    /** The limits of a region, two threads. */
    @Benchmark
    public double region() throws Exception {
        ExecutorService threads = Executors.newFixedThreadPool(2);
        try {
            List<Callable<Recommendation>> jobs = new ArrayList<>();
            region.forEach(posterior -> jobs.add(() -> limit(posterior)));
            double sum = 0;
            for (Future<Recommendation> each : threads.invokeAll(jobs)) {
                sum += each.get().limitTonnes();
            }
            return sum;
        } finally {
            threads.shutdown();
        }
    }

    /** The limits of twenty stocks, one after the other: a twentieth is one limit. */
    @Benchmark
    public double twentyLimits() {
        return region.subList(0, FIRST_FEW).stream()
                .mapToDouble(p -> limit(p).limitTonnes())
                .sum();
    }

    /** Everything that the advice pages of twenty stocks compute: limit, risk curve, seven alternatives, stress test. */
    @Benchmark
    public double twentyPages() {
        return region.subList(0, FIRST_FEW).stream()
                .mapToDouble(AdviceBenchmark::page)
                .sum();
    }

    private static double page(Posterior posterior) {
        Outlook outlook = outlook(posterior);
        double limit = RULE.recommend(outlook, new EarlierSeason(10, 9)).limitTonnes();
        double[] catches =
                IntStream.rangeClosed(0, 20).mapToDouble(i -> 5.0 * i).toArray();
        double sum = outlook.risks(Course::ofCatch, catches)[10];
        for (double share : new double[] {0, 0.5, 1, 1.2, 1.5, 2}) {
            sum += outlook.project(Course.ofCatch(share * limit)).expectedCatch();
        }
        sum += outlook.project(new RampCourse(Policy.DEFAULT, outlook)).expectedCatch();
        Outlook weakened = outlook.withDepensation(0.1);
        return sum + weakened.risk(Course.ofCatch(limit)) + weakened.risk(Course.CLOSURE);
    }
}
