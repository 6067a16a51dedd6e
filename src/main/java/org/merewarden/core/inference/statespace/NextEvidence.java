package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.stream.IntStream;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Traits;
import org.merewarden.core.inference.Diagnostics.Gathering;
import org.merewarden.core.inference.Diagnostics.Help;
import org.merewarden.core.prior.Prior;
import org.merewarden.core.prior.Priors;

/**
 * How much one more piece of evidence would narrow Q = ln(FMSY B), next season's catch at FMSY, to first order.
 *
 * <pre>
 *   y = h + e,   var e = v:      R = cov(Q, h)²/(var Q (var h + v)),      narrowing = 1 − √(1 − R)
 *
 *   estimate of biomass           h = ln B                          v = 0.3²
 *   one more value of index j     h = ln q_j + ln B                 v = mean σ_j²
 *   last season's catch counted   h = ln C_T                        v = 0.01²
 *   age or growth                 h = ln FMSY                       1/v = 1/0.5² − 1/s²
 * </pre>
 *
 * <p>B: at the start of the coming season; variances over the posterior's draws. Linear regression of Q on y: exact for
 * normal draws. Age or growth replaces the present prior of FMSY, log-sd s, by one of log-sd 0.5 (natural mortality from
 * age 0.4, FMSY from it 0.3: {@link org.merewarden.core.prior.NaturalMortality}, {@link
 * org.merewarden.core.prior.FishingAtMsy}), so it helps only where s is larger, no age or growth is known and the office
 * states no FMSY of its own, which would come before it. Without any season the catch stands for h = ln B with v the
 * variance of the prior of F in the first season. A count errs by the smallest cv that {@link Removals} grants. The cv of an estimate and the threshold of 1 % are our judgement.
 */
final class NextEvidence {
    static final double LEAST = 0.01;
    private static final double BIOMASS_CV = 0.3;
    private static final double LIFE_HISTORY_SD = 0.5;

    private final double[] logFmsy;
    private final double[] logBiomass;
    private final double[] logCatchAtFmsy;
    private final List<Help> helps = new ArrayList<>();

    private NextEvidence(double[] fmsy, double[] biomass) {
        logFmsy = logs(fmsy);
        logBiomass = logs(biomass);
        logCatchAtFmsy = sum(logFmsy, logBiomass);
    }

    /** At least one draw. */
    static List<Help> of(StateSpaceFit fit, Evidence evidence) {
        int last = fit.data().seasons() - 1;
        NextEvidence next = new NextEvidence(
                fit.parameter(OuterParameters.FMSY), column(fit.draws().biomassTonnes(), last + 1));
        List<Series> series = fit.data().series();
        for (int j = 0; j < series.size(); j++) {
            if (!series.get(j).effort()) {
                next.index(
                        series.get(j).name(),
                        logs(fit.catchability(j)),
                        fit.parameter(OuterParameters.FIRST_SCATTER + j));
            }
        }
        double[] removals = column(fit.draws().removals(), last);
        next.add(Gathering.CATCH_COUNT, "", logs(removals), Removals.LEAST_CV * Removals.LEAST_CV);
        return next.sorted(evidence);
    }

    /** Of draws without any season. */
    static List<Help> ofPriors(ModelPriors priors, Evidence evidence, double[] fmsy, double[][] biomass) {
        NextEvidence next = new NextEvidence(fmsy, column(biomass, 0));
        double sd = priors.firstHarvestRate().logSd();
        next.add(Gathering.CATCH_COUNT, "", next.logBiomass, sd * sd);
        return next.sorted(evidence);
    }

    private static double[] logs(double[] values) {
        return Arrays.stream(values).map(Math::log).toArray();
    }

    private static double[] column(double[][] rows, int t) {
        return Arrays.stream(rows).mapToDouble(row -> row[t]).toArray();
    }

    private static double[] sum(double[] a, double[] b) {
        return IntStream.range(0, a.length).mapToDouble(k -> a[k] + b[k]).toArray();
    }

    private List<Help> sorted(Evidence evidence) {
        add(Gathering.BIOMASS_ESTIMATE, "", logBiomass, BIOMASS_CV * BIOMASS_CV);
        lifeHistory(evidence);
        helps.sort(Comparator.comparingDouble(Help::narrowing).reversed());
        return helps;
    }

    private void index(String name, double[] logQ, double[] scatter) {
        double variance = Arrays.stream(scatter).map(s -> s * s).average().orElse(Double.NaN);
        add(Gathering.INDEX_VALUE, name, sum(logQ, logBiomass), variance);
    }

    private void lifeHistory(Evidence evidence) {
        Traits traits = evidence.traits();
        boolean known =
                traits.maxAgeYears() != null || (traits.growthKPerYear() != null && traits.growthLinfCm() != null);
        Prior present = Priors.forStock(evidence).fmsy();
        double gained = Math.pow(LIFE_HISTORY_SD, -2) - Math.pow(present.logSd(), -2);
        if (!known && Priors.own(evidence, "fmsy").isEmpty() && gained > 0) {
            add(Gathering.LIFE_HISTORY, "", logFmsy, 1 / gained);
        }
    }

    private void add(Gathering gathering, String series, double[] h, double variance) {
        double narrowing = narrowing(logCatchAtFmsy, h, variance);
        if (narrowing >= LEAST) {
            helps.add(new Help(gathering, series, narrowing));
        }
    }

    /** 0–1; NaN where it cannot be had. */
    static double narrowing(double[] q, double[] h, double variance) {
        double qMean = Arrays.stream(q).average().orElse(Double.NaN);
        double hMean = Arrays.stream(h).average().orElse(Double.NaN);
        double qq = 0;
        double hh = 0;
        double qh = 0;
        for (int k = 0; k < q.length; k++) {
            qq += (q[k] - qMean) * (q[k] - qMean) / q.length;
            hh += (h[k] - hMean) * (h[k] - hMean) / q.length;
            qh += (q[k] - qMean) * (h[k] - hMean) / q.length;
        }
        double share = qh * qh / (qq * (hh + variance));
        return 1 - Math.sqrt(Math.max(0, 1 - share));
    }
}
