package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;

/**
 * Refits at the most likely parameters alone: milliseconds where a posterior takes a hundred times as long.
 *
 * <p>The mode of ln p(θ, data) ({@link Marginal}) by {@link OuterMode}, from a start and with the first guess of the
 * curvature from the posterior's draws; the states at the likeliest of their own modes there. Priors and unit are those
 * of the whole evidence. Found to about {@code 0.02} of a parameter's prior log-sd, the gradient's tolerance.
 */
final class ModeSearch {
    private static final double LEAST_VARIANCE = 0.01;

    /**
     * The most likely parameters and states of some records.
     *
     * @param data the records
     * @param path parameters and states as one draw, without noise in its last step
     * @param lastHarvest ln F of the walk in the last season, also where that is closed
     */
    record Fit(SeasonData data, StateDraws path, double lastHarvest) {
        /** As {@link OuterParameters} orders them for these records. */
        double[] theta() {
            return path.theta()[0];
        }

        double msyTonnes() {
            return data.unitTonnes() * Math.exp(theta()[OuterParameters.MSY]);
        }

        /** B/BMSY at the start of season t; T is the coming one. */
        double relativeBiomass(int t) {
            return biomassTonnes(t) / msyTonnes() * Math.exp(theta()[OuterParameters.FMSY]);
        }

        double biomassTonnes(int t) {
            return path.biomassTonnes()[0][t];
        }

        double fishing(int t) {
            return path.fishing()[0][t];
        }
    }

    private final StateSpaceFit whole;

    ModeSearch(StateSpaceFit whole) {
        this.whole = whole;
    }

    /** Of all records, from the mean of the draws; where no state is possible there, from the first draw. */
    Optional<Fit> ofAll() {
        double[][] draws = whole.draws().theta();
        double[] mean = new double[whole.outer().size()];
        for (double[] theta : draws) {
            for (int k = 0; k < mean.length; k++) {
                mean[k] += theta[k] / draws.length;
            }
        }
        return of(whole.data(), mean).or(() -> of(whole.data(), draws[0]));
    }

    /** Of a part of the records, from {@code start}, parameters of all records. */
    Optional<Fit> of(SeasonData part, double[] start) {
        OuterParameters outer = new OuterParameters(whole.priors(), part);
        Marginal marginal = new Marginal(part, whole.priors(), outer);
        int[] from = places(part);
        double[] u = outer.standard(picked(start, from));
        marginal.explore(u);
        double[] mode = new OuterMode(marginal::evaluate, u, covariance(outer, from)).mode();
        marginal.evaluate(mode);
        double[] theta = new double[outer.size()];
        outer.natural(mode, theta);
        return marginal.likeliestStates()
                .map(z -> new Fit(part, StateDraws.of(theta, z, marginal.density()), z[2 * part.seasons() - 1]));
    }

    /** Where each parameter of the part stands among those of all records; a part has no series of its own. */
    private int[] places(SeasonData part) {
        List<Integer> places = new ArrayList<>();
        for (int k = 0; k < OuterParameters.FIRST_SCATTER; k++) {
            places.add(k);
        }
        part.series().forEach(series -> places.add(OuterParameters.FIRST_SCATTER + place(whole.data(), series)));
        return places.stream().mapToInt(Integer::intValue).toArray();
    }

    /** Number of the series of that name and kind; −1 for none. */
    static int place(SeasonData data, Series wanted) {
        for (int j = 0; j < data.series().size(); j++) {
            Series series = data.series().get(j);
            if (series.effort() == wanted.effort() && series.name().equals(wanted.name())) {
                return j;
            }
        }
        return -1;
    }

    private static double[] picked(double[] theta, int[] from) {
        double[] result = new double[from.length];
        for (int k = 0; k < from.length; k++) {
            result[k] = theta[from[k]];
        }
        return result;
    }

    private double[][] covariance(OuterParameters outer, int[] from) {
        int d = outer.dimension();
        double[][] draws = whole.draws().theta();
        double[] sum = new double[d];
        double[][] result = new double[d][d];
        for (double[] theta : draws) {
            double[] u = outer.standard(picked(theta, from));
            for (int i = 0; i < d; i++) {
                sum[i] += u[i];
                for (int j = 0; j < d; j++) {
                    result[i][j] += u[i] * u[j] / draws.length;
                }
            }
        }
        for (int i = 0; i < d; i++) {
            for (int j = 0; j < d; j++) {
                result[i][j] -= sum[i] * sum[j] / ((double) draws.length * draws.length);
            }
            result[i][i] += LEAST_VARIANCE;
        }
        return result;
    }
}
