package org.merewarden.core.prior;

import java.util.List;
import java.util.Optional;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.PriorRecord;

/**
 * The three priors that every method starts from; the office's own statements come before any formula.
 *
 * <pre>
 *   FMSY  own statement; else 0.87 M; else the productivity class; else moderate, widened
 *   MSY   own statement; else {@link MsyPrior}
 *   β     own statement; else ln β ~ N(ln 0.8, 0.3)
 * </pre>
 *
 * @param msy MSY, t/yr
 * @param fmsy FMSY, 1/yr
 * @param initialFraction β: biomass at the start of the first season as a fraction of capacity
 */
public record Priors(Prior msy, Prior fmsy, Prior initialFraction) {
    private static final double NOBODY_JUDGED_LOG_SD = 0.7;

    /** The priors of one stock. Never fails: without any knowledge they are very wide and say so. */
    public static Priors forStock(Evidence evidence) {
        return new Priors(
                own(evidence, "msy_t").orElseGet(() -> MsyPrior.of(evidence)),
                own(evidence, "fmsy").orElseGet(() -> fmsy(evidence)),
                own(evidence, "biomass_fraction_at_start").orElseGet(Priors::lightlyFished));
    }

    /** The office's own prior of a parameter, for all series; empty where it stated none. */
    public static Optional<Prior> own(Evidence evidence, String parameter) {
        return own(evidence, parameter, "");
    }

    /** The office's own prior of a parameter for one series alone; empty where it stated none. */
    public static Optional<Prior> own(Evidence evidence, String parameter, String series) {
        return evidence.priors().stream()
                .filter(p -> p.parameter().equals(parameter) && p.series().equals(series))
                .findFirst()
                .map(Priors::stated);
    }

    private static Prior stated(PriorRecord own) {
        String reason = own.reason() == null || own.reason().isBlank() ? "No reason was given." : own.reason();
        return new Prior(own.parameter(), own.median(), own.logSd(), "stated by the office", reason, "");
    }

    private static Prior fmsy(Evidence evidence) {
        List<Estimate> mortality =
                NaturalMortality.predict(evidence.traits(), evidence.habitat().meanAirTemperatureCelsius());
        if (!mortality.isEmpty()) {
            return fmsy(FishingAtMsy.fromMortality(Estimate.combined(mortality)), "From natural mortality.");
        }
        Optional<ProductivityClass> judged =
                ProductivityClass.named(evidence.traits().productivity());
        if (judged.isPresent()) {
            return fmsy(judged.get().fmsy(), "From the productivity class; no age or growth is known.");
        }
        Estimate moderate = ProductivityClass.MODERATE.fmsy();
        return new Prior(
                "fmsy",
                moderate.value(),
                NOBODY_JUDGED_LOG_SD,
                moderate.source(),
                "Nothing is known of age, growth or productivity: taken as moderate, widened.",
                "our judgement");
    }

    private static Prior fmsy(Estimate estimate, String reason) {
        return new Prior("fmsy", estimate.value(), estimate.logSd(), estimate.source(), reason, estimate.validity());
    }

    private static Prior lightlyFished() {
        return new Prior(
                "biomass_fraction_at_start",
                0.8,
                0.3,
                "default",
                "Taken as lightly fished when the records begin; state it if you know better.",
                "our judgement");
    }
}
