package org.merewarden.core.inference.statespace;

import java.util.SplittableRandom;
import org.merewarden.core.dynamics.ConstantMortality;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.statespace.Simulated.Regime;

/** Simulated stocks by name: those of the calibration test, and sixty seasons with three indices. */
final class Stocks {
    static final String RICH = "RICH";
    static final String THREE_INDICES = "THREE_INDICES";
    static final String THREE_INDICES_SHAPE = "THREE_INDICES_SHAPE";
    private static final int LONG = 60;

    private Stocks() {}

    static Evidence evidence(String name, long seed) {
        return switch (name) {
            case THREE_INDICES -> threeIndices(seed).evidence();
            case THREE_INDICES_SHAPE -> threeIndices(seed).own("shape", 1, 0.4).evidence();
            default -> Simulated.of(Regime.valueOf(name), 1000 + seed).evidence;
        };
    }

    static StateSpaceFit fit(String name, long seed) {
        return fit(evidence(name, seed), seed);
    }

    static StateSpaceFit fit(Evidence evidence, long seed) {
        ModelPriors priors = ModelPriors.of(evidence);
        return StateSpaceFit.of(SeasonData.of(evidence, Simulated.LAST, priors), priors, seed);
    }

    private static Cases threeIndices(long seed) {
        SplittableRandom random = new SplittableRandom(seed);
        double msy = 50 * Math.exp(0.4 * random.nextGaussian());
        double fmsy = 0.2 * Math.exp(0.3 * random.nextGaussian());
        SurplusProduction law = SurplusProduction.fromReferencePoints(msy, fmsy, 1);
        Cases cases = new Cases().own("msy_t", 50, 0.6).own("fmsy", 0.2, 0.5);
        double b = 0.8 * law.capacity();
        double l = Math.log(0.1);
        for (int t = 0; t < LONG; t++) {
            int year = Simulated.LAST - LONG + 1 + t;
            ConstantMortality flow = new ConstantMortality(law, Math.exp(l));
            cases.caught(year, flow.removals(b, 1) * Math.exp(0.1 * random.nextGaussian()), 0.1);
            cases.index("a", year, 0.5, 0.05 * flow.after(b, 0.5) * Math.exp(0.2 * random.nextGaussian()));
            if (t > 10) {
                cases.index("b", year, 0.25, 3 * flow.after(b, 0.25) * Math.exp(0.3 * random.nextGaussian()));
            }
            if (t > 30) {
                cases.index("c", year, 0.75, 100 * flow.after(b, 0.75) * Math.exp(0.2 * random.nextGaussian()));
            }
            b = flow.after(b, 1) * Math.exp(0.08 * random.nextGaussian());
            l += 0.2 * random.nextGaussian() - 0.1 * (l - Math.log(0.15));
        }
        return cases;
    }
}
