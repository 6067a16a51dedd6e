package org.merewarden.portfolio;

import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import org.merewarden.web.Plot;
import org.merewarden.web.Point;

/** A history as SVG, for pages without script and for paper. */
final class HistoryDrawing {
    private HistoryDrawing() {}

    static String draw(History h, String title) {
        return draw(h, title, new Plot(680, 300, h.from(), h.to(), h.yMax()));
    }

    /** For half the width of a sheet of paper. */
    static String onPaper(History h, String title) {
        return draw(h, title, new Plot(420, 330, h.from(), h.to(), h.yMax()));
    }

    private static String draw(History h, String title, Plot plot) {
        List<Point> outline = new ArrayList<>(h.high());
        List<Point> back = new ArrayList<>(h.low());
        Collections.reverse(back);
        outline.addAll(back);
        h.bars().forEach(b -> plot.bar(b.x(), 0.6, b.y(), "removals"));
        plot.area(outline, "band line0").line(h.mid(), "stable line0");
        plot.line(List.of(new Point(h.from(), h.level()), new Point(h.to(), h.level())), "level", "6 4");
        plot.label(new Point(h.to(), h.level()), h.words().level(), "end");
        for (int i = 0; i < h.points().size(); i++) {
            int shape = i;
            h.points().get(i).points().forEach(p -> plot.marker(p, shape, "survey"));
        }
        return plot.svg(title, h.xLabel(), h.yLabel(), true);
    }
}
