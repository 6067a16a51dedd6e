package org.merewarden.season;

import java.time.LocalDate;
import java.time.temporal.ChronoUnit;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.TreeMap;
import org.jspecify.annotations.Nullable;
import org.merewarden.season.Takings.Day;
import org.merewarden.web.Figures;
import org.springframework.web.util.HtmlUtils;

/**
 * Cumulative catch over the days of a season as one finished drawing: the season drawn whole, earlier ones dashed behind
 * it, the limit as a level. Lines are told apart by dash and by their year written at the end, never by colour alone.
 */
final class CumulativeChart {
    private static final int LEFT = 60;
    private static final int RIGHT = 590;
    private static final int TOP = 16;
    private static final int BOTTOM = 244;
    private static final List<String> DASHES = List.of("", "7 4", "2 3", "9 3 2 3");

    private final int season;
    private final LocalDate start;
    private final @Nullable Double limitTonnes;
    private final Map<Integer, TreeMap<Long, Double>> cumulative = new TreeMap<>();

    /**
     * @param start first day of the season
     * @param limitTonnes the amount to be logged; null where there is no catch limit
     */
    CumulativeChart(int season, LocalDate start, List<Day> days, @Nullable Double limitTonnes) {
        this.season = season;
        this.start = start;
        this.limitTonnes = limitTonnes;
        for (Day day : days) {
            TreeMap<Long, Double> line = cumulative.computeIfAbsent(day.season(), s -> new TreeMap<>());
            double before = line.isEmpty() ? 0 : line.lastEntry().getValue();
            LocalDate first = start.withYear(day.season());
            line.put(ChronoUnit.DAYS.between(first, day.date()), before + day.takenKg() / 1000);
        }
    }

    /** Seasons with landings, earliest first. */
    List<Integer> seasons() {
        return List.copyOf(cumulative.keySet());
    }

    /** Tonnes taken in that season's first months; 0 where nothing is logged. */
    double afterMonths(int ofSeason, int months) {
        LocalDate first = start.withYear(ofSeason);
        long day = ChronoUnit.DAYS.between(first, first.plusMonths(months));
        TreeMap<Long, Double> line = cumulative.getOrDefault(ofSeason, new TreeMap<>());
        Map.Entry<Long, Double> entry = line.lowerEntry(day);
        return entry == null ? 0 : entry.getValue();
    }

    String svg(String title, String limitLabel) {
        double top = Math.max(
                limitTonnes == null ? 0 : limitTonnes,
                cumulative.values().stream()
                        .mapToDouble(line -> line.lastEntry().getValue())
                        .max()
                        .orElse(0));
        double scale = top > 0 ? top * 1.08 : 1;
        StringBuilder drawing = new StringBuilder("<svg class=\"cumulative\" role=\"img\" viewBox=\"0 0 640 270\""
                + " xmlns=\"http://www.w3.org/2000/svg\" fill=\"none\" stroke=\"currentColor\" font-size=\"12\"><title>"
                + HtmlUtils.htmlEscape(title) + "</title>");
        axes(drawing, top, scale);
        if (limitTonnes != null) {
            double y = y(limitTonnes, scale);
            drawing.append(path("limit", "M" + LEFT + " " + n(y) + "H" + RIGHT, 1.5, "12 4"));
            drawing.append(text(LEFT + 4, y - 4, limitLabel, "start"));
        }
        cumulative.forEach((year, line) -> drawing.append(line(year, line, scale)));
        return drawing.append("</svg>").toString();
    }

    private void axes(StringBuilder drawing, double top, double scale) {
        drawing.append(path("axis", "M" + LEFT + " " + TOP + "V" + BOTTOM + "H" + RIGHT, 1, ""));
        for (double level : new double[] {0, top / 2, top}) {
            drawing.append(text(LEFT - 6, y(level, scale) + 4, Figures.tonnes(level), "end"));
        }
        for (int month = 0; month < 12; month += 2) {
            LocalDate date = start.plusMonths(month);
            String name = date.getMonth()
                    .getDisplayName(
                            java.time.format.TextStyle.SHORT,
                            org.springframework.context.i18n.LocaleContextHolder.getLocale());
            drawing.append(text(x(ChronoUnit.DAYS.between(start, date)), BOTTOM + 18, name, "start"));
        }
    }

    private String line(int year, TreeMap<Long, Double> line, double scale) {
        StringBuilder d = new StringBuilder("M" + LEFT + " " + BOTTOM);
        line.forEach(
                (day, tonnes) -> d.append("H").append(n(x(day))).append("V").append(n(y(tonnes, scale))));
        int age = Math.min(DASHES.size() - 1, Math.max(0, season - year));
        double endX = x(line.lastKey());
        double endY = y(line.lastEntry().getValue(), scale);
        return path(age == 0 ? "present" : "earlier", d.toString(), age == 0 ? 2.5 : 1.2, DASHES.get(age))
                + text(Math.min(endX + 4, RIGHT + 4), endY + 4, String.valueOf(year), "start");
    }

    private static String path(String kind, String d, double width, String dash) {
        return "<path class=\"" + kind + "\" d=\"" + d + "\" stroke-width=\"" + width + "\""
                + (dash.isEmpty() ? "" : " stroke-dasharray=\"" + dash + "\"") + "/>";
    }

    private static String text(double x, double y, String text, String anchor) {
        return "<text stroke=\"none\" fill=\"currentColor\" x=\"" + n(x) + "\" y=\"" + n(y) + "\" text-anchor=\""
                + anchor + "\">" + HtmlUtils.htmlEscape(text) + "</text>";
    }

    private static double x(long day) {
        return LEFT + (RIGHT - LEFT) * Math.min(366, Math.max(0, day)) / 366.0;
    }

    private static double y(double tonnes, double scale) {
        return BOTTOM - (BOTTOM - TOP) * tonnes / scale;
    }

    private static String n(double value) {
        return String.format(Locale.ROOT, "%.1f", value);
    }
}
