package org.merewarden.portfolio;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.ArrayList;
import java.util.List;
import java.util.function.ToDoubleFunction;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.web.Point;

/**
 * An equilibrium diagram in its own units, as the page's data: the same for the script and for the drawing without one.
 * Catch runs to the right, biomass upwards.
 *
 * @param words names of what is drawn, for the legend and labels
 */
record Diagram(String xLabel, String yLabel, double xMax, double yMax, List<Series> stocks, Words words) {
    private static final MathContext DIGITS = new MathContext(5);
    private static final int ARROW_COLUMNS = 6;
    private static final int ARROW_ROWS = 7;
    /** Room around what is drawn. */
    private static final double ROOM = 1.08;
    /** A range may stretch an axis to so many times what the curves and positions need; beyond, it is cut. */
    private static final double STRETCH = 1.5;

    record Words(String stable, String unstable, String fold, String now, String limit, String cloud, String band) {}

    /** @param up whether biomass grows at this place under this catch, held */
    record Arrow(double x, double y, boolean up) {}

    /** A rectangle of ranges of catch (x) and biomass (y). */
    record Box(double left, double right, double bottom, double top) {
        /** Its outline, closed. */
        List<Point> outline() {
            return List.of(
                    new Point(left, bottom),
                    new Point(right, bottom),
                    new Point(right, top),
                    new Point(left, top),
                    new Point(left, bottom));
        }
    }

    /**
     * One stock.
     *
     * @param style 0–11: marker and width by which it is told from the others
     * @param cloud empty unless in focus
     * @param band empty unless in focus
     * @param arrows empty unless in focus
     */
    record Series(
            String name,
            int style,
            boolean focus,
            List<Point> stable,
            List<Point> unstable,
            Point fold,
            Point now,
            Box half,
            Box most,
            List<Point> cloud,
            List<Point> band,
            @Nullable Double limit,
            List<Arrow> arrows) {
        /** What must be seen whole. */
        private Stream<Point> extent() {
            return Stream.concat(
                    Stream.of(stable, unstable).flatMap(List::stream),
                    Stream.of(fold, now, new Point(limit == null ? 0 : limit, 0)));
        }
    }

    /** @param focus index of the stock with arrows, band and cloud; −1 for none */
    static Diagram of(List<StockCurve> curves, Axes axes, int focus, String xLabel, String yLabel, Words words) {
        List<Series> plain = new ArrayList<>();
        for (int i = 0; i < curves.size(); i++) {
            plain.add(series(curves.get(i), axes, i, i == focus));
        }
        double xMax = end(plain, Point::x, s -> s.most().right());
        double yMax = end(plain, Point::y, s -> s.most().top());
        if (focus >= 0) {
            Series s = plain.get(focus);
            List<Arrow> arrows = arrows(curves.get(focus), axes, xMax, yMax);
            plain.set(focus, withArrows(s, arrows));
        }
        return new Diagram(xLabel, yLabel, rounded(xMax), rounded(yMax), List.copyOf(plain), words);
    }

    /** Where an axis ends: a range that little is known of must not press the curves flat. */
    private static double end(List<Series> all, ToDoubleFunction<Point> axis, ToDoubleFunction<Series> range) {
        double needed =
                all.stream().flatMap(Series::extent).mapToDouble(axis).max().orElse(1);
        double widest = all.stream().mapToDouble(range).max().orElse(needed);
        return ROOM * Math.max(needed, Math.min(widest, STRETCH * needed));
    }

    private static Series series(StockCurve c, Axes axes, int style, boolean focus) {
        double x = axes.catchFactor(c);
        double y = axes.biomassFactor(c);
        Spread taken = c.catchNow().times(x);
        Spread biomass = c.biomassNow().times(y);
        return new Series(
                c.entry().stock().title(),
                style,
                focus,
                scaled(c.stable(), x, y),
                scaled(c.unstable(), x, y),
                scaled(c.fold(), x, y),
                new Point(rounded(taken.mid()), rounded(biomass.mid())),
                box(taken.low50(), taken.high50(), biomass.low50(), biomass.high50()),
                box(taken.low80(), taken.high80(), biomass.low80(), biomass.high80()),
                focus ? scaled(c.cloud(), x, y) : List.of(),
                focus ? scaled(c.band(), x, y) : List.of(),
                c.limitTonnes() == null ? null : rounded(c.limitTonnes() * x),
                List.of());
    }

    private static Series withArrows(Series s, List<Arrow> arrows) {
        return new Series(
                s.name(),
                s.style(),
                true,
                s.stable(),
                s.unstable(),
                s.fold(),
                s.now(),
                s.half(),
                s.most(),
                s.cloud(),
                s.band(),
                s.limit(),
                arrows);
    }

    /** Which way biomass drifts, on a grid over the diagram: up between the branches, down outside. */
    private static List<Arrow> arrows(StockCurve c, Axes axes, double xMax, double yMax) {
        SurplusProduction law = c.law();
        List<Arrow> arrows = new ArrayList<>();
        for (int i = 0; i < ARROW_COLUMNS; i++) {
            for (int j = 0; j < ARROW_ROWS; j++) {
                double x = xMax * (i + 0.5) / ARROW_COLUMNS;
                double y = yMax * (j + 0.5) / ARROW_ROWS;
                boolean up = law.rate(y / axes.biomassFactor(c)) > x / axes.catchFactor(c);
                arrows.add(new Arrow(rounded(x), rounded(y), up));
            }
        }
        return arrows;
    }

    private static List<Point> scaled(List<Point> points, double x, double y) {
        return points.stream().map(p -> scaled(p, x, y)).toList();
    }

    private static Point scaled(Point p, double x, double y) {
        return new Point(rounded(p.x() * x), rounded(p.y() * y));
    }

    private static Box box(double left, double right, double bottom, double top) {
        return new Box(rounded(left), rounded(right), rounded(bottom), rounded(top));
    }

    /** Five significant digits are finer than a pixel and a third of the bytes. */
    private static double rounded(double value) {
        return new BigDecimal(value).round(DIGITS).doubleValue();
    }
}
