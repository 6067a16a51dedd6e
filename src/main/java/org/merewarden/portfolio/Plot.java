package org.merewarden.portfolio;

import java.util.Comparator;
import java.util.List;
import java.util.Locale;
import java.util.stream.Collectors;
import org.merewarden.web.Figures;
import org.springframework.web.util.HtmlUtils;

/** A diagram with two axes as finished SVG; shapes are coloured through classes, and stand in ink without them. */
final class Plot {
    private static final double LEFT = 56;
    private static final double BOTTOM = 44;
    private static final double TOP = 12;
    private static final double RIGHT = 12;
    private static final int TICKS = 5;
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
    private final double width;
    private final double height;
    private final double xMin;
    private final double xMax;
    private final double yMax;

    /** Axes from xMin to xMax and from 0 to yMax; the size is in the drawing's own units, about pixels. */
    Plot(double width, double height, double xMin, double xMax, double yMax) {
        this.width = width;
        this.height = height;
        this.xMin = xMin;
        this.xMax = xMax;
        this.yMax = yMax;
    }

    Plot line(List<Point> points, String cssClass) {
        return line(points, cssClass, "none");
    }

    /** @param dashes lengths of dashes and gaps, or none */
    Plot line(List<Point> points, String cssClass, String dashes) {
        return add(
                "<polyline fill=\"none\" stroke=\"currentColor\" stroke-dasharray=\"%s\" class=\"%s\" points=\"%s\"/>",
                dashes, cssClass, path(points));
    }

    Plot area(List<Point> outline, String cssClass) {
        return add(
                "<polygon fill=\"currentColor\" fill-opacity=\"0.15\" class=\"%s\" points=\"%s\"/>",
                cssClass, path(outline));
    }

    Plot dot(Point at, double radius, boolean filled, String cssClass) {
        return add(
                "<circle fill=\"%s\" stroke=\"currentColor\" class=\"%s\" cx=\"%.1f\" cy=\"%.1f\" r=\"%.1f\"/>",
                filled ? "currentColor" : "none", cssClass, x(at.x()), y(at.y()), radius);
    }

    /** @param shape any number; shapes repeat after eight */
    Plot marker(Point at, int shape, String cssClass) {
        return add(
                "<path fill=\"none\" stroke=\"currentColor\" class=\"%s\" transform=\"translate(%.1f %.1f)\" d=\"%s\"/>",
                cssClass, x(at.x()), y(at.y()), MARKERS.get(shape % MARKERS.size()));
    }

    Plot arrow(Point at, boolean up) {
        double y = y(at.y());
        double tip = up ? y - 6 : y + 6;
        double back = up ? y - 2 : y + 2;
        double x = x(at.x());
        return add(
                "<path fill=\"none\" stroke=\"currentColor\" class=\"flow\" d=\"M%.1f,%.1fV%.1fM%.1f,%.1fL%.1f,%.1fL%.1f,%.1f\"/>",
                x, y + (up ? 6 : -6), tip, x - 3, back, x, tip, x + 3, back);
    }

    Plot bar(double at, double barWidth, double value, String cssClass) {
        double left = x(at - barWidth / 2);
        return add(
                "<rect fill=\"currentColor\" fill-opacity=\"0.4\" class=\"%s\" x=\"%.1f\" y=\"%.1f\" width=\"%.1f\""
                        + " height=\"%.1f\"/>",
                cssClass, left, y(value), x(at + barWidth / 2) - left, y(0) - y(value));
    }

    /** A tick that stands on the horizontal axis. */
    Plot tick(double at, String cssClass) {
        return add(
                "<path stroke=\"currentColor\" stroke-width=\"3\" class=\"%s\" d=\"M%.1f,%.1fv-14\"/>",
                cssClass, x(at), y(0));
    }

    Plot label(Point at, String text, String anchor) {
        return add(
                "<text fill=\"currentColor\" font-size=\"12\" text-anchor=\"%s\" x=\"%.1f\" y=\"%.1f\">%s</text>",
                anchor, x(at.x()), y(at.y()) - 7, HtmlUtils.htmlEscape(text));
    }

