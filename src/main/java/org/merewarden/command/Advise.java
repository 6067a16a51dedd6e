package org.merewarden.command;

import java.io.IOException;
import java.io.PrintStream;
import java.util.List;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.outlook.Projection;
import org.merewarden.core.policy.EarlierSeason;
import org.merewarden.core.policy.LimitRule;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.Recommendation;
import org.merewarden.records.FolderEvidence.StockEvidence;
import org.merewarden.records.PaperLimits;

/** Assesses every stock of a folder and recommends its limit for the season after the last closed one. */
final class Advise {
    private final FolderOptions options;
    private final PrintStream out;
    private final PrintStream err;
    private final Policy policy = Policy.DEFAULT;

    Advise(FolderOptions options, PrintStream out, PrintStream err) {
        this.options = options;
        this.out = out;
        this.err = err;
    }

    /** @return whether all stocks settled */
    boolean run() throws UsageProblem, IOException {
        OutputFile file = new OutputFile(options.out(), LimitLine.HEADER);
        file.checkNotATable(options.folder(), PaperLimits.DEFINITION.name());
        FolderRun run = new FolderRun(options, err);
        file.check(options.folder());
        List<LimitLine> lines = run.each((stock, posterior) -> line(run, stock, posterior));
        file.write(lines.stream().map(LimitLine::cells).toList());
        out.println(
                "Limits of total removals for season " + (run.lastClosed() + 1) + ", by the program’s own policy.\n");
        out.print(LimitLine.table(lines));
        out.println("Limits: " + options.out());
        return lines.stream().allMatch(line -> line.verdict().settled());
    }

    private LimitLine line(FolderRun run, StockEvidence stock, Posterior posterior) {
        int season = run.lastClosed() + 1;
        if (posterior.draws() == 0) {
            return new LimitLine(
                    stock.waterBody(), stock.speciesKey(), season, null, posterior.strength(), posterior.verdict());
        }
        EarlierSeason earlier = new EarlierSeason(
                run.folder().limit(stock, season - 1).orElse(Double.NaN),
                stock.evidence().removals(season - 1).orElse(Double.NaN));
        Outlook outlook = new Outlook(
                posterior,
                List.of(),
                policy.horizonYears(),
                policy.limitFraction(),
                0,
                run.seed(stock.evidence()) + season);
        Recommendation recommendation = new LimitRule(policy).recommend(outlook, earlier);
        double limit = recommendation.limitTonnes();
        Projection projection = outlook.project(Course.ofCatch(limit));
        return new LimitLine(
                stock.waterBody(),
                stock.speciesKey(),
                season,
                new LimitLine.Advised(
                        recommendation,
                        earlier,
                        outlook.risk(Course.CLOSURE),
                        outlook.collapseCourse(limit),
                        projection.expectedCatch(),
                        projection.catchQuantile(0.1)),
                posterior.strength(),
                posterior.verdict());
    }
}
