package org.merewarden.portfolio;

import java.util.stream.IntStream;
import org.merewarden.web.Plot;
import org.merewarden.web.Point;

/** An equilibrium diagram as SVG, for pages without script and for paper. */
final class DiagramDrawing {
    /** Along a branch every so many points carry the stock's marker, each stock at points of its own. */
    private static final int MARKER_EVERY = 9;

    private DiagramDrawing() {}

    static String large(Diagram diagram, String title) {
        return draw(diagram, title, 680, 460);
    }

    /** For half the width of a sheet of paper. */
    static String onPaper(Diagram diagram, String title) {
        return draw(diagram, title, 420, 330);
    }

    static String small(Diagram diagram, String title) {
        return draw(diagram, title, 300, 230);
    }

    private static String draw(Diagram diagram, String title, double width, double height) {
        Plot plot = new Plot(width, height, 0, diagram.xMax(), diagram.yMax());
        boolean several = diagram.stocks().size() > 1;
        diagram.stocks().forEach(s -> draw(plot, s, several));
        if (several) {
            plot.labels(diagram.stocks().stream().map(DiagramDrawing::label).toList());
        }
        return plot.svg(title, diagram.xLabel(), diagram.yLabel(), false);
    }

    private static void draw(Plot plot, Diagram.Series s, boolean several) {
        String line = "line" + s.style() % 8 + (s.style() < 8 ? "" : " thick");
        if (!s.band().isEmpty()) {
            plot.area(s.band(), "band " + line);
        }
        s.arrows().forEach(a -> plot.arrow(new Point(a.x(), a.y()), a.up()));
        s.cloud().forEach(p -> plot.dot(p, 1.5, true, "cloud " + line));
        plot.line(s.stable(), "stable " + line).line(s.unstable(), "unstable " + line, "6 4");
        if (several) {
            IntStream.range(0, s.stable().size())
                    .filter(i -> (i + s.style()) % MARKER_EVERY == MARKER_EVERY / 2)
                    .forEach(i -> plot.marker(s.stable().get(i), s.style(), line));
        }
        plot.line(s.most().outline(), "range " + line).line(s.half().outline(), "range half " + line);
        plot.dot(s.fold(), 5, false, "fold " + line).dot(s.now(), 4, true, "now " + line);
        if (s.limit() != null) {
            plot.tick(s.limit(), "limit " + line);
        }
    }

    /** Names stand beside the present positions: in shares the curves themselves may coincide. */
    private static Plot.Label label(Diagram.Series s) {
        return new Plot.Label(s.now(), s.name(), "line" + s.style() % 8);
    }
}
