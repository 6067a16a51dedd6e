package org.merewarden.core.inference.statespace;

import java.util.Optional;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.prior.Prior;
import org.merewarden.core.prior.Priors;

/**
 * Lognormal priors of the state-space model; the office's own statement of a parameter comes before each default.
 *
 * <pre>
 *   MSY, FMSY, β      {@link Priors}
 *   σ_p (process)     median 0.1, log-sd 0.4
 *   σ_F (harvest)     median 0.3, log-sd 0.5
 *   F of season 1     median 0.15 per year, log-sd 1
 *   n (shape)         fixed at 1
 *   σ_j (series)      median 0.2, log-sd 0.4
 * </pre>
 *
 * <p>The defaults from σ_p on are our judgement.
 */
record ModelPriors(
        Prior msy,
        Prior fmsy,
        Prior initialFraction,
        Prior processSd,
        Prior harvestSd,
        Prior firstHarvestRate,
        Prior shape) {
    private static final String SCATTER = "The usual size of this scatter.";
    private static final Prior PROCESS = standard("process_sd", 0.1, 0.4, SCATTER);
    private static final Prior HARVEST = standard("harvest_sd", 0.3, 0.5, SCATTER);
    private static final Prior FIRST_RATE =
            standard("first_harvest_rate", 0.15, 1, "A moderate rate, known to a factor of three.");
    private static final Prior SCHAEFER =
            standard("shape", 1, 0, "Fixed at Graham–Schaefer: few records tell the shape of growth.");
    private static final Prior OBSERVATION = standard("observation_sd", 0.2, 0.4, SCATTER);

    static ModelPriors of(Evidence evidence) {
        Priors priors = Priors.forStock(evidence);
        return new ModelPriors(
                priors.msy(),
                priors.fmsy(),
                priors.initialFraction(),
                ownElse(evidence, PROCESS),
                ownElse(evidence, HARVEST),
                ownElse(evidence, FIRST_RATE),
                ownElse(evidence, SCHAEFER));
    }

    static Prior observationSd(Evidence evidence, String series) {
        return own(evidence, "observation_sd", series).orElse(OBSERVATION);
    }

    /** The statement for this series, else the one for all series. */
    static Optional<Prior> own(Evidence evidence, String parameter, String series) {
        return Priors.own(evidence, parameter, series).or(() -> Priors.own(evidence, parameter));
    }

    private static Prior ownElse(Evidence evidence, Prior other) {
        return Priors.own(evidence, other.parameter()).orElse(other);
    }

    private static Prior standard(String parameter, double median, double logSd, String reason) {
        return new Prior(parameter, median, logSd, "default", reason, "our judgement");
    }
}
