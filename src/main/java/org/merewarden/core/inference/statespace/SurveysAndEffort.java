package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.inference.statespace.Observations.Point;
import org.merewarden.core.prior.Prior;

/**
 * Surveys and effort as points, series by series.
 *
 * <p>An index of 0 is <i>below detection</i>: under the smallest value that its effort could show, which is the smallest
 * positive value × nets of the series over this survey's nets; where any survey's nets are unknown, the smallest
 * positive value. Left out,
 * each with a sentence: series without a positive value, series with a single value unless the office states its
 * catchability (else the catchability takes the value up), and effort of 0.
 *
 * <p>Prior of ln q, free of units: N(mean ln I − ln(½ K at the prior medians), 5); effort: N(ln 0.15 − mean ln E, 5).
 */
final class SurveysAndEffort {
    private static final double WIDE = 5;
    private static final double LEAST_SD = 1e-3;
    private static final double LARGEST_LOG = 700;
    private static final double DEFAULT_BIOMASS_CV = 0.3;
    private static final double LEAST_BIOMASS_CV = 0.01;

    private final Evidence evidence;
    private final int first;
    private final int seasons;
    private final double unit;
    private final ModelPriors priors;
    private final List<String> notes;
    private final List<Point> points = new ArrayList<>();
    private final List<Series> series = new ArrayList<>();

    SurveysAndEffort(Evidence evidence, int first, int seasons, double unit, ModelPriors priors, List<String> notes) {
        this.evidence = evidence;
        this.first = first;
        this.seasons = seasons;
        this.unit = unit;
        this.priors = priors;
        this.notes = notes;
        surveys();
        effort();
    }

    List<Point> points() {
        return points;
    }

    List<Series> series() {
        return series;
    }

    private boolean within(int year) {
        return year >= first && year - first < seasons;
    }

    private void surveys() {
        Map<String, List<SurveyRecord>> indices = new TreeMap<>();
        for (SurveyRecord survey : evidence.surveys()) {
            if (within(survey.year()) && survey.absoluteBiomass()) {
                biomass(survey);
            } else if (within(survey.year())) {
                indices.computeIfAbsent(survey.series(), s -> new ArrayList<>()).add(survey);
            }
        }
        indices.forEach(this::index);
    }

    private void biomass(SurveyRecord survey) {
        if (survey.value() == 0) {
            notes.add("The biomass of 0 of " + survey.year() + " is left out: it has no logarithm.");
            return;
        }
        double cv = cv(survey.cv(), DEFAULT_BIOMASS_CV);
        double sd = Math.max(LEAST_BIOMASS_CV, cv);
        points.add(new Point(
                survey.year() - first,
                Observations.BIOMASS,
                survey.timeOfYear(),
                Math.log(survey.value() / unit),
                sd * sd,
                -1,
                survey.series()));
    }

    private void index(String name, List<SurveyRecord> records) {
        double[] logs = records.stream()
                .filter(r -> r.value() > 0)
                .mapToDouble(r -> Math.log(r.value()))
                .toArray();
        if (!usable(name, records.size(), logs)) {
            return;
        }
        double mean = mean(logs);
        double halfCapacity = capacityFactor() / 2;
        series.add(series(name, false, mean, -Math.log(halfCapacity), Math.log(unit)));
        boolean perNet = records.stream().allMatch(r -> nets(r) > 0);
        double smallest = records.stream()
                .filter(r -> r.value() > 0)
                .mapToDouble(r -> perNet ? r.value() * nets(r) : r.value())
                .min()
                .orElseThrow();
        for (SurveyRecord r : records) {
            boolean below = r.value() == 0;
            double value = below ? smallest / (perNet ? nets(r) : 1) : r.value();
            double cv = cv(r.cv(), 0);
            points.add(new Point(
                    r.year() - first,
                    below ? Observations.BELOW_DETECTION : Observations.INDEX,
                    r.timeOfYear(),
                    Math.log(value) - mean,
                    cv * cv,
                    series.size() - 1,
                    name));
        }
    }

    /** K in units at the prior medians: MSY is 1 unit there. */
    private double capacityFactor() {
        double n = priors.shape().median();
        return Math.exp(Math.log1p(n) / n) / priors.fmsy().median();
    }

    private static double nets(SurveyRecord record) {
        Double nets = record.nets();
        return nets == null ? 0 : nets;
    }

    private void effort() {
        Map<String, List<EffortRecord>> bySeries = new TreeMap<>();
        for (EffortRecord record : evidence.effort()) {
            if (within(record.year()) && record.effort() > 0) {
                bySeries.computeIfAbsent(record.series(), s -> new ArrayList<>())
                        .add(record);
            }
        }
        bySeries.forEach((name, records) -> {
            double[] logs =
                    records.stream().mapToDouble(r -> Math.log(r.effort())).toArray();
            if (usable(name, logs.length, logs)) {
                double mean = mean(logs);
                double rate = Math.log(priors.firstHarvestRate().median());
                series.add(series(name, true, mean, rate, 0));
                for (int i = 0; i < logs.length; i++) {
                    int season = records.get(i).year() - first;
                    points.add(new Point(season, Observations.EFFORT, 0, logs[i] - mean, 0, series.size() - 1, name));
                }
            }
        });
    }

    /** Hidden ln q of an index is ln(q · unit) − mean ln I; of an effort series ln q + mean ln E. */
    private Series series(String name, boolean effort, double mean, double usualQ, double logUnit) {
        double shift = effort ? -mean : mean - logUnit;
        Prior scatter = ModelPriors.observationSd(evidence, name);
        return ModelPriors.own(evidence, "catchability", name)
                .map(own -> new Series(
                        name,
                        effort,
                        mean,
                        Math.log(own.median()) - shift,
                        Math.max(LEAST_SD, own.logSd()),
                        own,
                        scatter))
                .orElseGet(() -> new Series(name, effort, mean, usualQ, WIDE, wide(usualQ + shift), scatter));
    }

    private static Prior wide(double logMedian) {
        return new Prior(
                "catchability",
                Math.exp(Math.max(-LARGEST_LOG, Math.min(LARGEST_LOG, logMedian))),
                WIDE,
                "default",
                "So wide that the records alone decide; its middle takes the stock as half its capacity.",
                "our judgement");
    }

    private boolean usable(String name, int values, double[] logs) {
        boolean stated = ModelPriors.own(evidence, "catchability", name).isPresent();
        if (logs.length == 0) {
            notes.add("Series " + name + " is left out: it has no value above zero.");
        } else if (values == 1 && !stated) {
            notes.add("Series " + name + " is left out: a single value says nothing about change.");
        }
        return logs.length > 0 && (values > 1 || stated);
    }

    private static double cv(@Nullable Double stated, double otherwise) {
        return stated == null || !(stated >= 0) ? otherwise : Math.min(stated, WIDE);
    }

    private static double mean(double[] values) {
        double sum = 0;
        for (double v : values) {
            sum += v;
        }
        return sum / values.length;
    }
}
