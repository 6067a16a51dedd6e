package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;
import static org.merewarden.core.inference.statespace.ReferenceCase.number;
import static org.merewarden.core.inference.statespace.ReferenceCase.text;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.HashMap;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.assertj.core.api.SoftAssertions;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.prior.Prior;

/**
 * Posteriors against long runs of general-purpose samplers on the same model, and ln p(data | θ) against a Laplace
 * approximation by automatic differentiation: {@code src/test/reference/posteriors} (computed there from the equations,
 * by other programs in other languages).
 */
class ReferencePosteriorsTest {
    private static final int SEEDS = 8;
    private static final double ERRORS = 3;
    private static final double[] P = {0.05, 0.5, 0.95};
    private static final String[] QUANTILES = {"05", "50", "95"};

    static Stream<ReferenceCase> cases() {
        return ReferenceCase.all().stream();
    }

    /**
     * Medians within 2 %, the 5 and 95 % quantiles within 3 %, beyond three times the Monte-Carlo error of each side.
     * Theirs is printed with the reference. Ours: the draws of eight seeds are pooled; those of one seed with ESS E are
     * worth 1/(1/E + 1/1,000) independent ones, since 1,000 are drawn again from the weighted sample; with N the sum, the
     * rank of a quantile errs by √(p(1 − p)/N), read back as half the distance between our quantiles one such error below
     * and above.
     */
    @ParameterizedTest
    @MethodSource("cases")
    void quantilesAgreeWithLongRuns(ReferenceCase reference) {
        Pooled pooled = pooled(reference);
        SoftAssertions all = new SoftAssertions();
        for (Map<String, String> row : reference.table("reference")) {
            String name = reference.name() + " " + text(row, "quantity");
            all.assertThat(misses(row, pooled)).as(name).isEmpty();
        }
        all.assertAll();
    }

    /** The quantiles of a row from which ours are farther than allowed. */
    private static List<String> misses(Map<String, String> row, Pooled pooled) {
        double[] ours = pooled.of(text(row, "quantity"), text(row, "year"));
        List<String> misses = new ArrayList<>();
        for (int i = 0; i < P.length; i++) {
            double value = Quantiles.of(ours, P[i]);
            double theirs = number(row, "q" + QUANTILES[i]);
            double error = number(row, "mcse" + QUANTILES[i]) + pooled.error(ours, P[i]);
            double allowed = (P[i] == 0.5 ? 0.02 : 0.03) + ERRORS * error / theirs;
            if (!(Math.abs(value / theirs - 1) <= allowed)) {
                misses.add(String.format(
                        Locale.ROOT,
                        "%s %s, quantile %s: %.4g, theirs %.4g, allowed %.1f %%",
                        text(row, "sampler"),
                        text(row, "year"),
                        P[i],
                        value,
                        theirs,
                        100 * allowed));
            }
        }
        return misses;
    }

    @ParameterizedTest
    @MethodSource("cases")
    void laplaceAgreesWithAnotherProgram(ReferenceCase reference) {
        Fixture fixture = new Fixture(reference);
        List<Map<String, String>> rows = reference.table("laplace");
        assertThat(rows).hasSizeGreaterThan(3);
        for (Map<String, String> row : rows) {
            double[] u = fixture.standardised(row);
            fixture.marginal.explore(u);
            double ours = fixture.marginal.evaluate(u) - fixture.outer.logPrior(u);
            assertThat(ours).as("%s", row).isEqualTo(number(row, "ln_p"), offset(0.05));
        }
        double[] mode = reference.table("mode").stream()
                .mapToDouble(row -> number(row, "u"))
                .toArray();
        fixture.marginal.explore(mode);
        double highest = number(reference.table("mode").get(0), "ln_p_and_prior");
        assertThat(fixture.marginal.evaluate(mode)).isEqualTo(highest, offset(0.05));
    }

    /** Draws of eight seeds, quantity by quantity, and what they are worth. */
    private record Pooled(Map<String, double[]> draws, double independent) {
        double[] of(String quantity, String year) {
            double[] values = draws.get(quantity + year);
            assertThat(values).as(quantity + year).isNotNull();
            return values;
        }

