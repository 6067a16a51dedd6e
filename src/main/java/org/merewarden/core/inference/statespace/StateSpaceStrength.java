package org.merewarden.core.inference.statespace;

import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Quantiles;

/**
 * Evidence strength of a state-space result, by rule; our judgement, nothing published.
 *
 * <pre>
 *   STRONG  settled, n ≥ 15, c ≥ 2,   s ≤ 0.25, o ≤ 0.5, removals recorded
 *   FAIR    settled, n ≥ 8,  c ≥ 1.4, s ≤ 0.4,  o ≤ 0.7, removals recorded
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
 * </table>
 */
final class StateSpaceStrength {
    private StateSpaceStrength() {}

    static EvidenceStrength of(StateSpaceFit fit) {
        SeasonData data = fit.data();
        if (data.seasonsSeen() == 0 && !data.hasCatch()) {
            return EvidenceStrength.NONE;
        }
        double[] msy = fit.parameter(OuterParameters.MSY);
        if (!fit.ladder().settled() || !data.hasCatch() || msy.length == 0) {
            return EvidenceStrength.THIN;
        }
        double[] quartiles = Quantiles.of(msy, new double[] {0.25, 0.5, 0.75});
        double spread = (quartiles[2] - quartiles[0]) / (1.349 * quartiles[1]);
        double before = Math.sinh(0.6745 * fit.priors().msy().logSd()) * 2 / 1.349;
        return of(data.seasonsSeen(), contrast(fit), spread, before > 0 ? spread / before : 1);
    }

    static EvidenceStrength of(int seen, double contrast, double spread, double ofPrior) {
        if (seen >= 15 && contrast >= 2 && spread <= 0.25 && ofPrior <= 0.5) {
            return EvidenceStrength.STRONG;
        }
        boolean fair = seen >= 8 && contrast >= 1.4 && spread <= 0.4 && ofPrior <= 0.7;
        return fair ? EvidenceStrength.FAIR : EvidenceStrength.THIN;
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
