package org.merewarden.assessment;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import org.merewarden.core.inference.Diagnostics.Peel;
import org.merewarden.core.inference.Diagnostics.Residual;
import org.merewarden.web.Plot;
import org.merewarden.web.Point;

/** Residuals and peels as SVG, small enough to be read on a phone. */
final class CheckDrawings {
    private static final double WIDTH = 360;
    private static final double HEIGHT = 220;
    private static final double TALL = 280;
    /** Seasons shown before the shortest peel ends. */
    private static final int BEFORE = 8;
    /** Dashes by which the peels are told from each other; the full data are solid. */
    private static final List<String> DASHES = List.of("none", "7 3", "2 2", "9 3 2 3", "4 4", "1 3");

    private CheckDrawings() {}

    /** A stem for each residual, zero as a line, ±2 dashed: 19 of 20 should lie between. */
    static String residuals(List<Residual> residuals, String title, String xLabel, String yLabel) {
        int first = residuals.get(0).year();
        int last = residuals.get(residuals.size() - 1).year();
        double furthest = residuals.stream()
                .mapToDouble(r -> Math.abs(r.standardised()))
                .max()
                .orElse(0);
        double from = first - 0.5;
        double to = last + 0.99;
        double end = Math.max(3, Math.ceil(furthest));
        Plot plot = new Plot(WIDTH, HEIGHT, from, to, -end, end);
        plot.line(level(from, to, 0), "level");
        plot.line(level(from, to, 2), "level", "6 4").line(level(from, to, -2), "level", "6 4");
        for (Residual r : residuals) {
            Point at = new Point(r.year() + r.timeOfYear(), r.standardised());
            plot.line(List.of(new Point(at.x(), 0), at), "line0").dot(at, 3.5, true, "line0");
        }
        return plot.svg(title, xLabel, yLabel, true);
    }

    private static List<Point> level(double from, double to, double at) {
        return List.of(new Point(from, at), new Point(to, at));
    }

    /** B/BMSY of each peel over the last seasons, its last one marked and named; the level 1 is BMSY. */
    static String peels(List<Peel> peels, String title, String xLabel, String yLabel) {
        int last = peels.get(0).lastYear();
        List<List<Point>> paths =
                peels.stream().map(p -> path(p, last - peels.size() - BEFORE)).toList();
        double from = paths.get(0).get(0).x() - 0.5;
        double to = last + 1.5;
        double top = paths.stream().flatMap(List::stream).mapToDouble(Point::y).reduce(1, Math::max);
        Plot plot = new Plot(WIDTH, TALL, from, to, 1.1 * top);
        plot.line(level(from, to, 1), "level", "12 4");
        List<Plot.Label> names = new ArrayList<>();
        for (int i = 0; i < paths.size(); i++) {
            List<Point> path = paths.get(i);
            Point end = path.get(path.size() - 1);
            String line = "line" + i % 8;
            plot.line(path, i == 0 ? line + " thick" : line, DASHES.get(i % DASHES.size()))
                    .marker(end, i, line);
            names.add(new Plot.Label(end, Integer.toString(peels.get(i).lastYear()), line));
        }
        return plot.labels(names).svg(title, xLabel, yLabel, true);
    }

    private static List<Point> path(Peel peel, int from) {
        int first = peel.lastYear() - peel.relativeBiomass().size() + 1;
        return IntStream.range(0, peel.relativeBiomass().size())
                .filter(t -> first + t >= from)
                .mapToObj(t -> new Point(first + t, peel.relativeBiomass().get(t)))
                .toList();
    }
}
