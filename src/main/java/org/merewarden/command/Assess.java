package org.merewarden.command;

import java.io.IOException;
import java.io.PrintStream;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import java.util.concurrent.atomic.AtomicInteger;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Assessor;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.statespace.StateSpaceAssessor;
import org.merewarden.intake.RefusedImport;
import org.merewarden.records.FolderEvidence;
import org.merewarden.records.FolderEvidence.StockEvidence;

/**
 * Assesses every stock of a folder. Each stock has a generator of its own and results are collected in the stocks' order:
 * the file is the same, byte for byte, for any number of threads.
 */
final class Assess {
    private static final long SPREAD_OF_SEEDS = 0x9E3779B97F4A7C15L;

    private final AssessOptions options;
    private final PrintStream out;
    private final PrintStream err;
    private final Assessor assessor = new StateSpaceAssessor();
    private final AtomicInteger done = new AtomicInteger();

    Assess(AssessOptions options, PrintStream out, PrintStream err) {
        this.options = options;
        this.out = out;
        this.err = err;
    }

    /** @return whether all stocks settled */
    boolean run() throws UsageProblem, IOException {
        FolderEvidence folder = FolderEvidence.read(options.folder());
        ResultsFile.check(options.out(), options.folder());
        folder.remarks().forEach(err::println);
        int lastClosed = folder.lastSeason()
                .orElseThrow(() -> new RefusedImport(List.of(
                        options.folder() + ": no catch, effort or survey is recorded; there is no season to assess")));
        List<StockResult> results = assess(folder.stocks(), lastClosed);
        ResultsFile.write(options.out(), results);
        out.println("Last closed season: " + lastClosed
                + ", the last with a catch, an effort or a survey in the folder. Growth: "
                + options.growth().word() + ".\n");
        out.print(ReadableTable.of(results));
        out.println("Results: " + options.out());
        return results.stream().allMatch(r -> r.verdict().settled());
    }

    private List<StockResult> assess(List<StockEvidence> stocks, int lastClosed) {
        ExecutorService pool = Executors.newFixedThreadPool(Math.min(options.threads(), stocks.size()));
        try {
            List<Future<StockResult>> running = stocks.stream()
                    .map(stock -> pool.submit(() -> assess(stock, lastClosed, stocks.size())))
                    .toList();
            List<StockResult> results = new ArrayList<>();
            for (Future<StockResult> each : running) {
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

    private StockResult assess(StockEvidence stock, int lastClosed, int total) {
        Evidence evidence = options.growth().appliedTo(stock.evidence());
        Posterior posterior = assessor.assess(evidence, lastClosed, seed(evidence, options.seed()));
        StockResult result = new StockResult(
                stock.waterBody(),
                stock.speciesKey(),
                Quantities.of(posterior),
                posterior.draws() == 0
                        ? null
                        : posterior.estimates().getOrDefault("effective_draws", (double) posterior.draws()),
                posterior.verdict());
        err.println("stock " + done.incrementAndGet() + " of " + total + ": " + stock.waterBody() + " "
                + stock.speciesKey() + ", " + result.verdictWord());
        return result;
    }

    /** Seed 0 gives the draws of the server. */
    static long seed(Evidence evidence, long wanted) {
        return evidence.seed() + SPREAD_OF_SEEDS * wanted;
    }
}
