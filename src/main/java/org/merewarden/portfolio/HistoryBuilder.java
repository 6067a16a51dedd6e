package org.merewarden.portfolio;

import static java.util.stream.Collectors.groupingBy;

import java.util.ArrayList;
import java.util.List;
import java.util.OptionalDouble;
import java.util.TreeMap;
import java.util.function.ToDoubleFunction;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.web.Figures;
import org.merewarden.web.PageJson;
import org.merewarden.web.Point;
import org.springframework.stereotype.Component;

/** Biomass and fishing through the assessed seasons: two charts and the table of the same numbers. */
@Component
class HistoryBuilder {
    private static final double ROOM = 1.08;
    /** The band may stretch the axis to so many times what the line, bars and surveys need; beyond, it is cut. */
    private static final double STRETCH = 2.5;

    private final Texts texts;

    HistoryBuilder(Texts texts) {
        this.texts = texts;
    }

    /** Biomass at each season's start, BMSY, removals as bars, surveys laid on. */
    StockPage.Figure biomass(Posterior posterior, Evidence evidence) {
        return figure("biomass", biomassHistory(posterior, evidence));
    }

    /** The same as a drawing for half the width of a sheet of paper. */
    String onPaper(Posterior posterior, Evidence evidence) {
        return HistoryDrawing.onPaper(biomassHistory(posterior, evidence), texts.get("history.biomass.title"));
    }

    private History biomassHistory(Posterior posterior, Evidence evidence) {
        List<Spread> biomass = biomass(posterior);
        double bmsy = median(posterior, posterior::bmsy);
        List<Point> removals = removals(posterior, evidence);
        return history("biomass", posterior, biomass, bmsy, removals, surveys(posterior, evidence, biomass));
    }

    /** Fishing mortality of each season, and FMSY. */
    StockPage.Figure fishing(Posterior posterior) {
        double fmsy = median(posterior, draw -> posterior.fmsyPerYear()[draw]);
        return figure("fishing", history("fishing", posterior, fishingBySeason(posterior), fmsy, List.of(), List.of()));
    }

    /** One row for each season and one for the start of the season after the last. */
    List<StockPage.HistoryRow> table(Posterior posterior, Evidence evidence) {
        List<Spread> biomass = biomass(posterior);
        List<Spread> fishing = fishingBySeason(posterior);
        int estimated = posterior.removalsTonnes()[0].length;
        List<StockPage.HistoryRow> rows = new ArrayList<>();
        for (int t = 0; t < biomass.size(); t++) {
            int year = posterior.firstYear() + t;
            OptionalDouble removals = evidence.removals(year);
            rows.add(new StockPage.HistoryRow(
                    Integer.toString(year),
                    interval(biomass.get(t)),
                    t < fishing.size() ? interval(fishing.get(t)) : "",
                    removals.isPresent() && t < fishing.size() ? Figures.sig(removals.getAsDouble()) : "",
                    t < estimated ? interval(season(posterior.removalsTonnes(), t)) : "",
                    t < fishing.size() ? surveyWords(evidence, year) : ""));
        }
        return rows;
    }

    private StockPage.Figure figure(String kind, History history) {
        return new StockPage.Figure(
                "history-" + kind,
                HistoryDrawing.draw(history, texts.get("history." + kind + ".title")),
                PageJson.of(history));
    }

    private History history(
            String kind,
            Posterior posterior,
            List<Spread> spreads,
            double level,
            List<Point> bars,
            List<History.Series> surveys) {
        Stream<Double> tops = Stream.of(
                        spreads.stream().map(Spread::mid),
                        Stream.of(level),
                        bars.stream().map(Point::y),
                        surveys.stream().flatMap(s -> s.points().stream()).map(Point::y))
                .flatMap(s -> s);
        double needed = tops.mapToDouble(Double::doubleValue).max().orElse(1);
        double widest = spreads.stream().mapToDouble(Spread::high80).max().orElse(needed);
        return new History(
                texts.get("history.season"),
                texts.get("history." + kind + ".y"),
                posterior.firstYear() - 0.5,
                posterior.lastYear() + 1.5,
                ROOM * Math.max(needed, Math.min(widest, STRETCH * needed)),
                points(posterior, spreads, Spread::mid),
                points(posterior, spreads, Spread::low80),
                points(posterior, spreads, Spread::high80),
                level,
                bars,
                surveys,
                new History.Words(
                        texts.get("history." + kind),
                        texts.get("history.band"),
                        texts.get("history." + kind + ".level"),
                        texts.get("history.removals")));
    }

    private static List<Point> points(Posterior posterior, List<Spread> spreads, ToDoubleFunction<Spread> end) {
        return IntStream.range(0, spreads.size())
                .mapToObj(t -> new Point(posterior.firstYear() + t, end.applyAsDouble(spreads.get(t))))
                .toList();
    }

    private static List<Spread> biomass(Posterior posterior) {
        return columns(posterior.biomassTonnes(), posterior.seasons() + 1);
    }

    private static List<Spread> fishingBySeason(Posterior posterior) {
        return columns(posterior.fishingPerYear(), posterior.seasons());
    }

    private static List<Spread> columns(double[][] states, int count) {
        return IntStream.range(0, count).mapToObj(t -> season(states, t)).toList();
    }

    private static Spread season(double[][] states, int t) {
        return Spread.of(Stream.of(states).mapToDouble(draw -> draw[t]).toArray());
    }

    private static double median(Posterior posterior, java.util.function.IntToDoubleFunction quantity) {
        return Quantiles.of(
                IntStream.range(0, posterior.draws()).mapToDouble(quantity).toArray(), 0.5);
    }

    private static List<Point> removals(Posterior posterior, Evidence evidence) {
        return IntStream.rangeClosed(posterior.firstYear(), posterior.lastYear())
                .filter(year -> evidence.removals(year).isPresent())
                .mapToObj(year -> new Point(year, evidence.removals(year).getAsDouble()))
                .toList();
    }

    private static List<History.Series> surveys(Posterior posterior, Evidence evidence, List<Spread> biomass) {
        return evidence.surveys().stream()
                .filter(s -> s.year() >= posterior.firstYear() && s.year() <= posterior.lastYear())
                .collect(groupingBy(SurveyRecord::series, TreeMap::new, Collectors.toList()))
                .entrySet()
                .stream()
                .map(e -> new History.Series(e.getKey(), laidOn(posterior, e.getValue(), biomass)))
                .toList();
    }

    /** Absolute biomass as it is; an index times the median of biomass/index over its own seasons. */
    private static List<Point> laidOn(Posterior posterior, List<SurveyRecord> series, List<Spread> biomass) {
        double[] ratios = series.stream()
                .filter(s -> !s.absoluteBiomass() && s.value() > 0)
                .mapToDouble(s -> biomass.get(s.year() - posterior.firstYear()).mid() / s.value())
                .toArray();
        double factor = ratios.length == 0 ? 0 : Quantiles.of(ratios, 0.5);
        return series.stream()
                .map(s -> new Point(s.year() + s.timeOfYear(), s.value() * (s.absoluteBiomass() ? 1 : factor)))
                .toList();
    }

    private String surveyWords(Evidence evidence, int year) {
        return evidence.surveys().stream()
                .filter(s -> s.year() == year)
                .map(s -> s.absoluteBiomass()
                        ? texts.get("history.survey.biomass", s.series(), Figures.tonnes(s.value()))
                        : texts.get("history.survey.index", s.series(), Figures.sig(s.value())))
                .collect(Collectors.joining("; "));
    }

    private static String interval(Spread s) {
        return Figures.interval(s.mid(), s.low80(), s.high80());
    }
}
