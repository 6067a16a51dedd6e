package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.function.Predicate;
import java.util.stream.Collectors;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Quantiles;

/**
 * Evidence strength of a state-space result, by rule; our judgement, nothing published.
 *
 * <pre>
 *   STRONG  settled, removals recorded, n ≥ 15, c ≥ 2,   s ≤ 0.25, o ≤ 0.5, no check fails
 *   FAIR    settled, removals recorded, n ≥ 8,  c ≥ 1.4, s ≤ 0.4,  o ≤ 0.7, at most one check fails
 *   THIN    anything else with removals, a survey or an absolute biomass
 *   NONE    neither
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>n</td><td>seasons with an index or biomass value</td></tr>
 * <tr><td>c</td><td>contrast: largest over smallest median biomass in those seasons</td></tr>
 * <tr><td>s</td><td>spread of MSY: interquartile range / (1.349 · median)</td></tr>
 * <tr><td>o</td><td>s over the same of MSY's prior: what of the prior's width is left</td></tr>
 * <tr><td>check</td><td>{@link FailedChecks}</td></tr>
 * </table>
 *
 * @param strength the class
 * @param reasons why, in sentences; one for each failed check
 */
record StateSpaceStrength(EvidenceStrength strength, List<String> reasons) {
    StateSpaceStrength {
        reasons = List.copyOf(reasons);
    }

    /** The numbers that the rule reads. */
    record Facts(boolean settled, boolean removals, int seen, double contrast, double spread, double ofPrior) {}

    private record Requirement(boolean strong, boolean fair, String shortfall) {
        static Requirement of(boolean met, String shortfall) {
            return new Requirement(met, met, shortfall);
        }
    }

    static StateSpaceStrength of(StateSpaceFit fit, Diagnostics diagnostics) {
        SeasonData data = fit.data();
        if (data.seasonsSeen() == 0 && !data.hasCatch()) {
            return new StateSpaceStrength(
                    EvidenceStrength.NONE,
                    List.of("The evidence has no strength: neither removals nor abundance are recorded."));
        }
        double[] msy = fit.parameter(OuterParameters.MSY);
        if (msy.length == 0) {
            return new StateSpaceStrength(EvidenceStrength.THIN, List.of());
        }
        double[] quartiles = Quantiles.of(msy, new double[] {0.25, 0.5, 0.75});
        double spread = (quartiles[2] - quartiles[0]) / (1.349 * quartiles[1]);
        double before = Math.sinh(0.6745 * fit.priors().msy().logSd()) * 2 / 1.349;
        Facts facts = new Facts(
                fit.ladder().settled(),
                data.hasCatch(),
                data.seasonsSeen(),
                contrast(fit),
                spread,
                before > 0 ? spread / before : 1);
        return of(facts, FailedChecks.of(diagnostics));
    }

    static StateSpaceStrength of(Facts facts, List<String> failedChecks) {
        List<Requirement> all = requirements(facts, failedChecks.size());
        List<String> reasons = new ArrayList<>();
        boolean strong = all.stream().allMatch(Requirement::strong);
        boolean fair = all.stream().allMatch(Requirement::fair);
        if (strong) {
            reasons.add("The evidence is strong.");
        } else if (fair) {
            reasons.add("The evidence is fair, not strong: " + shortfalls(all, Requirement::strong) + ".");
        } else {
            reasons.add("The evidence is thin: " + shortfalls(all, Requirement::fair) + ".");
        }
        reasons.addAll(failedChecks);
        EvidenceStrength strength =
                strong ? EvidenceStrength.STRONG : fair ? EvidenceStrength.FAIR : EvidenceStrength.THIN;
        return new StateSpaceStrength(strength, reasons);
    }

    private static List<Requirement> requirements(Facts f, int failed) {
        return List.of(
                Requirement.of(f.settled(), "the estimation did not settle"),
                Requirement.of(f.removals(), "no removals are recorded"),
                new Requirement(
                        f.seen() >= 15,
                        f.seen() >= 8,
                        said("abundance is seen in %d seasons (fair needs 8, strong 15)", f.seen())),
                new Requirement(
                        f.contrast() >= 2,
                        f.contrast() >= 1.4,
                        said("biomass there differs by a factor of %.2f (1.4, 2)", f.contrast())),
                new Requirement(
                        f.spread() <= 0.25,
                        f.spread() <= 0.4,
                        said("MSY is uncertain by %.0f %% (at most 40, 25)", 100 * f.spread())),
                new Requirement(
                        f.ofPrior() <= 0.5,
                        f.ofPrior() <= 0.7,
                        said("%.0f %% of the prior's width of MSY is left (at most 70, 50)", 100 * f.ofPrior())),
                new Requirement(failed == 0, failed <= 1, said("%d of the checks failed (at most 1, 0)", failed)));
    }

    private static String said(String sentence, Object number) {
        return String.format(Locale.ROOT, sentence, number);
    }

    private static String shortfalls(List<Requirement> all, Predicate<Requirement> met) {
        return all.stream().filter(met.negate()).map(Requirement::shortfall).collect(Collectors.joining("; "));
    }

    private static double contrast(StateSpaceFit fit) {
        double least = Double.POSITIVE_INFINITY;
        double most = 0;
        double[][] paths = fit.draws().biomassTonnes();
        double[] column = new double[paths.length];
        for (int t = 0; t < fit.data().seasons(); t++) {
            if (fit.data().seen(t)) {
                for (int k = 0; k < column.length; k++) {
                    column[k] = paths[k][t];
                }
                double median = Quantiles.of(column, 0.5);
                least = Math.min(least, median);
                most = Math.max(most, median);
            }
        }
        return least > 0 && most > 0 ? most / least : 1;
    }
}
