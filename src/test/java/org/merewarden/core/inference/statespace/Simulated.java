package org.merewarden.core.inference.statespace;

import java.util.DoubleSummaryStatistics;
import java.util.SplittableRandom;
import org.merewarden.core.dynamics.ConstantMortality;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;

/** A stock drawn from the priors, with its evidence; written from the model's equations and the dynamics package. */
final class Simulated {
    /** What kind of evidence a stock has. */
    enum Regime {
        RICH(30, 1, 0.2, true),
        SHORT(8, 1, 0.2, true),
        GAPPY(30, 0.3, 0.2, true),
        NOISY(30, 1, 0.6, true),
        CATCH_ONLY(30, 0, 0.2, true),
        ABUNDANCE_ONLY(20, 1, 0.2, false);

        final int seasons;
        final double observed;
        final double scatter;
        final boolean caught;

        Regime(int seasons, double observed, double scatter, boolean caught) {
            this.seasons = seasons;
            this.observed = observed;
            this.scatter = scatter;
            this.caught = caught;
        }
    }

    static final int LAST = 2020;
    private static final double CATCH_CV = 0.1;
    private static final double BIOMASS_CV = 0.3;

    final double msy;
    final double fmsy;
    final double processSd;
    final double[] biomass;
    final Evidence evidence;

    /**
     * The first stock after the seed whose records look like records: the largest catch or biomass at most a thousand
     * times the smallest. A choice by the data alone leaves every posterior given data as it is.
     */
    static Simulated of(Regime regime, long seed) {
        SplittableRandom random = new SplittableRandom(seed);
        Simulated stock = new Simulated(regime, random);
        while (!stock.plausible()) {
            stock = new Simulated(regime, random);
        }
        return stock;
    }

    private boolean plausible() {
        DoubleSummaryStatistics range = (evidence.catches().isEmpty()
                        ? evidence.surveys().stream().mapToDouble(SurveyRecord::value)
                        : evidence.catches().stream().mapToDouble(CatchRecord::catchTonnes))
                .summaryStatistics();
        return range.getMax() < 1000 * range.getMin();
    }

    private Simulated(Regime regime, SplittableRandom random) {
        msy = 50 * Math.exp(0.6 * random.nextGaussian());
        fmsy = 0.2 * Math.exp(0.5 * random.nextGaussian());
        processSd = 0.1 * Math.exp(0.4 * random.nextGaussian());
        double harvestSd = 0.3 * Math.exp(0.5 * random.nextGaussian());
        double scatter = regime.scatter * Math.exp(0.4 * random.nextGaussian());
        double logQ = -3 + 0.5 * random.nextGaussian();
        SurplusProduction law = SurplusProduction.fromReferencePoints(msy, fmsy, 1);
        double l = Math.log(0.15) + random.nextGaussian();
        biomass = new double[regime.seasons + 1];
        biomass[0] = law.capacity() * 0.8 * Math.exp(0.3 * random.nextGaussian());
        Cases cases = new Cases()
                .own("msy_t", 50, 0.6)
                .own("fmsy", 0.2, 0.5)
                .own("observation_sd", regime.scatter, 0.4)
                .own("catchability", Math.exp(-3), 0.5);
        for (int t = 0; t < regime.seasons; t++) {
            int year = LAST - regime.seasons + 1 + t;
            ConstantMortality flow = new ConstantMortality(law, Math.exp(l));
            if (regime.caught) {
                double noise = Math.exp(CATCH_CV * random.nextGaussian());
                cases.caught(year, flow.removals(biomass[t], 1) * noise, CATCH_CV);
                if (random.nextDouble() < regime.observed) {
                    double index = logQ + Math.log(flow.after(biomass[t], 0.5)) + scatter * random.nextGaussian();
                    cases.index("nets", year, 0.5, Math.exp(index));
                }
            } else {
                double seen = biomass[t] * Math.exp(BIOMASS_CV * random.nextGaussian());
                cases.surveys.add(new SurveyRecord(year, "marked", 0, true, seen, BIOMASS_CV, null));
            }
            biomass[t + 1] = flow.after(biomass[t], 1) * Math.exp(processSd * random.nextGaussian());
            l += harvestSd * random.nextGaussian();
        }
        evidence = cases.evidence();
    }

    double[] truth() {
        return new double[] {msy, fmsy, biomass[biomass.length - 1] * fmsy / msy, processSd};
    }

    /** The same quantities by draw. */
    static double[][] drawn(StateSpaceFit fit) {
        double[] msy = fit.parameter(OuterParameters.MSY);
        double[] fmsy = fit.parameter(OuterParameters.FMSY);
        double[] relative = new double[msy.length];
        for (int k = 0; k < msy.length; k++) {
            double[] path = fit.draws().biomassTonnes()[k];
            relative[k] = path[path.length - 1] * fmsy[k] / msy[k];
        }
        return new double[][] {msy, fmsy, relative, fit.parameter(OuterParameters.PROCESS_SD)};
    }
}
