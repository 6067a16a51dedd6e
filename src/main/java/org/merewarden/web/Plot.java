package org.merewarden.web;

import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.stream.Collectors;
import org.springframework.web.util.HtmlUtils;

/** A diagram with two axes as finished SVG; shapes are coloured through classes, and stand in ink without them. */
public final class Plot {
    /** Height of a line of labels. */
    private static final double LABEL = 15;
    /** Eight markers, told apart by shape: paths about (0, 0). */
    private static final List<String> MARKERS = List.of(
            "M-4,0a4,4 0 1,0 8,0a4,4 0 1,0 -8,0",
            "M-4,-4h8v8h-8z",
            "M0,-5L5,4H-5z",
            "M0,-5L5,0L0,5L-5,0z",
            "M-4,0H4M0,-4V4",
            "M-4,-4L4,4M-4,4L4,-4",
            "M0,5L5,-4H-5z",
            "M-4,0H4M-2,-4L2,4M-2,4L2,-4");

    private final StringBuilder shapes = new StringBuilder();
    private final PlotFrame frame;

    /** Axes from xMin to xMax and from 0 to yMax; the size is in the drawing's own units, about pixels. */
    public Plot(double width, double height, double xMin, double xMax, double yMax) {
        this(width, height, xMin, xMax, 0, yMax);
    }

    /** The same with a vertical axis that begins at yMin. */
    public Plot(double width, double height, double xMin, double xMax, double yMin, double yMax) {
        frame = new PlotFrame(width, height, xMin, xMax, yMin, yMax);
    }

    public Plot line(List<Point> points, String cssClass) {
        return line(points, cssClass, "none");
    }

    /** @param dashes lengths of dashes and gaps, or none */
    public Plot line(List<Point> points, String cssClass, String dashes) {
        return add(
                "<polyline fill=\"none\" stroke=\"currentColor\" stroke-dasharray=\"%s\" class=\"%s\" points=\"%s\"/>",
                dashes, cssClass, path(points));
    }

    public Plot area(List<Point> outline, String cssClass) {
        return add(
                "<polygon fill=\"currentColor\" fill-opacity=\"0.15\" class=\"%s\" points=\"%s\"/>",
                cssClass, path(outline));
    }

    public Plot dot(Point at, double radius, boolean filled, String cssClass) {
        return add(
                "<circle fill=\"%s\" stroke=\"currentColor\" class=\"%s\" cx=\"%.1f\" cy=\"%.1f\" r=\"%.1f\"/>",
                filled ? "currentColor" : "none", cssClass, x(at.x()), y(at.y()), radius);
    }

    /** @param shape any number; shapes repeat after eight */
    public Plot marker(Point at, int shape, String cssClass) {
        return add(
                "<path fill=\"none\" stroke=\"currentColor\" class=\"%s\" transform=\"translate(%.1f %.1f)\" d=\"%s\"/>",
                cssClass, x(at.x()), y(at.y()), MARKERS.get(shape % MARKERS.size()));
    }

    public Plot arrow(Point at, boolean up) {
        double y = y(at.y());
        double tip = up ? y - 6 : y + 6;
        double back = up ? y - 2 : y + 2;
        double x = x(at.x());
        return add(
                "<path fill=\"none\" stroke=\"currentColor\" class=\"flow\" d=\"M%.1f,%.1fV%.1fM%.1f,%.1fL%.1f,%.1fL%.1f,%.1f\"/>",
                x, y + (up ? 6 : -6), tip, x - 3, back, x, tip, x + 3, back);
    }

    public Plot bar(double at, double barWidth, double value, String cssClass) {
        double left = x(at - barWidth / 2);
        return add(
                "<rect fill=\"currentColor\" fill-opacity=\"0.4\" class=\"%s\" x=\"%.1f\" y=\"%.1f\" width=\"%.1f\""
                        + " height=\"%.1f\"/>",
                cssClass, left, y(value), x(at + barWidth / 2) - left, y(0) - y(value));
    }

    /** A tick that stands on the horizontal axis. */
    public Plot tick(double at, String cssClass) {
        return add(
                "<path stroke=\"currentColor\" stroke-width=\"3\" class=\"%s\" d=\"M%.1f,%.1fv-14\"/>",
                cssClass, x(at), y(0));
    }

    public Plot label(Point at, String text, String anchor) {
        return add(
                "<text fill=\"currentColor\" font-size=\"12\" text-anchor=\"%s\" x=\"%.1f\" y=\"%.1f\">%s</text>",
                anchor, x(at.x()), y(at.y()) - 7, HtmlUtils.htmlEscape(text, "UTF-8"));
    }

    /** A name to stand beside a point. */
    public record Label(Point at, String text, String cssClass) {}

    /** Labels beside their points and joined to them, each below the one before where they would overlap. */
    public Plot labels(List<Label> labels) {
        List<Label> downwards = labels.stream()
                .sorted(Comparator.comparingDouble((Label l) -> l.at().y()).reversed())
                .toList();
        double[] heights = new double[labels.size()];
        double free = PlotFrame.TOP;
        for (int i = 0; i < heights.length; i++) {
            heights[i] = Math.max(free, y(downwards.get(i).at().y()) - 4);
            free = heights[i] + LABEL;
        }
        double lowest = frame.height() - PlotFrame.BOTTOM - LABEL / 2;
        for (int i = heights.length - 1; i >= 0; i--) {
            heights[i] = Math.min(heights[i], lowest);
            lowest = heights[i] - LABEL;
            label(downwards.get(i), heights[i]);
        }
        return this;
    }

    private void label(Label label, double labelY) {
        double x = x(label.at().x());
        boolean after = x < (PlotFrame.LEFT + frame.width() - PlotFrame.RIGHT) / 2;
        double end = x + (after ? 16 : -16);
        add(
                "<path fill=\"none\" stroke=\"currentColor\" stroke-width=\"0.75\" class=\"%s\" d=\"M%.1f,%.1fL%.1f,%.1f\"/>",
                label.cssClass(), x, y(label.at().y()), end, labelY);
        add(
                "<text fill=\"currentColor\" font-size=\"12\" class=\"%s\" text-anchor=\"%s\" x=\"%.1f\" y=\"%.1f\">%s</text>",
                label.cssClass(),
                after ? "start" : "end",
                end + (after ? 2 : -2),
                labelY + 4,
                HtmlUtils.htmlEscape(label.text(), "UTF-8"));
    }

    /** The finished drawing, with whole numbers without separators along the axis where it counts years. */
    public String svg(String title, String xLabel, String yLabel, boolean years) {
        return String.format(
                Locale.ROOT,
                "<svg class=\"plot\" role=\"img\" viewBox=\"0 0 %.0f %.0f\" xmlns=\"http://www.w3.org/2000/svg\"><title>%s"
                        + "</title>%s%s</svg>",
                frame.width(),
                frame.height(),
                HtmlUtils.htmlEscape(title, "UTF-8"),
                frame.axes(xLabel, yLabel, years),
                shapes);
    }

    private Plot add(String format, Object... values) {
        shapes.append(String.format(Locale.ROOT, format, values));
        return this;
    }

    private String path(List<Point> points) {
        return points.stream()
                .map(p -> String.format(Locale.ROOT, "%.1f,%.1f", x(p.x()), y(p.y())))
                .collect(Collectors.joining(" "));
    }

    private double x(double value) {
        return frame.x(value);
    }

    private double y(double value) {
        return frame.y(value);
    }
}
