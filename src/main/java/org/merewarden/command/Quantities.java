package org.merewarden.command;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.TreeMap;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.policy.HeldRemovals;

/**
 * The lines of one assessment.
 *
 * <pre>
 *   msy_t, fmsy, k_t, bmsy_t
 *   biomass_t, b_over_bmsy      at the start of each season and of the coming one
 *   f, f_over_fmsy, catch_t     by season
 *   process_sd, harvest_sd, observation_sd:SERIES, shape
 *   fold_margin, tipping_biomass_t, collapse_course      at the last season's removals, held for ever: {@link HeldRemovals}
 *   log_evidence
 * </pre>
 *
 * <p>The last season's removals are the median of the estimated ones; without any, zero.
 * The tipping biomass is spread over the draws that have one, and empty where fewer than half do. collapse_course and
 * log_evidence are single numbers. Without draws the headline quantities stand without numbers.
 */
final class Quantities {
    static final String MSY = "msy_t";
    static final String B_OVER_BMSY = "b_over_bmsy";
    static final String FOLD_MARGIN = "fold_margin";
    static final String COLLAPSE_COURSE = "collapse_course";
    private static final String TIPPING_BIOMASS = "tipping_biomass_t";
    private static final String LOG_EVIDENCE = "log_evidence";

    private final Posterior posterior;
    private final List<Line> lines = new ArrayList<>();

    private Quantities(Posterior posterior) {
        this.posterior = posterior;
    }

    static List<Line> of(Posterior posterior) {
        Quantities quantities = new Quantities(posterior);
        if (posterior.draws() == 0) {
            quantities.headlines();
        } else {
            quantities.parameters();
            quantities.states();
            quantities.spreads();
            quantities.heldRemovals();
        }
        return quantities.lines;
    }

    private void headlines() {
        int coming = posterior.firstYear();
        List.of(MSY, "fmsy", "k_t", "bmsy_t").forEach(q -> lines.add(Line.unknown(q, null)));
        List.of("biomass_t", B_OVER_BMSY).forEach(q -> lines.add(Line.unknown(q, coming)));
        List.of(FOLD_MARGIN, TIPPING_BIOMASS, COLLAPSE_COURSE).forEach(q -> lines.add(Line.unknown(q, coming - 1)));
        lines.add(Line.unknown(LOG_EVIDENCE, null));
    }

    private void parameters() {
        lines.add(Line.of(MSY, null, posterior.msyTonnes()));
        lines.add(Line.of("fmsy", null, posterior.fmsyPerYear()));
        lines.add(Line.of("k_t", null, byDraw(posterior::capacity)));
        lines.add(Line.of("bmsy_t", null, byDraw(posterior::bmsy)));
    }

    private void states() {
        int seasons = posterior.seasons();
        double[][] biomass = posterior.biomassTonnes();
        double[][] fishing = posterior.fishingPerYear();
        double[][] removals = posterior.removalsTonnes();
        bySeason("biomass_t", seasons + 1, (draw, t) -> biomass[draw][t]);
        bySeason(B_OVER_BMSY, seasons + 1, (draw, t) -> biomass[draw][t] / posterior.bmsy(draw));
        bySeason("f", seasons, (draw, t) -> fishing[draw][t]);
        bySeason(
                "f_over_fmsy",
                seasons,
                (draw, t) -> fishing[draw][t] / posterior.fmsyPerYear()[draw]);
        bySeason("catch_t", removals[0].length, (draw, t) -> removals[draw][t]);
    }

    private void spreads() {
        Map<String, double[]> parameters = new TreeMap<>(posterior.parameters());
        Stream.concat(
                        Stream.of("process_sd", "harvest_sd").filter(parameters::containsKey),
                        parameters.keySet().stream().filter(name -> name.startsWith("observation_sd:")))
                .forEach(name -> lines.add(Line.of(name, null, Objects.requireNonNull(parameters.get(name)))));
        lines.add(Line.of("shape", null, posterior.shape()));
    }

    private void heldRemovals() {
        int last = posterior.lastYear();
        HeldRemovals held = new HeldRemovals(posterior, posterior.lastRemovals().orElse(0));
        lines.add(Line.of(FOLD_MARGIN, last, held.margin()));
        lines.add(Line.of(TIPPING_BIOMASS, last, HeldRemovals.known(held.tippingBiomass())));
        lines.add(Line.single(COLLAPSE_COURSE, last, held.collapseProbability()));
        lines.add(Line.single(LOG_EVIDENCE, null, posterior.estimates().get(LOG_EVIDENCE)));
    }

    private interface OfDrawAndSeason {
        double value(int draw, int season);
    }

    private void bySeason(String quantity, int columns, OfDrawAndSeason value) {
        for (int t = 0; t < columns; t++) {
            int season = t;
            lines.add(Line.of(quantity, posterior.firstYear() + t, byDraw(draw -> value.value(draw, season))));
        }
    }

    private double[] byDraw(IntToDoubleFunction value) {
        return IntStream.range(0, posterior.draws()).mapToDouble(value).toArray();
    }
}
