package org.merewarden.portfolio;

import java.util.List;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.core.dynamics.ConstantCatch;
import org.merewarden.core.dynamics.ConstantMortality;
import org.merewarden.core.dynamics.EquilibriumCurve;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.web.Point;

/**
 * A stock's equilibria under a constant catch, and where it is now; catches in t a year, biomasses in t.
 *
 * <p>The curve is drawn from the medians of MSY, FMSY and shape over the draws; its band is, at each biomass, the 10 and
 * 90 % quantile over the draws of the catch that would hold it. The present position is the last season's removals and
 * the biomass after it, by draw. Points are (catch, biomass).
 *
 * @param law of the medians
 * @param unstable from no biomass up to the fold
 * @param stable from the fold up to the capacity
 * @param fold where they meet: (MSY, BMSY)
 * @param band a closed outline
 * @param cloud at most 60 draws of the present position, evenly thinned
 * @param limitTonnes total removals allowed; null where no catch is limited
 */
record StockCurve(
        Entry entry,
        AssessmentView assessment,
        SurplusProduction law,
        List<Point> unstable,
        List<Point> stable,
        Point fold,
        List<Point> band,
        Spread catchNow,
        Spread biomassNow,
        List<Point> cloud,
        @Nullable Double limitTonnes) {
    private static final int CELLS = 64;
    private static final int BAND_STEPS = 24;
    private static final int CLOUD = 60;

    /** @param posterior the assessment's, with at least one draw */
    static StockCurve of(Entry entry, AssessmentView assessment, Posterior posterior) {
        SurplusProduction law = SurplusProduction.fromReferencePoints(
                median(posterior.msyTonnes()), median(posterior.fmsyPerYear()), median(posterior.shape()));
        EquilibriumCurve curve = EquilibriumCurve.trace(law, new ConstantCatch(), CELLS);
        double[] catches = byDraw(posterior, draw -> presentCatch(assessment, posterior, draw));
        double[] biomass = byDraw(posterior, posterior::presentBiomass);
        return new StockCurve(
                entry,
                assessment,
                law,
                points(curve, false),
                points(curve, true),
                new Point(law.msy(), law.bmsy()),
                band(posterior, law.capacityTonnes()),
                Spread.of(catches),
                Spread.of(biomass),
                cloud(catches, biomass),
                entry.closedEarly() ? null : entry.limitTonnes());
    }

    private static List<Point> points(EquilibriumCurve curve, boolean stable) {
        return curve.branches().stream()
                .filter(b -> b.stable() == stable)
                .flatMap(b -> b.points().stream())
                .map(p -> new Point(p.harvest(), p.biomassTonnes()))
                .toList();
    }

    /** The last season's removals under a draw's own F; what is recorded where there was none or the season was closed. */
    private static double presentCatch(AssessmentView assessment, Posterior posterior, int draw) {
        int seasons = posterior.seasons();
        if (seasons == 0 || assessment.closedLastSeason()) {
            Double recorded = assessment.lastRemovalsTonnes();
            return recorded == null ? 0 : recorded;
        }
        double fishing = posterior.fishingPerYear()[draw][seasons - 1];
        return new ConstantMortality(law(posterior, draw), fishing)
                .removals(posterior.biomassTonnes()[draw][seasons - 1], 1);
    }

    private static SurplusProduction law(Posterior posterior, int draw) {
        return SurplusProduction.fromReferencePoints(
                posterior.msyTonnes()[draw],
                posterior.fmsyPerYear()[draw],
                posterior.shape()[draw]);
    }

    /** Up the lower edge, down the upper one; biomasses at which most draws hold no catch end at the axis. */
    private static List<Point> band(Posterior posterior, double capacity) {
        List<SurplusProduction> laws = IntStream.range(0, posterior.draws())
                .mapToObj(draw -> law(posterior, draw))
                .toList();
        Point[] outline = new Point[2 * (BAND_STEPS + 1)];
        for (int i = 0; i <= BAND_STEPS; i++) {
            double biomass = capacity * i / BAND_STEPS;
            double[] held =
                    laws.stream().mapToDouble(l -> Math.max(0, l.rate(biomass))).toArray();
            double[] ends = Quantiles.of(held, new double[] {0.1, 0.9});
            outline[i] = new Point(ends[0], biomass);
            outline[outline.length - 1 - i] = new Point(ends[1], biomass);
        }
        return List.of(outline);
    }

    private static List<Point> cloud(double[] catches, double[] biomass) {
        int step = Math.max(1, (catches.length + CLOUD - 1) / CLOUD);
        return IntStream.iterate(0, i -> i < catches.length, i -> i + step)
                .mapToObj(i -> new Point(catches[i], biomass[i]))
                .toList();
    }

    private static double[] byDraw(Posterior posterior, IntToDoubleFunction quantity) {
        return IntStream.range(0, posterior.draws()).mapToDouble(quantity).toArray();
    }

    private static double median(double[] values) {
        return Quantiles.of(values, 0.5);
    }
}
