package org.merewarden.records;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;

/**
 * Which kinds of evidence there are for which years.
 *
 * @param rows by kind, in fixed order; kinds without a record are left out
 * @param firstYear of any record; 0 without records
 * @param lastYear of any record; 0 without records
 */
public record EvidenceStrip(List<Row> rows, int firstYear, int lastYear) {
    /**
     * @param kind catches, effort, index, biomass or events
     * @param records number of records by year
     */
    public record Row(String kind, Map<Integer, Long> records) {}

    private static final int WIDTH = 640;
    private static final int LABELS = 80;
    private static final int LINE = 22;

    public static EvidenceStrip of(Evidence evidence) {
        List<Row> rows = Stream.of(
                        row("catches", evidence.catches(), CatchRecord::year),
                        row("effort", evidence.effort(), EffortRecord::year),
                        row("index", evidence.indices(), SurveyRecord::year),
                        row(
                                "biomass",
                                evidence.surveys().stream()
                                        .filter(SurveyRecord::absoluteBiomass)
                                        .toList(),
                                SurveyRecord::year),
                        row("events", evidence.events(), EventRecord::year))
                .filter(r -> !r.records().isEmpty())
                .toList();
        List<Integer> years = rows.stream()
                .flatMap(r -> r.records().keySet().stream())
                .sorted()
                .toList();
        return years.isEmpty()
                ? new EvidenceStrip(rows, 0, 0)
                : new EvidenceStrip(rows, years.get(0), years.get(years.size() - 1));
    }

    private static <T> Row row(String kind, List<T> records, Function<T, Integer> year) {
        return new Row(
                kind, records.stream().collect(Collectors.groupingBy(year, TreeMap::new, Collectors.counting())));
    }

    /**
     * Finished SVG: a line for each kind, a mark for each year with a record.
     *
     * @param labels the kinds' names for people
     */
    public String svg(String title, Function<String, String> labels) {
        int years = lastYear - firstYear + 1;
        double step = (WIDTH - LABELS) / (double) years;
        List<String> parts = new ArrayList<>();
        for (int line = 0; line < rows.size(); line++) {
            Row row = rows.get(line);
            int y = line * LINE;
            parts.add("<text x=\"0\" y=\"%d\" font-size=\"13\" fill=\"currentColor\">%s</text>"
                    .formatted(y + 15, escape(labels.apply(row.kind()))));
            row.records().keySet().forEach(year -> parts.add(mark(LABELS + (year - firstYear) * step, y, step)));
        }
        int bottom = rows.size() * LINE + 14;
        parts.add(year(LABELS, bottom, "start", firstYear));
        parts.add(year(WIDTH, bottom, "end", lastYear));
        return "<svg class=\"strip\" role=\"img\" viewBox=\"0 0 %d %d\" width=\"100%%\" xmlns=\"http://www.w3.org/2000/svg\"><title>%s</title>%s</svg>"
                .formatted(WIDTH, bottom + 4, escape(title), String.join("", parts));
    }

    private static String mark(double x, int y, double step) {
        return String.format(
                java.util.Locale.ROOT,
                "<rect x=\"%.1f\" y=\"%d\" width=\"%.1f\" height=\"14\" fill=\"currentColor\"/>",
                x + step * 0.1,
                y + 4,
                step * 0.8);
    }

    private static String year(int x, int y, String anchor, int year) {
        return "<text x=\"%d\" y=\"%d\" font-size=\"13\" fill=\"currentColor\" text-anchor=\"%s\">%d</text>"
                .formatted(x, y, anchor, year);
    }

    private static String escape(String text) {
        return org.springframework.web.util.HtmlUtils.htmlEscape(text);
    }
}
