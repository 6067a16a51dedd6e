package org.merewarden.command;

import java.io.IOException;
import java.io.PrintStream;
import java.io.UncheckedIOException;
import java.util.Arrays;
import java.util.List;
import org.merewarden.intake.RefusedImport;

/** What the program does without its server: the first word names it. */
public final class CommandLine {
    /** Every stock settled. */
    public static final int SETTLED = 0;

    /** The program failed; nothing was written. */
    public static final int FAILED = 1;

    /** The command or its input is unusable; nothing was written. */
    public static final int UNUSABLE = 2;

    /** Results were written, but some stocks did not settle. */
    public static final int SOME_NOT_SETTLED = 3;

    private static final String ASSESS = "assess";
    private static final String ADVISE = "advise";
    private static final String HELP = "--help";
    private static final String USAGE = """
            java -jar merewarden.jar assess FOLDER --out RESULTS.csv [--threads N] [--seed N] [--growth logistic|gompertz|fitted]
            java -jar merewarden.jar advise FOLDER --out LIMITS.csv [the same options]
            java -jar merewarden.jar [--PROPERTY=VALUE ...]        the server

            assess reads the tables of FOLDER (stocks.csv, catches.csv and what else there is of water-bodies, effort, surveys,
            events, areas and priors; a table that is not there is evidence that is not there) and writes one row per stock and
            quantity to RESULTS.csv, replacing it. The last closed season is the last with a catch, an effort or a survey in
            FOLDER; a later season counts as not begun.

              --out      file of the results
              --threads  stocks assessed at the same time; default: as many as there are processors. It changes no result
              --seed     another sample of draws; default 0, with which the server draws
              --growth   shape of growth where priors.csv states none: logistic (default, n = 1), gompertz (n -> 0) or fitted
                         (n estimated, ln n ~ N(0, 0.4))

            RESULTS.csv: species is the code, or code.population. ess is the number of independent draws that the stock's weighted
            sample is worth, the same in all its rows. collapse_course (a probability) and log_evidence are single numbers, in the
            column mean. fold_margin, tipping_biomass_t and collapse_course hold the median of the last season's estimated removals
            for ever (0 where none are estimated). A stock that could not be assessed has rows without numbers.

            advise assesses the same way and puts the program's own policy to every stock: LIMITS.csv has one row per stock with the
            limit of total removals recommended for the season after the last closed one. limits.csv of FOLDER, if it is there,
            tells last season's limit, for steadiness and payback. decided_by is the rule that settled the amount; ceiling_t is
            empty where even no catch, or any catch, is within the tolerated risk; below_limit_chance is the chance of B < B lim at
            the end of at least one season of the horizon at the limit; recovered_by is the season by whose end that chance is
            tolerable with nothing taken, where even no catch is too risky.

            Exit status: 0 all stocks settled, 3 some not, 2 the input is unusable (nothing written), 1 the program failed.
            The figures are model estimates, to be reviewed by a qualified fisheries scientist.
            """;

    private CommandLine() {}

    /** Whether the arguments, if any, are properties of the server and none is a command. */
    public static boolean isServer(String... args) {
        return Arrays.stream(args).allMatch(a -> a.startsWith("--") && !a.equals(HELP));
    }

    /**
     * Does what the arguments say.
     *
     * @param out for results and help
     * @param err for progress and problems
     * @return the exit status
     */
    public static int run(List<String> args, PrintStream out, PrintStream err) {
        if (args.contains(HELP)) {
            out.print(USAGE);
            return SETTLED;
        }
        if (args.isEmpty() || !List.of(ASSESS, ADVISE).contains(args.get(0))) {
            err.println("unknown command “" + String.join(" ", args) + "”; --help tells what there is");
            return UNUSABLE;
        }
        try {
            FolderOptions options = FolderOptions.of(args.subList(1, args.size()));
            boolean settled = args.get(0).equals(ASSESS)
                    ? new Assess(options, out, err).run()
                    : new Advise(options, out, err).run();
            return settled ? SETTLED : SOME_NOT_SETTLED;
        } catch (RefusedImport e) {
            e.messages().forEach(err::println);
            return UNUSABLE;
        } catch (UsageProblem e) {
            err.println(e.getMessage());
            return UNUSABLE;
        } catch (IOException | UncheckedIOException e) {
            err.println("cannot read or write: " + e.getMessage());
            return UNUSABLE;
        } catch (RuntimeException e) {
            err.println("the program failed; nothing was written");
            e.printStackTrace(err);
            return FAILED;
        }
    }
}
