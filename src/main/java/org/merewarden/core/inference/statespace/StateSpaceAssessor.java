package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.TreeMap;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Assessor;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.inference.Verdict;

/**
 * Surplus production with hidden biomass and harvest rate, fitted to whatever evidence a stock has.
 *
 * <p>The model: {@link StateDensity}; its priors: {@link ModelPriors}; the estimation: {@link Ladder}. A stock without any
 * record of a season gets the priors alone ({@link PriorsAlone}); a stock that lives from stocking alone gets no
 * draws. Otherwise {@value StateSpaceFit#DRAWS} equally weighted draws, also where the estimation did not settle, as long
 * as any was possible; with {@link StateSpaceDiagnostics} and, from them, the {@link StateSpaceStrength strength}. Estimates are posterior medians: {@code msy_t, fmsy, r, k_t, shape, process_sd, harvest_sd,
 * observation_sd:SERIES, catchability:SERIES} (index per t; F per unit of effort), and {@code
 * log_evidence, effective_draws, pareto_k, rung, cut_share}. Never throws on valid records and never yields NaN.
 */
public final class StateSpaceAssessor implements Assessor {
    static final String METHOD = "state-space surplus production";

    @Override
    public Posterior assess(Evidence evidence, int lastClosedYear, long seed) {
        if (evidence.traits().stockedOnly()) {
            return nothing(
                    lastClosedYear,
                    EvidenceStrength.NONE,
                    List.of("Recruitment comes from stocking alone: there is no self-sustaining growth, so no MSY and"
                            + " no tipping point to estimate."));
        }
        ModelPriors priors = ModelPriors.of(evidence);
        SeasonData data = SeasonData.of(evidence, lastClosedYear, priors);
        String failure = data.failure();
        if (failure != null) {
            return nothing(lastClosedYear, EvidenceStrength.THIN, List.of(failure));
        }
        if (data.seasons() == 0) {
            return PriorsAlone.of(priors, evidence, lastClosedYear, seed);
        }
        return posterior(StateSpaceFit.of(data, priors, seed), evidence, lastClosedYear);
    }

    private static Posterior nothing(int lastClosedYear, EvidenceStrength strength, List<String> reasons) {
        return new Posterior(
                METHOD,
                lastClosedYear + 1,
                new double[0],
                new double[0],
                new double[0],
                new double[0][],
                new double[0][],
                Map.of(),
                strength,
                new Verdict(false, reasons));
    }

    private static Posterior posterior(StateSpaceFit fit, Evidence evidence, int lastClosedYear) {
        Diagnostics diagnostics = StateSpaceDiagnostics.of(fit, evidence);
        StateSpaceStrength judged = StateSpaceStrength.of(fit, diagnostics);
        Verdict verdict = new Verdict(fit.ladder().settled(), reasons(fit, judged));
        double[] msy = fit.parameter(OuterParameters.MSY);
        if (msy.length == 0) {
            return nothing(lastClosedYear, judged.strength(), verdict.reasons());
        }
        double[] shape = Arrays.stream(fit.parameter(OuterParameters.SHAPE))
                .map(n -> n < SeasonStep.LEAST_SHAPE ? 0 : n)
                .toArray();
        return new Posterior(
                METHOD,
                fit.data().firstYear(),
                msy,
                fit.parameter(OuterParameters.FMSY),
                shape,
                fit.draws().biomassTonnes(),
                fit.draws().fishing(),
                fit.draws().removals(),
                parameters(fit),
                estimates(fit, shape),
                judged.strength(),
                verdict,
                diagnostics);
    }

    private static Map<String, double[]> parameters(StateSpaceFit fit) {
        Map<String, double[]> parameters = new TreeMap<>();
        parameters.put("process_sd", fit.parameter(OuterParameters.PROCESS_SD));
        parameters.put("harvest_sd", fit.parameter(OuterParameters.HARVEST_SD));
        for (int j = 0; j < fit.data().series().size(); j++) {
            String name = keyOf(fit.data().series().get(j), fit.data().series());
            parameters.put("observation_sd:" + name, fit.parameter(OuterParameters.FIRST_SCATTER + j));
            parameters.put("catchability:" + name, fit.catchability(j));
        }
        return parameters;
    }

    /** The series' name; of effort that an index shares its name with, told apart. */
    private static String keyOf(Series series, List<Series> all) {
        boolean shared = series.effort()
                && all.stream().anyMatch(s -> !s.effort() && s.name().equals(series.name()));
        return shared ? series.name() + " (effort)" : series.name();
    }

    private static Map<String, Double> estimates(StateSpaceFit fit, double[] shape) {
        Map<String, Double> estimates = new TreeMap<>();
        double[] msy = fit.parameter(OuterParameters.MSY);
        double[] fmsy = fit.parameter(OuterParameters.FMSY);
        double[] r = new double[msy.length];
        double[] k = new double[msy.length];
        for (int i = 0; i < r.length; i++) {
            r[i] = fmsy[i] * (1 + shape[i]);
            k[i] = msy[i] / fmsy[i] * (shape[i] == 0 ? Math.E : Math.exp(Math.log1p(shape[i]) / shape[i]));
        }
        estimates.put("msy_t", Quantiles.of(msy, 0.5));
        estimates.put("fmsy", Quantiles.of(fmsy, 0.5));
        estimates.put("r", Quantiles.of(r, 0.5));
        estimates.put("k_t", Quantiles.of(k, 0.5));
        estimates.put("shape", Quantiles.of(shape, 0.5));
        parameters(fit).forEach((name, values) -> estimates.put(name, Quantiles.of(values, 0.5)));
        ImportanceSample sample = fit.ladder().sample();
        estimates.put("log_evidence", sample.logEvidence());
        estimates.put("effective_draws", sample.effectiveSize());
        estimates.put("pareto_k", sample.paretoShape());
        estimates.put("rung", (double) fit.ladder().rung());
        estimates.put("cut_share", sample.truncatedShare());
        estimates.values().removeIf(value -> !Double.isFinite(value));
        return estimates;
    }

    private static List<String> reasons(StateSpaceFit fit, StateSpaceStrength judged) {
        List<String> sentences = new ArrayList<>();
        List<String> rungs = fit.ladder().rungs();
        if (!fit.ladder().settled()) {
            sentences.add("Not settled. " + rungs.get(0));
        }
        sentences.add(restsOn(fit.data()));
        sentences.addAll(judged.reasons());
        sentences.addAll(fit.data().notes());
        sentences.addAll(fit.ladder().settled() ? rungs : rungs.subList(1, rungs.size()));
        double cut = fit.ladder().sample().truncatedShare();
        if (cut > 0.1) {
            sentences.add(String.format(
                    Locale.ROOT,
                    "For some draws the hidden biomass is wider than the approximation shows: %.0f %% of the weight, as far"
                            + " as it is known, is held back.",
                    100 * cut));
        }
        sentences.add(fit.priors().msy().said("MSY", "t"));
        sentences.add(fit.priors().fmsy().said("FMSY", "per year"));
        return sentences;
    }

    private static String restsOn(SeasonData data) {
        int seen = data.seasonsSeen();
        String removals = data.hasCatch() ? "recorded removals" : "no recorded removals";
        return "Rests on " + data.seasons() + (data.seasons() == 1 ? " season" : " seasons") + " with " + removals
                + ", on abundance seen in " + seen + " of them, and on the priors.";
    }
}
