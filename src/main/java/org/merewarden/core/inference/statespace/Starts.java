package org.merewarden.core.inference.statespace;

import java.util.Arrays;

/**
 * Paths from which the search for modes of the hidden states begins, along both branches.
 *
 * <pre>
 *   0  the dynamics rolled forward from β taking the recorded catches
 *   1  B = 0.75 K throughout      2  B = 0.15 K throughout
 * </pre>
 *
 * <p>F of a season is the one that yields its catch, at most 3; where none is recorded, that of the season before. The
 * same catches can be a large stock lightly fished or a small one heavily fished.
 */
final class Starts {
    static final int COUNT = 3;
    private static final double LOG_LEAST = Math.log(0.03);
    private static final double[] CONSTANT = {Double.NaN, Math.log(0.75), Math.log(0.15)};

    private final StateDensity density;
    private final KnownCatch taken;
    private final int[] counts;

    Starts(StateDensity density) {
        this.density = density;
        taken = new KnownCatch(density.step);
        counts = new int[density.matrix.borders];
    }

    /** Writes start {@code which} into z, for the density's present parameters. */
    void write(int which, double[] z) {
        double x = which == 0 ? density.startMean() : CONSTANT[which];
        double l = density.harvestMean();
        Removals removals = density.data.removals();
        for (int t = 0; t < density.seasons; t++) {
            double plus = density.afterEvents(t, x);
            boolean closed = removals.closed()[t];
            double logCatch = closed ? Math.log(removals.known()[t]) : removals.logCatch()[t];
            if (logCatch > Double.NEGATIVE_INFINITY) {
                double taking = taken.solve(plus, logCatch - density.logCapacity(t));
                l = closed ? l : taking;
            } else {
                density.step.start(plus, l, !closed);
            }
            z[2 * t] = x;
            z[2 * t + 1] = l;
            if (which == 0) {
                density.step.biomassAt(1);
                x = Math.max(
                        LOG_LEAST,
                        density.step.y
                                - density.data.logArea()[t + 1]
                                + density.data.logArea()[t]);
            }
        }
        catchabilities(z);
    }

    /** Each ln q as the mean of what its values say along the path. */
    private void catchabilities(double[] z) {
        Observations o = density.data.observations();
        int band = 2 * density.seasons;
        Arrays.fill(counts, 0);
        Arrays.fill(z, band, z.length, 0);
        for (int t = 0; t < density.seasons; t++) {
            for (int i = o.firstOf()[t]; i < o.firstOf()[t + 1]; i++) {
                int j = o.series()[i];
                if (j >= 0) {
                    boolean effort = o.kind()[i] == Observations.EFFORT;
                    double value = o.value()[i];
                    z[band + j] += effort ? z[2 * t + 1] - value : value - z[2 * t] - density.logCapacity(t);
                    counts[j]++;
                }
            }
        }
        for (int j = 0; j < counts.length; j++) {
            z[band + j] /= Math.max(1, counts[j]);
        }
    }
}
