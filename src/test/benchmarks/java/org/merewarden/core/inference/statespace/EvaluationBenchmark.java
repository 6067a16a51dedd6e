package org.merewarden.core.inference.statespace;

import java.util.SplittableRandom;
import java.util.concurrent.TimeUnit;
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
 * One ln p(θ | data), n = 1, T = 30, one index, at draws of the posterior; the baseline is a sweep of 1,000 exponentials
 * over the same machine. Budget 20 µs, nothing allocated.
 */
@State(Scope.Thread)
@BenchmarkMode(Mode.AverageTime)
@OutputTimeUnit(TimeUnit.MICROSECONDS)
@Fork(1)
@Warmup(iterations = 4, time = 1)
@Measurement(iterations = 8, time = 1)
public class EvaluationBenchmark {
    private static final int POINTS = 1000;

    private final double[] exponents = new double[1000];
    private final double[][] u = new double[POINTS][];
    private StateSpaceFit fit;
    private int next;

    @Setup
    public void fitOneStock() {
        fit = Stocks.fit(Stocks.RICH, 1);
        int[] chosen = fit.ladder().sample().resample(POINTS, new SplittableRandom(1));
        for (int k = 0; k < POINTS; k++) {
            u[k] = fit.ladder().sample().draw(chosen[(k * 7) % POINTS]);
        }
        for (int i = 0; i < exponents.length; i++) {
            exponents[i] = -3 + 0.006 * i;
        }
    }

    @Benchmark
    public double baselineOfExponentials() {
        double sum = 0;
        for (double x : exponents) {
            sum += Math.exp(x);
        }
        return sum;
    }

    @Benchmark
    public double density() {
        next = (next + 1) % POINTS;
        return fit.marginal().evaluate(u[next]);
    }

    @Benchmark
    public double densityForDraws() {
        next = (next + 1) % POINTS;
        return fit.marginal().evaluate(u[next], InnerMode.COARSE);
    }
}