        double error(double[] values, double p) {
            double rank = Math.sqrt(p * (1 - p) / independent);
            return (Quantiles.of(values, Math.min(1, p + rank)) - Quantiles.of(values, Math.max(0, p - rank))) / 2;
        }
    }

    private static Pooled pooled(ReferenceCase reference) {
        Map<String, List<double[]>> parts = new LinkedHashMap<>();
        double independent = 0;
        for (int seed = 1; seed <= SEEDS; seed++) {
            Evidence evidence = reference.evidence();
            ModelPriors priors = ModelPriors.of(evidence);
            SeasonData data = SeasonData.of(evidence, reference.lastClosedYear(), priors);
            StateSpaceFit fit = StateSpaceFit.of(data, priors, seed);
            assertThat(fit.ladder().settled())
                    .as(fit.ladder().rungs()::toString)
                    .isTrue();
            independent += 1 / (1 / fit.ladder().sample().effectiveSize() + 1.0 / StateSpaceFit.DRAWS);
            quantities(fit)
                    .forEach((name, values) ->
                            parts.computeIfAbsent(name, n -> new ArrayList<>()).add(values));
        }
        Map<String, double[]> draws = new HashMap<>();
        parts.forEach((name, values) ->
                draws.put(name, values.stream().flatMapToDouble(Arrays::stream).toArray()));
        return new Pooled(draws, independent);
    }

    private static Map<String, double[]> quantities(StateSpaceFit fit) {
        double[] msy = fit.parameter(OuterParameters.MSY);
        double[] fmsy = fit.parameter(OuterParameters.FMSY);
        double[] shape = fit.parameter(OuterParameters.SHAPE);
        Map<String, double[]> all = new HashMap<>();
        all.put("msy_t", msy);
        all.put("fmsy", fmsy);
        all.put("shape", shape);
        all.put("process_sd", fit.parameter(OuterParameters.PROCESS_SD));
        all.put("harvest_sd", fit.parameter(OuterParameters.HARVEST_SD));
        for (int j = 0; j < fit.data().series().size(); j++) {
            String series = fit.data().series().get(j).name();
            all.put("observation_sd:" + series, fit.parameter(OuterParameters.FIRST_SCATTER + j));
        }
        int last = fit.data().seasons() - 1;
        int year = fit.data().firstYear() + last;
        all.put("k_t", each(k -> msy[k] / fmsy[k] * Math.pow(1 + shape[k], 1 / shape[k])));
        all.put("b_over_bmsy" + year, each(k -> fit.draws().biomassTonnes()[k][last] * fmsy[k] / msy[k]));
        all.put("b_over_bmsy" + (year + 1), each(k -> fit.draws().biomassTonnes()[k][last + 1] * fmsy[k] / msy[k]));
        all.put("f_over_fmsy" + year, each(k -> fit.draws().fishing()[k][last] / fmsy[k]));
        return all;
    }

    private static double[] each(IntToDoubleFunction value) {
        return IntStream.range(0, StateSpaceFit.DRAWS).mapToDouble(value).toArray();
    }

    private static final class Fixture {
        final OuterParameters outer;
        final Marginal marginal;
        private final SeasonData data;
        private final ModelPriors priors;

        Fixture(ReferenceCase reference) {
            Evidence evidence = reference.evidence();
            priors = ModelPriors.of(evidence);
            data = SeasonData.of(evidence, reference.lastClosedYear(), priors);
            outer = new OuterParameters(priors, data);
            marginal = new Marginal(data, priors, outer);
        }

        /** u of the θ of a row: (ln θ − ln median)/log-sd of every free parameter, in the order of the parameters. */
        double[] standardised(Map<String, String> row) {
            Map<String, Prior> of = new LinkedHashMap<>();
            of.put("msy_t", priors.msy());
            of.put("fmsy", priors.fmsy());
            of.put("process_sd", priors.processSd());
            of.put("harvest_sd", priors.harvestSd());
            of.put("shape", priors.shape());
            data.series().forEach(s -> of.put("observation_sd:" + s.name(), s.scatter()));
            return of.entrySet().stream()
                    .filter(e -> e.getValue().logSd() > 0)
                    .mapToDouble(
                            e -> Math.log(number(row, e.getKey()) / e.getValue().median())
                                    / e.getValue().logSd())
                    .toArray();
        }
    }
}
