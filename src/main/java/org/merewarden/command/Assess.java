package org.merewarden.command;

import java.io.IOException;
import java.io.PrintStream;
import java.util.List;
import org.merewarden.core.inference.Posterior;
import org.merewarden.records.FolderEvidence.StockEvidence;

/** Assesses every stock of a folder. */
final class Assess {
    private final FolderOptions options;
    private final PrintStream out;
    private final PrintStream err;

    Assess(FolderOptions options, PrintStream out, PrintStream err) {
        this.options = options;
        this.out = out;
        this.err = err;
    }

    /** @return whether all stocks settled */
    boolean run() throws UsageProblem, IOException {
        FolderRun run = new FolderRun(options, err);
        OutputFile file = new OutputFile(options.out(), ResultsFile.HEADER);
        file.check(options.folder());
        List<StockResult> results = run.each(Assess::result);
        file.write(results.stream().flatMap(ResultsFile::rows).toList());
        out.println("Last closed season: " + run.lastClosed()
                + ", the last with a catch, an effort or a survey in the folder. Growth: "
                + options.growth().word() + ".\n");
        out.print(ReadableTable.of(results));
        out.println("Results: " + options.out());
        return results.stream().allMatch(r -> r.verdict().settled());
    }

    private static StockResult result(StockEvidence stock, Posterior posterior) {
        return new StockResult(
                stock.waterBody(),
                stock.speciesKey(),
                Quantities.of(posterior),
                posterior.draws() == 0
                        ? null
                        : posterior.estimates().getOrDefault("effective_draws", (double) posterior.draws()),
                posterior.verdict());
    }
}
