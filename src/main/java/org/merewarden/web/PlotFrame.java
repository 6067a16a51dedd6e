package org.merewarden.web;

import java.util.Locale;
import org.springframework.web.util.HtmlUtils;

/** Axes of a drawing: where a value stands on the paper, and the lines, ticks and names about it. */
record PlotFrame(double width, double height, double xMin, double xMax, double yMin, double yMax) {
    static final double LEFT = 56;
    static final double BOTTOM = 44;
    static final double TOP = 12;
    static final double RIGHT = 12;
    private static final int TICKS = 5;

    /** Kept inside the frame, so that a wide range runs along its edge. */
    double x(double value) {
        return LEFT + share(value, xMin, xMax) * (width - LEFT - RIGHT);
    }

    double y(double value) {
        return height - BOTTOM - share(value, yMin, yMax) * (height - BOTTOM - TOP);
    }

    private static double share(double value, double from, double to) {
        return Math.max(0, Math.min(1, (value - from) / (to - from)));
    }

    /** @param years whole numbers without separators along the horizontal axis */
    String axes(String xLabel, String yLabel, boolean years) {
        StringBuilder axes = new StringBuilder(String.format(
                Locale.ROOT,
                "<path fill=\"none\" stroke=\"currentColor\" class=\"axis\" d=\"M%.1f,%.1fV%.1fH%.1f\"/>",
                LEFT,
                TOP,
                height - BOTTOM,
                width - RIGHT));
        double xStep = Math.max(years ? 1 : 0, step(xMax - xMin));
        for (double at = Math.ceil(xMin / xStep) * xStep; at <= xMax; at += xStep) {
            String text = years ? Long.toString(Math.round(at)) : Figures.sig(at);
            axes.append(text(x(at), height - BOTTOM + 16, "middle", text));
        }
        double yStep = step(yMax - yMin);
        for (double at = Math.ceil(yMin / yStep) * yStep; at <= yMax; at += yStep) {
            axes.append(text(LEFT - 6, y(at) + 4, "end", Figures.sig(at)));
        }
        axes.append(text((LEFT + width) / 2, height - 8, "middle", xLabel));
        axes.append(String.format(
                Locale.ROOT,
                "<text fill=\"currentColor\" font-size=\"12\" text-anchor=\"middle\" transform=\"translate(13 %.1f)"
                        + " rotate(-90)\">%s</text>",
                (TOP + height - BOTTOM) / 2,
                HtmlUtils.htmlEscape(yLabel, "UTF-8")));
        return axes.toString();
    }

    private static String text(double x, double y, String anchor, String text) {
        return String.format(
                Locale.ROOT,
                "<text fill=\"currentColor\" font-size=\"12\" text-anchor=\"%s\" x=\"%.1f\" y=\"%.1f\">%s</text>",
                anchor,
                x,
                y,
                HtmlUtils.htmlEscape(text, "UTF-8"));
    }

    /** 1, 2 or 5 times a power of ten, for about five ticks. */
    private static double step(double range) {
        double raw = range / TICKS;
        double power = Math.pow(10, Math.floor(Math.log10(raw)));
        double lead = raw / power;
        return power * (lead < 1.5 ? 1 : lead < 3.5 ? 2 : lead < 7.5 ? 5 : 10);
    }
}
