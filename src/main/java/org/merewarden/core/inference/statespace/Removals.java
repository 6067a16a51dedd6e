package org.merewarden.core.inference.statespace;

import java.util.Arrays;
import java.util.List;
import java.util.Objects;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;

/**
 * What was taken, season by season.
 *
 * <pre>
 *   ĉ = Σ c_s/ρ_s,   var ĉ = Σ (c_s cv_s/ρ_s)²,   ln ĉ ~ N(ln C, sd ĉ/ĉ)
 * </pre>
 *
 * <p>c, ρ, cv: reported catch, reported fraction and cv by sector s; without a cv {@value #DEFAULT_CV}, and never below
 * {@value #LEAST_CV} in all. A closed season, and a season in which every sector reports 0, takes a known catch: the
 * closure's residual if it states one, else what was recorded, else 0; no likelihood and F of the walk unseen. A season
 * without any record says nothing.
 *
 * @param logCatch ln ĉ in the data's unit; NaN where there is no likelihood
 * @param sd of ln ĉ
 * @param closed whether the dynamics take the known catch in place of the walk's F
 * @param known that catch, in the data's unit
 */
record Removals(double[] logCatch, double[] sd, boolean[] closed, double[] known) {
    static final double DEFAULT_CV = 0.2;
    static final double LEAST_CV = 0.01;

    static Removals of(Evidence evidence, int firstYear, int seasons, double unit) {
        Removals removals =
                new Removals(new double[seasons], new double[seasons], new boolean[seasons], new double[seasons]);
        Arrays.fill(removals.logCatch, Double.NaN);
        for (int t = 0; t < seasons; t++) {
            removals.put(evidence, firstYear + t, t, unit);
        }
        return removals;
    }

    private void put(Evidence evidence, int year, int t, double unit) {
        List<CatchRecord> records =
                evidence.catches().stream().filter(c -> c.year() == year).toList();
        double total = records.stream().mapToDouble(CatchRecord::removalsTonnes).sum();
        List<EventRecord> closures = evidence.events().stream()
                .filter(e -> e.year() == year && e.kind().equals("closure"))
                .toList();
        closed[t] = !closures.isEmpty() || (!records.isEmpty() && total == 0);
        if (closed[t]) {
            known[t] = closures.stream()
                            .map(EventRecord::likely)
                            .filter(Objects::nonNull)
                            .mapToDouble(residual -> Math.max(0, residual))
                            .max()
                            .orElse(total)
                    / unit;
        } else if (total > 0) {
            logCatch[t] = Math.log(total / unit);
            double variance = records.stream()
                    .mapToDouble(c -> Math.pow(c.removalsTonnes() * cv(c) / total, 2))
                    .sum();
            sd[t] = Math.max(LEAST_CV, Math.sqrt(variance));
        }
    }

    private static double cv(CatchRecord record) {
        Double cv = record.cv();
        return cv == null || !(cv >= 0) ? DEFAULT_CV : cv;
    }
}
