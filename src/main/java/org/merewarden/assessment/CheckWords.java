package org.merewarden.assessment;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import org.apache.commons.math3.distribution.ChiSquaredDistribution;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/**
 * What to make of the checks of an assessment, one sentence each.
 *
 * <p>Bounds: the residuals' standard deviation against the 95 % quantile of √(χ²/(n − 1)) (Francis 2011, Can. J. Fish.
 * Aquat. Sci. 68: 1124–1138, recalled; there is no lower bound because hidden states lean towards the values); Mohn's ρ within −0.15 and 0.20 (Hurtado-Ferro et al. 2015, ICES J. Mar.
 * Sci. 72: 99–110, for long-lived species, recalled); runs below 1 in 20, contrast 1.5 and 3, influence 10 and 25 % are
 * our judgement.
 */
@Component
class CheckWords {
    private static final int FEW = 3;
    private static final double RARE = 0.05;
    private static final double LEAST_RHO = -0.15;
    private static final double MOST_RHO = 0.20;
    private static final double SMALL_CHANGE = 0.10;
    private static final double LARGE_CHANGE = 0.25;

    private final Texts texts;

    CheckWords(Texts texts) {
        this.texts = texts;
    }

    /** How the series is met, how it is foreseen, what it holds. */
    List<String> series(SeriesCheck check) {
        List<String> sentences = new ArrayList<>();
        sentences.add(met(check));
        sentences.add(foreseen(check));
        Double contrast = check.contrast();
        if (contrast != null) {
            String much = contrast < 1.5 ? "little" : contrast < 3 ? "some" : "much";
            sentences.add(texts.get("contrast." + much, Figures.sig(contrast)));
        }
        return sentences;
    }

    private String met(SeriesCheck c) {
        Double sd = c.residualSd();
        Double mean = c.meanResidual();
        if (sd == null || mean == null || c.values() < FEW) {
            return texts.get("met.few");
        }
        Double runs = c.runsProbability();
        if (runs != null && runs < RARE) {
            Double lag = c.lagOne();
            return texts.get(lag == null || lag > 0 ? "met.runs" : "met.alternates", Figures.percent(runs));
        }
        if (Math.abs(mean) > 2 * sd / Math.sqrt(c.values())) {
            return texts.get(mean > 0 ? "met.above" : "met.below", Figures.sig(Math.abs(mean)));
        }
        return texts.get(sd > largestSd(c.values()) ? "met.wide" : "met.well", Figures.sig(sd));
    }

    /** The standard deviation that so many independent standard normal values stay under in 19 of 20 cases. */
    private static double largestSd(int values) {
        double freedom = values - 1.0;
        return Math.sqrt(new ChiSquaredDistribution(freedom).inverseCumulativeProbability(0.95) / freedom);
    }

    private String foreseen(SeriesCheck c) {
        Double error = c.scaledError();
        if (error == null) {
            return texts.get("foreseen.none");
        }
        return texts.get(error < 1 ? "foreseen.better" : "foreseen.no-better", Figures.sig(error), c.hindcasts());
    }

    /** Which series the result hangs on; empty where none could be left out. */
    List<String> influence(List<SeriesCheck> checks) {
        return checks.stream()
                .filter(c -> Double.isFinite(change(c)))
                .max(Comparator.comparingDouble(CheckWords::change))
                .map(this::influence)
                .stream()
                .toList();
    }

    private String influence(SeriesCheck c) {
        double change = Math.expm1(change(c));
        String size = change < SMALL_CHANGE ? "small" : change < LARGE_CHANGE ? "some" : "large";
        return texts.get(
                "influence." + size,
                c.series(),
                Figures.sig(c.msyWithout()),
                Figures.tonnes(c.msyWith()),
                Figures.sig(c.relativeBiomassWithout()),
                Figures.sig(c.relativeBiomassWith()));
    }

    /** By how much MSY or present B/BMSY changes without the series, the larger, as a logarithm; NaN where not known. */
    private static double change(SeriesCheck c) {
        return Math.max(
                logRatio(c.msyWithout(), c.msyWith()), logRatio(c.relativeBiomassWithout(), c.relativeBiomassWith()));
    }

    private static double logRatio(@Nullable Double without, @Nullable Double with) {
        return without == null || with == null ? Double.NaN : Math.abs(Math.log(without / with));
    }

    String retrospective(Retrospective r) {
        double rho = r.rhoBiomass();
        String way = rho > MOST_RHO ? "higher" : rho < LEAST_RHO ? "lower" : "steady";
        return texts.get(
                "peels." + way,
                Figures.percent(Math.abs(rho)),
                texts.get(rho < 0 ? "peels.way.lower" : "peels.way.higher"),
                r.peels().size() - 1);
    }
}