    record Label(Point at, String text, String cssClass) {}

    /** Labels beside their points and joined to them, each below the one before where they would overlap. */
    Plot labels(List<Label> labels) {
        List<Label> downwards = labels.stream()
                .sorted(Comparator.comparingDouble((Label l) -> l.at().y()).reversed())
                .toList();
        double[] heights = new double[labels.size()];
        double free = TOP;
        for (int i = 0; i < heights.length; i++) {
            heights[i] = Math.max(free, y(downwards.get(i).at().y()) - 4);
            free = heights[i] + LABEL;
        }
        double lowest = height - BOTTOM - LABEL / 2;
        for (int i = heights.length - 1; i >= 0; i--) {
            heights[i] = Math.min(heights[i], lowest);
            lowest = heights[i] - LABEL;
            label(downwards.get(i), heights[i]);
        }
        return this;
    }

    private void label(Label label, double labelY) {
        double x = x(label.at().x());
        boolean after = x < (LEFT + width - RIGHT) / 2;
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
                HtmlUtils.htmlEscape(label.text()));
    }

    /** The finished drawing, with whole numbers without separators along the axis where it counts years. */
    String svg(String title, String xLabel, String yLabel, boolean years) {
        String axes = axes(xLabel, yLabel, years);
        return String.format(
                Locale.ROOT,
                "<svg class=\"plot\" role=\"img\" viewBox=\"0 0 %.0f %.0f\" xmlns=\"http://www.w3.org/2000/svg\"><title>%s"
                        + "</title>%s%s</svg>",
                width,
                height,
                HtmlUtils.htmlEscape(title),
                axes,
                shapes);
    }

    private String axes(String xLabel, String yLabel, boolean years) {
        Plot axes = new Plot(width, height, xMin, xMax, yMax);
        axes.add(
                "<path fill=\"none\" stroke=\"currentColor\" class=\"axis\" d=\"M%.1f,%.1fV%.1fH%.1f\"/>",
                LEFT, TOP, height - BOTTOM, width - RIGHT);
        double xStep = Math.max(years ? 1 : 0, step(xMax - xMin));
        for (double at = Math.ceil(xMin / xStep) * xStep; at <= xMax; at += xStep) {
            String text = years ? Long.toString(Math.round(at)) : Figures.sig(at);
            axes.text(x(at), height - BOTTOM + 16, "middle", text);
        }
        double yStep = step(yMax);
        for (double at = 0; at <= yMax; at += yStep) {
            axes.text(LEFT - 6, y(at) + 4, "end", Figures.sig(at));
        }
        axes.text((LEFT + width) / 2, height - 8, "middle", xLabel);
        axes.add(
                "<text fill=\"currentColor\" font-size=\"12\" text-anchor=\"middle\" transform=\"translate(13 %.1f)"
                        + " rotate(-90)\">%s</text>",
                (TOP + height - BOTTOM) / 2, HtmlUtils.htmlEscape(yLabel));
        return axes.shapes.toString();
    }

    private void text(double x, double y, String anchor, String text) {
        add(
                "<text fill=\"currentColor\" font-size=\"12\" text-anchor=\"%s\" x=\"%.1f\" y=\"%.1f\">%s</text>",
                anchor, x, y, HtmlUtils.htmlEscape(text));
    }

    /** 1, 2 or 5 times a power of ten, for about five ticks. */
    private static double step(double range) {
        double raw = range / TICKS;
        double power = Math.pow(10, Math.floor(Math.log10(raw)));
        double lead = raw / power;
        return power * (lead < 1.5 ? 1 : lead < 3.5 ? 2 : lead < 7.5 ? 5 : 10);
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

    /** Kept inside the frame, so that a wide range runs along its edge. */
    private double x(double value) {
        double share = (value - xMin) / (xMax - xMin);
        return LEFT + Math.max(0, Math.min(1, share)) * (width - LEFT - RIGHT);
    }

    private double y(double value) {
        double share = Math.max(0, Math.min(1, value / yMax));
        return height - BOTTOM - share * (height - BOTTOM - TOP);
    }
}
