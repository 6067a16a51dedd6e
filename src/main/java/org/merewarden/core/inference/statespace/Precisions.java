package org.merewarden.core.inference.statespace;

/**
 * The inverse variances of all terms of U at one θ, and what their logarithms add to U.
 *
 * <pre>
 *   constant = Σ ½ ln(2π variance) over every Gaussian term
 * </pre>
 *
 * <p>They do not depend on the hidden states, so one reckoning serves all steps to a mode. A term below detection is no
 * Gaussian and adds nothing.
 */
final class Precisions {
    private static final double LOG_TWO_PI = Math.log(2 * Math.PI);

    /** By season: of the step after it, and of ln ĉ (0 without a recorded catch). */
    final double[] step;

    final double[] taken;

    /** By observation. */
    final double[] observed;

    /** By series: of the prior of ln q. */
    final double[] catchability;

    final double start;
    final double firstHarvest;
    double walk;
    double constant;

    private final SeasonData data;
    private final double fixed;
    private double logs;
    private int terms;

    /** sdStart, sdFirstHarvest: of the priors of x_1 and l_1. */
    Precisions(SeasonData data, double sdStart, double sdFirstHarvest) {
        this.data = data;
        step = new double[data.seasons()];
        taken = new double[data.seasons()];
        observed = new double[data.observations().count()];
        catchability = new double[data.series().size()];
        start = term(sdStart * sdStart);
        firstHarvest = term(sdFirstHarvest * sdFirstHarvest);
        for (int j = 0; j < catchability.length; j++) {
            double sd = data.series().get(j).qSd();
            catchability[j] = term(sd * sd);
        }
        for (int t = 0; t < taken.length; t++) {
            boolean caught = !data.removals().closed()[t]
                    && !Double.isNaN(data.removals().logCatch()[t]);
            double sd = data.removals().sd()[t];
            taken[t] = caught ? term(sd * sd) : 0;
        }
        fixed = logs + terms * LOG_TWO_PI;
    }

    private double term(double variance) {
        logs += Math.log(variance);
        terms++;
        return 1 / variance;
    }

    /** All for one θ: σ_F, σ_p² and the series' σ² given; {@code density} knows the widened steps. */
    void at(StateDensity density, double logHarvestSd, double processVariance, double[] scatterVariance) {
        logs = 0;
        terms = 0;
        walk = Math.exp(-2 * logHarvestSd);
        logs += 2 * logHarvestSd * (step.length - 1);
        terms += step.length - 1;
        double plain = 1 / processVariance;
        double logPlain = Math.log(processVariance);
        for (int t = 0; t + 1 < step.length; t++) {
            boolean widened = data.stocked()[t] > 0 || data.killVariance()[t] > 0;
            step[t] = widened ? term(density.stepVariance(t)) : plain;
            logs += widened ? 0 : logPlain;
            terms += widened ? 0 : 1;
        }
        observations(scatterVariance);
        constant = 0.5 * (fixed + logs + terms * LOG_TWO_PI);
    }

    private void observations(double[] scatterVariance) {
        Observations o = data.observations();
        for (int t = 0; t < step.length; t++) {
            boolean closed = data.removals().closed()[t];
            for (int i = o.firstOf()[t]; i < o.firstOf()[t + 1]; i++) {
                int j = o.series()[i];
                double variance = o.variance()[i] + (j < 0 ? 0 : scatterVariance[j]);
                int kind = o.kind()[i];
                boolean gaussian = kind == Observations.EFFORT ? !closed : kind != Observations.BELOW_DETECTION;
                observed[i] = gaussian ? term(variance) : 1 / variance;
            }
        }
    }
}
