package org.merewarden.core.inference.statespace;

import org.merewarden.core.dynamics.ConstantMortality;
import org.merewarden.core.dynamics.SurplusProduction;

/**
 * ln p(data | θ) and mean biomass of a stock with catches and absolute biomass by filtering on a fine grid of (x, l), exact up to the grid;
 * written from the model's equations and the dynamics package alone.
 */
final class GridFilter {
    private static final double STEP_X = 0.03;
    private static final double STEP_L = 0.08;
    private static final double LOW_X = -3.5;
    private static final double LOW_L = -6;
    private static final int SIZE_X = 150;
    private static final int SIZE_L = 100;

    final double msy;
    final double fmsy;
    final double processSd;
    final double harvestSd;
    final double[] catches;
    final double catchSd;
    final double[] biomass;
    final double biomassSd;
    final double startMean;
    final double startSd;
    private double whole;

    /** Catches and biomass in t by season, NaN where there is none; biomass at the season's start. */
    GridFilter(
            double msy,
            double fmsy,
            double processSd,
            double harvestSd,
            double[] catches,
            double catchSd,
            double[] biomass,
            double biomassSd,
            double startMean,
            double startSd) {
        this.msy = msy;
        this.fmsy = fmsy;
        this.processSd = processSd;
        this.harvestSd = harvestSd;
        this.catches = catches;
        this.catchSd = catchSd;
        this.biomass = biomass;
        this.biomassSd = biomassSd;
        this.startMean = startMean;
        this.startSd = startSd;
    }

    double logLikelihood() {
        return Math.log(integral(-1));
    }

    /** E(B_t | data, θ), t; 0 the first season: the filter once more with every point weighted by its biomass at t. */
    double meanBiomass(int season) {
        whole = whole > 0 ? whole : integral(-1);
        return integral(season) / whole;
    }

    private double integral(int weightedAt) {
        SurplusProduction law = SurplusProduction.fromReferencePoints(msy, fmsy, 1);
        double[][] next = new double[SIZE_X][SIZE_L];
        double[][] taken = new double[SIZE_X][SIZE_L];
        for (int i = 0; i < SIZE_X; i++) {
            for (int j = 0; j < SIZE_L; j++) {
                ConstantMortality flow = new ConstantMortality(law, Math.exp(l(j)));
                double b = law.capacity() * Math.exp(x(i));
                next[i][j] = Math.log(flow.after(b, 1) / law.capacity());
                taken[i][j] = Math.log(flow.removals(b, 1));
            }
        }
        double[][] density = new double[SIZE_X][SIZE_L];
        for (int i = 0; i < SIZE_X; i++) {
            for (int j = 0; j < SIZE_L; j++) {
                density[i][j] = normal(x(i) - startMean, startSd) * normal(l(j) - Math.log(0.15), 1);
            }
        }
        for (int t = 0; t < catches.length; t++) {
            if (t > 0) {
                density = move(density, next);
            }
            observe(density, taken, t, Math.log(law.capacity()));
            if (t == weightedAt) {
                weighByBiomass(density, law.capacity());
            }
        }
        double sum = 0;
        for (double[] row : density) {
            for (double each : row) {
                sum += each * STEP_X * STEP_L;
            }
        }
        return sum;
    }

    private static void weighByBiomass(double[][] density, double capacity) {
        for (int i = 0; i < SIZE_X; i++) {
            for (int j = 0; j < SIZE_L; j++) {
                density[i][j] *= capacity * Math.exp(x(i));
            }
        }
    }

    private void observe(double[][] density, double[][] taken, int t, double logCapacity) {
        for (int i = 0; i < SIZE_X; i++) {
            for (int j = 0; j < SIZE_L; j++) {
                if (!Double.isNaN(catches[t])) {
                    density[i][j] *= normal(Math.log(catches[t]) - taken[i][j], catchSd);
                }
                if (!Double.isNaN(biomass[t])) {
                    density[i][j] *= normal(Math.log(biomass[t]) - logCapacity - x(i), biomassSd);
                }
            }
        }
    }

    private double[][] move(double[][] density, double[][] next) {
        double[][] byX = new double[SIZE_X][SIZE_L];
        for (int i = 0; i < SIZE_X; i++) {
            for (int j = 0; j < SIZE_L; j++) {
                double weight = density[i][j] * STEP_X;
                int middle = (int) Math.round((next[i][j] - LOW_X) / STEP_X);
                int reach = (int) (7 * processSd / STEP_X) + 1;
                for (int k = Math.max(0, middle - reach); k <= Math.min(SIZE_X - 1, middle + reach); k++) {
                    byX[k][j] += weight * normal(x(k) - next[i][j], processSd);
                }
            }
        }
        double[][] result = new double[SIZE_X][SIZE_L];
        for (int j = 0; j < SIZE_L; j++) {
            for (int m = 0; m < SIZE_L; m++) {
                double weight = normal((j - m) * STEP_L, harvestSd) * STEP_L;
                for (int i = 0; i < SIZE_X; i++) {
                    result[i][j] += byX[i][m] * weight;
                }
            }
        }
        return result;
    }

    private static double x(int i) {
        return LOW_X + i * STEP_X;
    }

    private static double l(int j) {
        return LOW_L + j * STEP_L;
    }

    private static double normal(double e, double sd) {
        return Math.exp(-0.5 * e * e / (sd * sd)) / (sd * Math.sqrt(2 * Math.PI));
    }
}
