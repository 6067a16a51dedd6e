package org.merewarden.advice;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.stream.DoubleStream;
import java.util.stream.IntStream;
import org.merewarden.advice.OutlookPage.RiskRow;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.Figures;
import org.merewarden.web.Plot;
import org.merewarden.web.Point;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** The risk curve and biomass ahead: finished SVG, with the numbers behind them. */
@Component
class OutlookDrawings {
    private static final int STEPS = 20;
    private static final double BEYOND_MSY = 1.4;

    private final Texts texts;

    OutlookDrawings(Texts texts) {
        this.texts = texts;
    }

    /** Constant catches in t/yr with the chance of B &lt; B lim at least once within the horizon. */
    record RiskCurve(double[] tonnes, double[] risks) {}

    /** From nothing to well beyond MSY and every limit that is drawn on it. */
    RiskCurve curve(AdviceWorking working) {
        Outlook outlook = working.outlook();
        double most = DoubleStream.of(
                        BEYOND_MSY * Quantiles.of(outlook.posterior().msyTonnes(), 0.5),
                        1.1 * working.recommendation().limitTonnes(),
                        Double.isNaN(working.earlier().limitTonnes())
                                ? 0
                                : 1.1 * working.earlier().limitTonnes())
                .max()
                .orElseThrow();
        double[] tonnes = IntStream.rangeClosed(0, STEPS)
                .mapToDouble(i -> most * i / STEPS)
                .toArray();
        return new RiskCurve(tonnes, outlook.risks(Course::ofCatch, tonnes));
    }

    String draw(AdviceWorking working, RiskCurve curve, String stock) {
        return draw(working, curve, stock, 680, 320);
    }

    /** For a column of paper. */
    String onPaper(AdviceWorking working, RiskCurve curve, String stock) {
        return draw(working, curve, stock, 380, 180);
    }

    private String draw(AdviceWorking working, RiskCurve curve, String stock, double width, double height) {
        double most = curve.tonnes()[STEPS];
        double tolerance = 100 * working.policy().tolerance();
        double msy = Quantiles.of(working.outlook().posterior().msyTonnes(), 0.5);
        double limit = working.recommendation().limitTonnes();
        Plot plot = new Plot(width, height, 0, most, 105);
        List<Point> line = IntStream.rangeClosed(0, STEPS)
                .mapToObj(i -> new Point(curve.tonnes()[i], 100 * curve.risks()[i]))
                .toList();
        plot.line(List.of(new Point(0, tolerance), new Point(most, tolerance)), "level", "6 4")
                .label(
                        new Point(most, tolerance),
                        texts.of(
                                "outlook.curve.tolerance",
                                Figures.setPercent(working.policy().tolerance())),
                        "end")
                .line(line, "stable line0");
        upright(plot, msy, 98, texts.of("outlook.curve.fold"), "2 3");
        upright(plot, limit, 86, texts.of("outlook.curve.recommended"), "none");
        double before = working.earlier().limitTonnes();
        if (before > 0 && before != limit) {
            upright(plot, before, 74, texts.of("outlook.curve.before"), "8 3");
        }
        return plot.svg(
                texts.of("outlook.curve.title", stock),
                texts.of("outlook.curve.x"),
                texts.of("outlook.curve.y"),
                false);
    }

    private static void upright(Plot plot, double at, double height, String name, String dashes) {
        plot.line(List.of(new Point(at, 0), new Point(at, height)), "level", dashes)
                .label(new Point(at, height), name, at == 0 ? "start" : "middle");
    }

    List<RiskRow> rows(AdviceWorking working, RiskCurve curve) {
        return IntStream.rangeClosed(0, STEPS)
                .mapToObj(i -> new RiskRow(
                        Figures.sig(curve.tonnes()[i]),
                        Figures.percentBeside(curve.risks()[i], working.policy().tolerance()),
                        curve.risks()[i] > working.policy().tolerance()))
                .toList();
    }

    /** Medians of the alternatives at a constant catch; the band of the recommended one. */
    String biomass(AdviceWorking working, List<Alternative> all, String stock) {
        List<Alternative> drawn = all.stream().filter(a -> a.tonnes() != null).toList();
        Alternative banded = drawn.get(working.recommendation().limitTonnes() > 0 ? 1 : 0);
        Policy policy = working.policy();
        double tail = (1 - policy.intervalProbability()) / 2;
        double limit = Quantiles.of(
                IntStream.range(0, working.outlook().draws())
                        .mapToDouble(working.outlook()::limitBiomass)
                        .toArray(),
                0.5);
        List<Point> outline = new ArrayList<>(path(working, banded, 1 - tail));
        List<Point> low = path(working, banded, tail);
        Collections.reverse(low);
        outline.addAll(low);
        int end = working.season() + policy.horizonYears();
        Plot plot = new Plot(680, 320, working.season(), end, top(working, drawn, outline));
        plot.area(outline, "band line0");
        plot.line(List.of(new Point(working.season(), limit), new Point(end, limit)), "level", "6 4")
                .label(new Point(end, limit), texts.of("outlook.ahead.limit"), "end");
        List<Plot.Label> labels = new ArrayList<>();
        String[] dashes = {"2 3", "none", "8 3", "8 3 2 3", "4 4"};
        for (int k = 0; k < drawn.size(); k++) {
            List<Point> path = path(working, drawn.get(k), 0.5);
            plot.line(path, "stable line" + k, dashes[k % dashes.length]);
            Point at = path.get(policy.horizonYears() * 2 / 3);
            labels.add(new Plot.Label(at, drawn.get(k).name(), "line" + k));
        }
        return plot.labels(labels)
                .svg(
                        texts.of("outlook.ahead.title", stock),
                        texts.of("outlook.ahead.x"),
                        texts.of("outlook.ahead.y"),
                        true);
    }

    private static double top(AdviceWorking working, List<Alternative> drawn, List<Point> outline) {
        return 1.08
                * DoubleStream.concat(
                                outline.stream().mapToDouble(Point::y),
                                drawn.stream()
                                        .flatMap(a -> path(working, a, 0.5).stream())
                                        .mapToDouble(Point::y))
                        .max()
                        .orElseThrow();
    }

    private static List<Point> path(AdviceWorking working, Alternative a, double p) {
        return IntStream.rangeClosed(0, a.projection().seasons())
                .mapToObj(t -> new Point(working.season() + t, a.projection().biomassQuantiles(t, p)[0]))
                .collect(java.util.stream.Collectors.toCollection(ArrayList::new));
    }
}
