package org.merewarden.assessment;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import java.util.function.ToDoubleFunction;
import org.apache.commons.math3.distribution.ChiSquaredDistribution;
import org.merewarden.core.inference.CheckBounds;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/**
 * What to make of the checks of an assessment, one sentence each.
 *
 * <p>What fails, fails by {@link CheckBounds}, so that no sentence here contradicts the verdict. Further bounds: the
 * residuals' standard deviation against the 95 % quantile of √(χ²/(n − 1)) (Francis 2011, Can. J. Fish. Aquat. Sci. 68:
 * 1124–1138, recalled; there is no lower bound because hidden states lean towards the values); contrast 1.5 and 3 and an
 * influence of 10 % are our judgement.
 */
@Component
class CheckWords {
    private static final int FEW = 3;
    private static final double SMALL_CHANGE = 0.10;

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
        if (runs != null && CheckBounds.dependent(c)) {
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
        String how = CheckBounds.unforeseen(c) ? "worse" : error < 1 ? "better" : "alike";
        return texts.get("foreseen." + how, Figures.sig(error), c.hindcasts());
    }

    /** Which series MSY hangs on and, where another moves it much, which B/BMSY; empty where none could be left out. */
    List<String> influence(List<SeriesCheck> checks) {
        List<String> sentences = new ArrayList<>();
        Optional<SeriesCheck> msy = largest(checks, CheckBounds::msyChange);
        msy.ifPresent(c -> sentences.add(influence(c)));
        largest(checks, CheckBounds::relativeBiomassChange)
                .filter(c -> !msy.equals(Optional.of(c)))
                .filter(c -> Math.abs(CheckBounds.relativeBiomassChange(c)) > CheckBounds.LARGEST_INFLUENCE)
                .ifPresent(c -> sentences.add(texts.get(
                        "influence.biomass",
                        c.series(),
                        Figures.sig(c.relativeBiomassWithout()),
                        Figures.sig(c.relativeBiomassWith()))));
        return sentences;
    }

    private static Optional<SeriesCheck> largest(List<SeriesCheck> checks, ToDoubleFunction<SeriesCheck> change) {
        return checks.stream()
                .filter(c -> Double.isFinite(change.applyAsDouble(c)))
                .max(Comparator.comparingDouble(c -> Math.abs(change.applyAsDouble(c))));
    }

    private String influence(SeriesCheck c) {
        boolean small = Math.abs(CheckBounds.msyChange(c)) < SMALL_CHANGE;
        return texts.get(
                "influence." + (CheckBounds.influential(c) ? "large" : small ? "small" : "some"),
                c.series(),
                Figures.sig(c.msyWithout()),
                Figures.tonnes(c.msyWith()),
                Figures.sig(c.relativeBiomassWithout()),
                Figures.sig(c.relativeBiomassWith()));
    }

    String retrospective(Retrospective r) {
        double rho = r.rhoRelativeBiomass();
        String way = !CheckBounds.unsteady(r) ? "steady" : rho > 0 ? "higher" : "lower";
        return texts.get(
                "peels." + way,
                Figures.percent(Math.abs(rho)),
                texts.get(rho < 0 ? "peels.way.lower" : "peels.way.higher"),
                r.peels().size() - 1);
    }
}
