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
 * The first assessment of a stock: the best of the simple estimators that its evidence allows.
 *
 * <ol>
 *   <li>Recruitment from stocking alone: nothing is estimated, not settled.
 *   <li>Removals with a usable index (or biomass estimates, or else catch per effort): {@link ObservationErrorFit}. Usable
 *       are at least {@value #LEAST_SEASONS} seasons with an observation, and at least two observations more than
 *       parameters (r, K, one catchability per series).
 *   <li>Otherwise {@link PriorOnlyAssessor}. An index that leads to an unsettled fit does not fall through to here:
 *       priors that ignore a falling index would flatter the stock.
 * </ol>
 *
 * <p>Strength: {@link StrengthRule} for the fit, THIN or NONE for priors. Estimates: {@code msy_t, fmsy, k_t, r,
 * catchability:SERIES, sigma}; with effort and catches in at least three seasons also the regressions' {@code
 * schaefer_msy_t, schaefer_effort_msy, schaefer_a, schaefer_b, schaefer_r2} and the same with {@code fox_}, for the
 * effort series with most seasons; MSY and effort at MSY only where the slope is negative. Records after the last closed
 * season do not count. Never throws on a valid record and never yields NaN.
 */
public final class FirstAssessor implements Assessor {
    static final int LEAST_SEASONS = 5;
    private static final double LARGEST_START = 1.5;
    private static final double LARGEST_SHAPE = 4;
    private static final double LARGEST_PROCESS_SD = 1;

    private final PriorOnlyAssessor priorOnly = new PriorOnlyAssessor();

    @Override
    public Posterior assess(Evidence evidence, int lastClosedYear, long seed) {
        SeasonSeries seasons = SeasonSeries.of(evidence, lastClosedYear);
        List<String> opening = new ArrayList<>();
        if (evidence.areas().stream().anyMatch(a -> a.year() <= lastClosedYear)) {
            opening.add("The lake's changing area is not followed by this estimator: capacity is taken as constant.");
        }
        if (evidence.traits().stockedOnly()) {
            return stockedOnly(lastClosedYear);
        }
        IndexData data = IndexData.of(evidence, seasons);
        Posterior posterior = usable(seasons, data)
                ? fit(evidence, seasons, data, seed, opening)
                : priorOnly.assess(evidence, seasons, seed, tooLittle(data, opening));
        Map<String, Double> regressions = regressions(evidence, lastClosedYear);
        return regressions.isEmpty() ? posterior : with(posterior, regressions);
    }

    private static boolean usable(SeasonSeries seasons, IndexData data) {
        boolean scale = seasons.largest() > 0 || contains(data.series(), -1);
        int parameters = 2 + data.seriesNames().size();
        return seasons.failure() == null
                && scale
                && data.seasonsSeen() >= LEAST_SEASONS
                && data.count() >= parameters + 2;
    }

    private static boolean contains(int[] numbers, int wanted) {
        for (int number : numbers) {
            if (number == wanted) {
                return true;
            }
        }
        return false;
    }

    private static List<String> tooLittle(IndexData data, List<String> opening) {
        if (data.count() > 0) {
            opening.add(
                    "Surveys or catch per effort speak of " + data.seasonsSeen()
                            + " seasons with recorded removals; that is too little, or of unknown scale, so no index is fitted.");
        }
        return opening;
    }

    private static Posterior fit(
            Evidence evidence, SeasonSeries seasons, IndexData data, long seed, List<String> opening) {
        Optional<Prior> start = Priors.own(evidence, "biomass_fraction_at_start");
        double fraction = start.map(p -> Math.min(LARGEST_START, p.median())).orElse(1.0);
        opening.add(
                start.isPresent()
                        ? "Biomass at the start of " + seasons.firstYear() + " is fixed at " + fraction
                                + " of capacity, as the office states."
                        : "Biomass at the start of " + seasons.firstYear()
                                + " is taken as the unfished capacity; if fishing was heavy before, state the fraction.");
        double shape = Priors.own(evidence, "shape")
                .filter(p -> p.logSd() == 0)
                .map(p -> Math.min(LARGEST_SHAPE, p.median()))
                .orElse(1.0);
        double processSd = Priors.own(evidence, "process_sd")
                .map(p -> Math.min(LARGEST_PROCESS_SD, p.median()))
                .orElse(ObservationErrorFit.DEFAULT_PROCESS_SD);
        return new ObservationErrorFit(seasons, data, fraction, shape, processSd).assess(seed, opening);
    }

    private static Posterior stockedOnly(int lastClosedYear) {
        return new Posterior(
                "none",
                lastClosedYear + 1,
                new double[0],
                new double[0],
                new double[0],
                new double[0][],
                new double[0][],
                Map.of(),
                EvidenceStrength.NONE,
                new Verdict(
                        false,
                        List.of("Recruitment comes from stocking alone: there is no self-sustaining growth, so no MSY"
                                + " and no tipping point to estimate.")));
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

    private static Posterior with(Posterior posterior, Map<String, Double> regressions) {
        Map<String, Double> estimates = new TreeMap<>(posterior.estimates());
        estimates.putAll(regressions);
        List<String> reasons = new ArrayList<>(posterior.verdict().reasons());
        reasons.add(EffortYieldRegression.WARNING);
        return new Posterior(
                posterior.method(),
                posterior.firstYear(),
                posterior.msyTonnes(),
                posterior.fmsyPerYear(),
                posterior.shape(),
                posterior.biomassTonnes(),
                posterior.fishingPerYear(),
                estimates,
                posterior.strength(),
                new Verdict(posterior.verdict().settled(), reasons));
    }
}
