package org.merewarden.core.inference.statespace;

import java.util.List;
import java.util.Map;
import java.util.SplittableRandom;
import java.util.random.RandomGenerator;
import java.util.stream.IntStream;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Learned;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.inference.Verdict;
import org.merewarden.core.prior.Prior;

/**
 * A stock without any record of a season: draws from the priors of MSY, FMSY, n and β alone.
 *
 * <p>The present biomass is β K: what the stock would be if the season to come were the first one recorded. Strength
 * NONE, and settled: there was nothing to estimate.
 */
final class PriorsAlone {
    private PriorsAlone() {}

    static Posterior of(ModelPriors priors, Evidence evidence, int lastClosedYear, long seed) {
        int draws = StateSpaceFit.DRAWS;
        double[] msy = new double[draws];
        double[] fmsy = new double[draws];
        double[] shape = new double[draws];
        double[] fraction = new double[draws];
        double[][] biomass = new double[draws][1];
        SplittableRandom random = new SplittableRandom(seed);
        for (int i = 0; i < draws; i++) {
            msy[i] = draw(priors.msy(), random);
            fmsy[i] = draw(priors.fmsy(), random);
            double n = draw(priors.shape(), random);
            shape[i] = n < SeasonStep.LEAST_SHAPE ? 0 : n;
            fraction[i] = draw(priors.initialFraction(), random);
            biomass[i][0] = fraction[i]
                    * SurplusProduction.fromReferencePoints(msy[i], fmsy[i], shape[i])
                            .capacity();
        }
        double[] processSd = IntStream.range(0, draws)
                .mapToDouble(i -> draw(priors.processSd(), random))
                .toArray();
        return new Posterior(
                "priors alone",
                lastClosedYear + 1,
                msy,
                fmsy,
                shape,
                biomass,
                new double[draws][0],
                new double[draws][0],
                Map.of("process_sd", processSd),
                Map.of("msy_t", Quantiles.of(msy, 0.5), "fmsy", Quantiles.of(fmsy, 0.5)),
                EvidenceStrength.NONE,
                new Verdict(true, sentences(priors)),
                new Diagnostics(
                        learned(priors, msy, fmsy, fraction, shape),
                        List.of(),
                        List.of(),
                        null,
                        NextEvidence.ofPriors(priors, evidence, fmsy, biomass)));
    }

    /** Nothing is learned, so every overlap is 1; quantiles are the draws', so that they agree with the result's. */
    private static List<Learned> learned(
            ModelPriors priors, double[] msy, double[] fmsy, double[] fraction, double[] shape) {
        return List.of(
                Learning.untaught(priors.msy(), msy),
                Learning.untaught(priors.fmsy(), fmsy),
                Learning.untaught(priors.initialFraction(), fraction),
                Learning.untaught(priors.firstHarvestRate()),
                Learning.untaught(priors.processSd()),
                Learning.untaught(priors.harvestSd()),
                Learning.untaught(priors.shape(), shape));
    }

    private static double draw(Prior prior, RandomGenerator random) {
        return prior.median() * Math.exp(prior.logSd() * random.nextGaussian());
    }

    private static List<String> sentences(ModelPriors priors) {
        return List.of(
                "Rests on the lake and the species alone: no catch, effort or survey is recorded.",
                priors.msy().said("MSY", "t"),
                priors.fmsy().said("FMSY", "per year"));
    }
}
