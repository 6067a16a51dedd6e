package org.merewarden.command;

import java.io.PrintStream;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.concurrent.atomic.AtomicInteger;
import java.util.function.BiFunction;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Assessor;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.statespace.StateSpaceAssessor;
import org.merewarden.intake.RefusedImport;
import org.merewarden.records.FolderEvidence;
import org.merewarden.records.FolderEvidence.StockEvidence;

/**
 * Every stock of a folder, assessed. Each stock has a generator of its own and results are collected in the stocks' order:
 * they are the same, bit for bit, for any number of threads.
 */
final class FolderRun {
    private static final long SPREAD_OF_SEEDS = 0x9E3779B97F4A7C15L;

    private final FolderOptions options;
    private final PrintStream err;
    private final FolderEvidence folder;
    private final int lastClosed;
    private final Assessor assessor = new StateSpaceAssessor();
    private final AtomicInteger done = new AtomicInteger();

    /** Reads the folder and tells what was passed over. */
    FolderRun(FolderOptions options, PrintStream err) {
        this.options = options;
        this.err = err;
        this.folder = FolderEvidence.read(options.folder());
        folder.remarks().forEach(err::println);
        this.lastClosed = folder.lastSeason()
                .orElseThrow(() -> new RefusedImport(List.of(
                        options.folder() + ": no catch, effort or survey is recorded; there is no season to assess")));
    }

    /** The last with a catch, an effort or a survey in the folder. */
    int lastClosed() {
        return lastClosed;
    }

    FolderEvidence folder() {
        return folder;
    }

    /** @param result of a stock and its assessment */
    <T> List<T> each(BiFunction<StockEvidence, Posterior, T> result) {
        List<StockEvidence> stocks = folder.stocks();
        ExecutorService pool = Executors.newFixedThreadPool(Math.min(options.threads(), stocks.size()));
        try {
            List<Future<T>> running = stocks.stream()
                    .map(stock -> pool.submit(() -> result.apply(stock, assess(stock, stocks.size()))))
                    .toList();
            List<T> results = new ArrayList<>();
            for (Future<T> each : running) {
                results.add(each.get());
            }
            return results;
        } catch (ExecutionException e) {
            throw new IllegalStateException(e.getCause());
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            throw new IllegalStateException("interrupted; nothing was written", e);
        } finally {
            pool.shutdownNow();
        }
    }

    private Posterior assess(StockEvidence stock, int total) {
        Evidence evidence = options.growth().appliedTo(stock.evidence());
        Posterior posterior = assessor.assess(evidence, lastClosed, seed(evidence));
        err.println("stock " + done.incrementAndGet() + " of " + total + ": " + stock.waterBody() + " "
                + stock.speciesKey() + ", " + StockResult.word(posterior.verdict()));
        return posterior;
    }

    /** Seed 0 gives the draws of the server. */
    long seed(Evidence evidence) {
        return evidence.seed() + SPREAD_OF_SEEDS * options.seed();
    }
}
