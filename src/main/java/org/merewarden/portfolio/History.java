package org.merewarden.portfolio;

import java.util.List;
import org.merewarden.web.Point;

/**
 * A quantity through the seasons, as the page's data: median with band, a level to compare with, bars and points laid on.
 *
 * @param mid medians, x the season
 * @param low lower ends of the 80 % band, as many as mid
 * @param high upper ends, as many as mid
 */
record History(
        String xLabel,
        String yLabel,
        double from,
        double to,
        double yMax,
        List<Point> mid,
        List<Point> low,
        List<Point> high,
        double level,
        List<Point> bars,
        List<Series> points,
        Words words) {
    record Words(String mid, String band, String level, String bars) {}

    record Series(String name, List<Point> points) {}
}
