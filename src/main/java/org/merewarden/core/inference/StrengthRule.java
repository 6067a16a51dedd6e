package org.merewarden.core.inference;

/**
 * Evidence strength of an observation-error fit, by rule; our judgement, nothing published.
 *
 * <pre>
 *   STRONG  settled, n ≥ 15, c ≥ 2,   σ ≤ 0.3, s ≤ 0.2, e ≤ 0.05, a survey
 *   FAIR    settled, n ≥ 8,  c ≥ 1.4, σ ≤ 0.5, s ≤ 0.4, e ≤ 0.25
 *   THIN    anything else
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>n</td><td>seasons with an observation</td></tr>
 * <tr><td>c</td><td>contrast: largest over smallest fitted biomass in those seasons</td></tr>
 * <tr><td>σ</td><td>residual standard deviation of ln index</td></tr>
 * <tr><td>s</td><td>spread of MSY over the refits: interquartile range / (1.349 · median)</td></tr>
 * <tr><td>e</td><td>share of the refits that ended on a bound or failed</td></tr>
 * </table>
 *
 * <p>Catch per unit of effort in place of a survey is FAIR at best. Results that rest on priors never come here: they are
 * THIN with catches or a biomass estimate, NONE without.
 */
final class StrengthRule {
    private StrengthRule() {}

    static EvidenceStrength of(
            boolean settled,
            boolean survey,
            int seasonsSeen,
            double contrast,
            double sigma,
            double msySpread,
            double edgeShare) {
        if (!settled) {
            return EvidenceStrength.THIN;
        }
        boolean strong =
                survey && seasonsSeen >= 15 && contrast >= 2 && sigma <= 0.3 && msySpread <= 0.2 && edgeShare <= 0.05;
        if (strong) {
            return EvidenceStrength.STRONG;
        }
        boolean fair = seasonsSeen >= 8 && contrast >= 1.4 && sigma <= 0.5 && msySpread <= 0.4 && edgeShare <= 0.25;
        return fair ? EvidenceStrength.FAIR : EvidenceStrength.THIN;
    }
}
