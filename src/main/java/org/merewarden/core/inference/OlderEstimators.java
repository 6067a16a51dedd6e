package org.merewarden.core.inference;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import java.util.stream.Collectors;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.EffortYieldRegression.Line;
import org.merewarden.core.prior.Prior;
import org.merewarden.core.prior.Priors;

/**
 * The simple estimators of older reports, beside the assessment for comparison and checks; no limit rests on them.
 *
 * <ul>
 *   <li>{@link ObservationErrorFit} where there are removals with a usable index (or biomass estimates, or else catch per
 *       effort): at least {@value #LEAST_SEASONS} seasons with an observation, and at least two observations more than
 *       parameters (r, K, one catchability per series). Estimates {@code difference_msy_t, difference_fmsy,
 *       difference_k_t, difference_r, difference_sigma, difference_catchability:SERIES}; none where it does not settle.
 *   <li>{@link EffortYieldRegression}s with effort and catches in at least three seasons, for the effort series with most
 *       seasons: {@code schaefer_msy_t, schaefer_effort_msy, schaefer_a, schaefer_b, schaefer_r2} and the same with {@code
 *       fox_}; MSY and effort at MSY only where the slope is negative.
 * </ul>
 *
 * <p>Records after the last closed season do not count. Never throws on a valid record and never yields NaN.
 */
public final class OlderEstimators {
    static final int LEAST_SEASONS = 5;
    static final String DIFFERENCE = "difference_";
    private static final double LARGEST_START = 1.5;
    private static final double LARGEST_SHAPE = 4;
    private static final double LARGEST_PROCESS_SD = 1;

    private OlderEstimators() {}

    /** Named point estimates; those that cannot be had are absent. */
    public static Map<String, Double> of(Evidence evidence, int lastClosedYear) {
        Map<String, Double> estimates = new TreeMap<>();
        fit(evidence, lastClosedYear)
                .flatMap(ObservationErrorFit::settledEstimates)
                .ifPresent(fit -> fit.forEach((name, value) -> estimates.put(DIFFERENCE + name, value)));
        estimates.putAll(regressions(evidence, lastClosedYear));
        return estimates;
    }

    /** The difference equation with its {@value ObservationErrorFit#REFITS} refits; empty where the evidence is too little. */
    public static Optional<Posterior> differenceEquation(Evidence evidence, int lastClosedYear, long seed) {
        return fit(evidence, lastClosedYear).map(fit -> fit.assess(seed, opening(evidence, lastClosedYear)));
    }

    private static Optional<ObservationErrorFit> fit(Evidence evidence, int lastClosedYear) {
        SeasonSeries seasons = SeasonSeries.of(evidence, lastClosedYear);
        IndexData data = IndexData.of(evidence, seasons);
        if (evidence.traits().stockedOnly() || !usable(seasons, data)) {
            return Optional.empty();
        }
        double fraction = Priors.own(evidence, "biomass_fraction_at_start")
                .map(p -> Math.min(LARGEST_START, p.median()))
                .orElse(1.0);
        double shape = Priors.own(evidence, "shape")
                .filter(p -> p.logSd() == 0)
                .map(p -> Math.min(LARGEST_SHAPE, p.median()))
                .orElse(1.0);
        double processSd = Priors.own(evidence, "process_sd")
                .map(p -> Math.min(LARGEST_PROCESS_SD, p.median()))
                .orElse(ObservationErrorFit.DEFAULT_PROCESS_SD);
        return Optional.of(new ObservationErrorFit(seasons, data, fraction, shape, processSd));
    }

    private static boolean usable(SeasonSeries seasons, IndexData data) {
        boolean scale = seasons.largest() > 0 || data.hasBiomass();
        int parameters = 2 + data.seriesNames().size();
        return seasons.failure() == null
                && scale
                && data.seasonsSeen() >= LEAST_SEASONS
                && data.count() >= parameters + 2;
    }

    private static List<String> opening(Evidence evidence, int lastClosedYear) {
        List<String> opening = new ArrayList<>();
        if (evidence.areas().stream().anyMatch(a -> a.year() <= lastClosedYear)) {
            opening.add("The lake's changing area is not followed by this estimator: capacity is taken as constant.");
        }
        int first = SeasonSeries.of(evidence, lastClosedYear).firstYear();
        Optional<Prior> start = Priors.own(evidence, "biomass_fraction_at_start");
        opening.add(
                start.isPresent()
                        ? "Biomass at the start of " + first + " is fixed at "
                                + Math.min(LARGEST_START, start.get().median())
                                + " of capacity, as the office states."
                        : "Biomass at the start of " + first
                                + " is taken as the unfished capacity; if fishing was heavy before, state the fraction.");
        return opening;
    }

    private static Map<String, Double> regressions(Evidence evidence, int lastClosedYear) {
        Map<String, List<EffortRecord>> bySeries = evidence.effort().stream()
                .filter(e -> e.year() <= lastClosedYear
                        && evidence.removals(e.year()).isPresent())
                .collect(Collectors.groupingBy(EffortRecord::series, TreeMap::new, Collectors.toList()));
        List<EffortRecord> longest = bySeries.values().stream()
                .reduce((a, b) -> b.size() > a.size() ? b : a)
                .orElse(List.of());
        double[] effort = longest.stream().mapToDouble(EffortRecord::effort).toArray();
        double[] catches = longest.stream()
                .mapToDouble(e -> evidence.removals(e.year()).orElse(0))
                .toArray();
        Map<String, Double> estimates = new TreeMap<>();
        EffortYieldRegression.schaefer(catches, effort).ifPresent(line -> put(estimates, "schaefer", line));
        EffortYieldRegression.fox(catches, effort).ifPresent(line -> put(estimates, "fox", line));
        return estimates;
    }

    private static void put(Map<String, Double> estimates, String name, Line line) {
        estimates.put(name + "_a", line.a());
        estimates.put(name + "_b", line.b());
        estimates.put(name + "_r2", line.rSquared());
        line.msy().ifPresent(v -> estimates.put(name + "_msy_t", v));
        line.effortAtMsy().ifPresent(v -> estimates.put(name + "_effort_msy", v));
    }
}
