package org.merewarden.sharing;

import java.util.Locale;
import org.springframework.web.util.HtmlUtils;

/**
 * Fish now as one plain bar, with its interval, the level below which less is fished and the line below which nothing is;
 * a finished drawing without colour.
 */
final class BiomassBar {
    private static final int WIDTH = 600;

    private BiomassBar() {}

    /**
     * All in tonnes, > 0.
     *
     * @param lessBelow below it less is fished
     * @param nothingBelow below it nothing is fished
     * @param lessLabel, nothingLabel words at the two marks
     * @param title what the picture says, for those who do not see it
     */
    static String svg(
            double low,
            double now,
            double high,
            double lessBelow,
            double nothingBelow,
            String lessLabel,
            String nothingLabel,
            String title) {
        double full = 1.1 * Math.max(high, lessBelow);
        return "<svg class=\"fish-now\" role=\"img\" viewBox=\"0 0 " + WIDTH
                + " 92\" xmlns=\"http://www.w3.org/2000/svg\""
                + " fill=\"none\" stroke=\"currentColor\" font-size=\"13\"><title>" + HtmlUtils.htmlEscape(title)
                + "</title><rect x=\"0.5\" y=\"30.5\" width=\"" + (WIDTH - 1) + "\" height=\"24\"/>"
                + "<rect class=\"fill\" x=\"0.5\" y=\"30.5\" height=\"24\" fill=\"currentColor\" fill-opacity=\"0.35\" width=\""
                + x(now, full) + "\"/>"
                + "<path d=\"M" + x(low, full) + " 42.5H" + x(high, full) + "M" + x(low, full) + " 37v11M"
                + x(high, full) + " 37v11\" stroke-width=\"2\"/>"
                + mark(x(lessBelow, full), lessLabel, 20, lessBelow > full * 0.5, "")
                + mark(x(nothingBelow, full), nothingLabel, 80, nothingBelow > full * 0.5, "5 3") + "</svg>";
    }

    private static String mark(String x, String label, int textY, boolean toTheLeft, String dash) {
        return "<path d=\"M" + x + " 24V61\" stroke-width=\"2\""
                + (dash.isEmpty() ? "" : " stroke-dasharray=\"" + dash + "\"") + "/><text stroke=\"none\""
                + " fill=\"currentColor\" x=\"" + x + "\" y=\"" + textY + "\" text-anchor=\""
                + (toTheLeft ? "end" : "start") + "\">" + HtmlUtils.htmlEscape(label) + "</text>";
    }

    private static String x(double tonnes, double full) {
        return String.format(Locale.ROOT, "%.1f", (WIDTH - 1) * tonnes / full);
    }
}
