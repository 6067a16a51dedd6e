package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Diagnostics.Learned;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.prior.Prior;

/**
 * Each parameter before and after the data: its prior as used, quantiles of its draws, and the {@link Overlap} of the two
 * on the logarithm.
 *
 * <p>Of the hidden starts (biomass fraction, F of the first season) and the catchabilities the drawn states. In the
 * parameters' own units: t/yr, 1/yr, index per t, F per unit of effort.
 */
final class Learning {
    private static final double[] SHOWN = {0.1, 0.5, 0.9};
    private static final double NORMAL_90 = 1.2815515655446004;

    private final StateSpaceFit fit;
    private final List<Learned> learned = new ArrayList<>();

    private Learning(StateSpaceFit fit) {
        this.fit = fit;
    }

    /** At least one draw; a parameter beyond the arithmetic is left out. */
    static List<Learned> of(StateSpaceFit fit) {
        Learning learning = new Learning(fit);
        learning.ofAllSeries();
        learning.ofEachSeries();
        return learning.learned;
    }

    /** Where there are no data: the prior again, as its draws have it. */
    static Learned untaught(Prior prior, double[] draws) {
        double[] quantiles = Quantiles.of(draws, SHOWN);
        return new Learned(prior, "", quantiles[0], quantiles[1], quantiles[2], overlap(prior));
    }

    /** The same where no draws are made of it. */
    static Learned untaught(Prior prior) {
        double factor = Math.exp(NORMAL_90 * prior.logSd());
        return new Learned(prior, "", prior.median() / factor, prior.median(), prior.median() * factor, overlap(prior));
    }

    private static @Nullable Double overlap(Prior prior) {
        return prior.logSd() > 0 ? (Double) 1.0 : null;
    }

    private void ofAllSeries() {
        ModelPriors priors = fit.priors();
        add(priors.msy(), "", fit.parameter(OuterParameters.MSY));
        add(priors.fmsy(), "", fit.parameter(OuterParameters.FMSY));
        add(priors.initialFraction(), "", initialFraction());
        add(priors.firstHarvestRate(), "", fit.draws().firstRate());
        add(priors.processSd(), "", fit.parameter(OuterParameters.PROCESS_SD));
        add(priors.harvestSd(), "", fit.parameter(OuterParameters.HARVEST_SD));
        add(priors.shape(), "", fit.parameter(OuterParameters.SHAPE));
    }

    private void ofEachSeries() {
        List<Series> series = fit.data().series();
        for (int j = 0; j < series.size(); j++) {
            add(series.get(j).scatter(), series.get(j).name(), fit.parameter(OuterParameters.FIRST_SCATTER + j));
        }
        for (int j = 0; j < series.size(); j++) {
            add(series.get(j).catchability(), series.get(j).name(), fit.catchability(j));
        }
    }

    private double[] initialFraction() {
        double[][] theta = fit.draws().theta();
        StateDensity density = new StateDensity(fit.data(), fit.priors());
        double[] fraction = new double[theta.length];
        for (int k = 0; k < fraction.length; k++) {
            density.parameters(theta[k], 0);
            double capacity = fit.data().unitTonnes() * Math.exp(density.logCapacity(0));
            fraction[k] = fit.draws().biomassTonnes()[k][0] / capacity;
        }
        return fraction;
    }

    private void add(Prior prior, String series, double[] draws) {
        double[] quantiles = Quantiles.of(draws, SHOWN);
        if (quantiles[0] > 0 && quantiles[2] < Double.POSITIVE_INFINITY) {
            learned.add(new Learned(prior, series, quantiles[0], quantiles[1], quantiles[2], overlap(prior, draws)));
        }
    }

    private static @Nullable Double overlap(Prior prior, double[] draws) {
        double[] logs =
                Arrays.stream(draws).map(Math::log).filter(Double::isFinite).toArray();
        return prior.logSd() > 0 ? (Double) Overlap.of(Math.log(prior.median()), prior.logSd(), logs) : null;
    }
}
