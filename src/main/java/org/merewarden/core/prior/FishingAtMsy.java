package org.merewarden.core.prior;

/**
 * FMSY from natural mortality.
 *
 * <pre>
 *   bony fish            FMSY = 0.87 M   (SD of the ratio 0.05)
 *   cartilaginous fish   FMSY = 0.41 M   (SD of the ratio 0.09)
 * </pre>
 *
 * <p>Source: Zhou et al. 2012, Can. J. Fish. Aquat. Sci. 69: 1292–1301 (published). Their SD is that of the mean ratio;
 * the scatter of single stocks around it, log-sd {@value #RATIO_LOG_SD}, is our judgement.
 */
public final class FishingAtMsy {
    static final double RATIO_LOG_SD = 0.3;

    private FishingAtMsy() {}

    /** Bony fish: every species that this software expects. */
    public static double bonyFish(double naturalMortality) {
        return 0.87 * naturalMortality;
    }

    public static double cartilaginousFish(double naturalMortality) {
        return 0.41 * naturalMortality;
    }

    static Estimate fromMortality(Estimate mortality) {
        return new Estimate(
                bonyFish(mortality.value()),
                Math.hypot(mortality.logSd(), RATIO_LOG_SD),
                mortality.source() + "; FMSY = 0.87 M, Zhou et al. 2012",
                mortality.validity());
    }
}
