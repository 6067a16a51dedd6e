package org.merewarden.core.outlook;

import java.util.List;
import java.util.Map;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Verdict;

/** Posteriors whose draws are given, not estimated: assessed up to season 2025. */
public final class MadePosterior {
    private MadePosterior() {}

    /** Draws by number; biomass at the start of 2026. */
    public static Posterior of(
            int draws,
            IntToDoubleFunction msy,
            IntToDoubleFunction fmsy,
            double shape,
            IntToDoubleFunction biomass,
            double processSd,
            EvidenceStrength strength) {
        return new Posterior(
                "made",
                2026,
                values(draws, msy),
                values(draws, fmsy),
                values(draws, i -> shape),
                IntStream.range(0, draws)
                        .mapToObj(i -> new double[] {biomass.applyAsDouble(i)})
                        .toArray(double[][]::new),
                new double[draws][0],
                new double[draws][0],
                Map.of("process_sd", values(draws, i -> processSd)),
                Map.of(),
                strength,
                new Verdict(true, List.of()),
                Diagnostics.NONE);
    }

    /** Equal draws of a logistic stock, r 0.4, K 1000 t: MSY 100 t, BMSY 500 t. */
    public static Posterior logistic(int draws, double biomass, double processSd) {
        return of(draws, i -> 100, i -> 0.2, 1, i -> biomass, processSd, EvidenceStrength.FAIR);
    }

    private static double[] values(int draws, IntToDoubleFunction value) {
        return IntStream.range(0, draws).mapToDouble(value).toArray();
    }
}
