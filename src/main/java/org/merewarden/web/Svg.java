package org.merewarden.web;

import java.util.List;
import java.util.Locale;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.springframework.web.util.HtmlUtils;

/**
 * Small drawings that must exist without a script: finished SVG, coloured through classes by the style sheet. Each is one
 * image with the given title as its text; put into a page with {@code th:utext}.
 */
public final class Svg {
    private static final int WIDTH = 120;
    private static final int HEIGHT = 16;

    private Svg() {}

    /**
     * What is taken of a limit: the bar's full length is the limit, or the amount taken where that is more, with a tick at
     * the limit.
     *
     * @param taken ≥ 0, same unit as the limit
     * @param limit ≥ 0
     */
    public static String barToLimit(double taken, double limit, String title) {
        double full = Math.max(taken, limit);
        double filled = full > 0 ? WIDTH * Math.max(0, taken) / full : 0;
        double tick = full > 0 ? WIDTH * limit / full : 0;
        String over = taken > limit ? rect("over", tick, 4, filled - tick, 8) : "";
        return image(
                "bar",
                title,
                rect("track", 0, 4, WIDTH, 8)
                        + rect("fill", 0, 4, Math.min(filled, tick), 8)
                        + over
                        + line("tick", Math.min(tick, WIDTH - 1), 1, Math.min(tick, WIDTH - 1), 15));
    }

    /**
     * A short bar about zero in the middle: to the right where positive, to the left (other class) where negative.
     *
     * @param halfRange > 0: the value at which the bar fills its half; larger ones are cut there
     */
    public static String barAboutZero(double value, double halfRange, String title) {
        double middle = WIDTH / 2.0;
        double length = middle * Math.min(1, Math.abs(value) / halfRange);
        String bar = value < 0
                ? rect("below", middle - length, 4, length, 8)
                : Double.isFinite(length) ? rect("fill", middle, 4, length, 8) : "";
        return image("bar", title, rect("track", 0, 4, WIDTH, 8) + bar + line("tick", middle, 1, middle, 15));
    }

    /**
     * A line with its band over equally spaced times, scaled from zero to the largest upper end.
     *
     * @param mid the line, at least one value
     * @param low lower ends of the band, as many as mid
     * @param high upper ends of the band, as many as mid
     * @param reference a level to mark across the picture, or null
     */
    public static String lineWithBand(
            List<Double> mid, List<Double> low, List<Double> high, @Nullable Double reference, String title) {
        if (mid.isEmpty() || mid.size() != low.size() || mid.size() != high.size()) {
            throw new IllegalArgumentException("line, lower and upper ends must be as many and at least one: "
                    + mid.size() + ", " + low.size() + ", " + high.size());
        }
        double top = IntStream.range(0, mid.size())
                .mapToDouble(i -> Math.max(mid.get(i), high.get(i)))
                .reduce(reference == null ? 0 : reference, Math::max);
        String band = points(high, top, false) + " " + points(low, top, true);
        String mark = reference == null ? "" : line("level", 0, y(reference, top), WIDTH, y(reference, top));
        double lastX = x(mid.size() - 1, mid.size());
        return image(
                "bar",
                title,
                "<polygon class=\"band\" points=\"" + band + "\"/>" + mark + "<polyline class=\"path\" points=\""
                        + points(mid, top, false) + "\"/><circle class=\"now\" cx=\"" + number(lastX) + "\" cy=\""
                        + number(y(mid.get(mid.size() - 1), top)) + "\" r=\"2\"/>");
    }

    /** A range with its middle: low ≤ mid ≤ high, all > 0. */
    public record Range(double low, double mid, double high) {}

    /**
     * What was thought before and after, on a logarithmic axis: a thin line for the range before with a tick at its middle,
     * a thick line with a dot for the one after, short ticks at the axis' ends. What lies beyond them is cut.
     *
     * @param before its middle stands in the middle of the picture
     * @param factor > 1: the axis runs from the middle divided by it to the middle times it
     */
    public static String beforeAndAfter(Range before, Range after, double factor, String title) {
        double middle = WIDTH / 2.0;
        return image(
                "bar",
                title,
                line("end", 0.5, 5, 0.5, 11)
                        + line("end", WIDTH - 0.5, 5, WIDTH - 0.5, 11)
                        + line("before", log(before.low(), before, factor), 8, log(before.high(), before, factor), 8)
                        + line("middle", middle, 2, middle, 14)
                        + line("after", log(after.low(), before, factor), 8, log(after.high(), before, factor), 8)
                        + "<circle class=\"now\" cx=\"" + number(log(after.mid(), before, factor))
                        + "\" cy=\"8\" r=\"2.5\"/>");
    }

    private static double log(double value, Range about, double factor) {
        double share = Math.log(value / about.mid()) / Math.log(factor);
        return WIDTH / 2.0 * (1 + Math.max(-1, Math.min(1, share)));
    }

    private static String points(List<Double> values, double top, boolean backwards) {
        int n = values.size();
        return IntStream.range(0, n)
                .map(i -> backwards ? n - 1 - i : i)
                .mapToObj(i -> number(x(i, n)) + "," + number(y(values.get(i), top)))
                .collect(Collectors.joining(" "));
    }

    private static double x(int i, int n) {
        return n == 1 ? WIDTH / 2.0 : 2 + (WIDTH - 4.0) * i / (n - 1);
    }

    private static double y(double value, double top) {
        return top > 0 ? HEIGHT - 1 - (HEIGHT - 2) * value / top : HEIGHT - 1;
    }

    private static String image(String kind, String title, String content) {
        return "<svg class=\"" + kind + "\" role=\"img\" viewBox=\"0 0 " + WIDTH + " " + HEIGHT + "\" width=\"" + WIDTH
                + "\" height=\"" + HEIGHT + "\" xmlns=\"http://www.w3.org/2000/svg\"><title>"
                + HtmlUtils.htmlEscape(title, "UTF-8") + "</title>" + content + "</svg>";
    }

    private static String rect(String kind, double x, double y, double width, double height) {
        return "<rect class=\"" + kind + "\" x=\"" + number(x) + "\" y=\"" + number(y) + "\" width=\""
                + number(Math.max(0, width)) + "\" height=\"" + number(height) + "\"/>";
    }

    private static String line(String kind, double x1, double y1, double x2, double y2) {
        return "<line class=\"" + kind + "\" x1=\"" + number(x1) + "\" y1=\"" + number(y1) + "\" x2=\"" + number(x2)
                + "\" y2=\"" + number(y2) + "\"/>";
    }

    private static String number(double value) {
        return String.format(Locale.ROOT, "%.1f", value);
    }
}
