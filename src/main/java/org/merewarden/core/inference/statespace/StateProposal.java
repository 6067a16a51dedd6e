package org.merewarden.core.inference.statespace;

import java.util.random.RandomGenerator;
import org.apache.commons.math3.special.Gamma;

/**
 * The Gaussian at one mode of the hidden states, with heavy tails along its two widest directions, bent along the seasons'
 * steps ({@link GuidedPath}; the formulas below are of the straight deviation, and the bend has Jacobian 1).
 *
 * <pre>
 *   z = z_m + δ,   δ = (Gaussian with covariance H⁻¹, without its parts along d_1, d_2) + s_1 d_1 + s_2 d_2
 *   d_kᵀ H d_k = 1,  d_1ᵀ H d_2 = 0,  a_k = d_kᵀ H δ,   s_k ~ t with {@value #FREEDOM} degrees of freedom
 *   ln g(z) = −½ (δᵀ H δ − a_1² − a_2²) − ½ (N − 2) ln 2π + ½ ln det H + Σ ln t(a_k)
 * </pre>
 *
 * <p>Along the widest directions (the level of the biomass path, the level of the harvest path) a posterior can be much
 * heavier than its curvature at the mode tells; elsewhere the seasons' own records hold it. The directions are the
 * leading eigenvectors of H⁻¹ after one power iteration from a shift of all biomass and of all harvest: they need not be
 * exact.
 */
final class StateProposal {
    static final int FREEDOM = 4;
    private static final int DIRECTIONS = 2;
    private static final double HALF_LOG_TWO_PI = 0.5 * Math.log(2 * Math.PI);
    private static final double LOG_T =
            Gamma.logGamma((FREEDOM + 1) / 2.0) - Gamma.logGamma(FREEDOM / 2.0) - 0.5 * Math.log(FREEDOM * Math.PI);

    private final GuidedPath path;
    private final BorderedBand hessian;
    private final double[][] direction;
    private final double[][] dual;
    private final double[] difference;
    private final double[] product;
    private double[] centre = new double[0];
    private double halfLogDeterminant;
    private double logDensity;

    StateProposal(StateDensity density) {
        path = new GuidedPath(density);
        int band = density.matrix.band;
        int borders = density.matrix.borders;
        hessian = new BorderedBand(band, borders);
        int size = band + borders;
        direction = new double[DIRECTIONS][size];
        dual = new double[DIRECTIONS][size];
        difference = new double[size];
        product = new double[size];
    }

    /** Takes a mode, not to be changed afterwards, and the factored Hessian next to it. */
    void keep(double[] mode, BorderedBand factored) {
        centre = mode;
        hessian.copy(factored);
    }

    /** Makes what was kept last ready for draws. */
    void prepare() {
        halfLogDeterminant = 0.5 * hessian.logDeterminant();
        path.at(centre, hessian);
        for (int k = 0; k < DIRECTIONS; k++) {
            for (int i = 0; i < centre.length; i++) {
                boolean biomass = i < hessian.band && i % 2 == 0;
                direction[k][i] = biomass ? 1 - k : i < hessian.band ? 2 * k - 1 : k - 1;
            }
            hessian.solve(direction[k], direction[k]);
            orthonormal(k);
        }
    }

    /** Makes direction k H-orthogonal to the earlier ones and of unit length, and sets its dual H d. */
    private void orthonormal(int k) {
        double[] d = direction[k];
        for (int before = 0; before < k; before++) {
            double part = dot(dual[before], d);
            for (int i = 0; i < d.length; i++) {
                d[i] -= part * direction[before][i];
            }
        }
        hessian.multiply(d, dual[k]);
        double length = Math.sqrt(dot(d, dual[k]));
        for (int i = 0; i < d.length; i++) {
            d[i] /= length;
            dual[k][i] /= length;
        }
    }

    private static double dot(double[] a, double[] b) {
        double sum = 0;
        for (int i = 0; i < a.length; i++) {
            sum += a[i] * b[i];
        }
        return sum;
    }

    /** Draws a pair z_m ± δ; ln g is the same for both, see {@link #logDensity()}. */
    void draw(RandomGenerator random, double[] plus, double[] minus) {
        double squares = hessian.sample(random, plus);
        double tails = 0;
        for (int k = 0; k < DIRECTIONS; k++) {
            double a = dot(dual[k], plus);
            double s = studentT(random);
            squares -= a * a;
            tails += logT(s);
            for (int i = 0; i < plus.length; i++) {
                plus[i] += (s - a) * direction[k][i];
            }
        }
        for (int i = 0; i < plus.length; i++) {
            minus[i] = centre[i] - plus[i];
            plus[i] += centre[i];
        }
        path.bend(plus);
        path.bend(minus);
        logDensity = normalised(squares, tails);
    }

    /** ln g of the pair drawn last. */
    double logDensity() {
        return logDensity;
    }

    /** ln g at any z. */
    double logDensity(double[] z) {
        path.unbend(z, difference);
        for (int i = 0; i < z.length; i++) {
            difference[i] -= centre[i];
        }
        hessian.multiply(difference, product);
        double squares = dot(difference, product);
        double tails = 0;
        for (int k = 0; k < DIRECTIONS; k++) {
            double a = dot(dual[k], difference);
            squares -= a * a;
            tails += logT(a);
        }
        return normalised(squares, tails);
    }

    private double normalised(double squares, double tails) {
        return -0.5 * squares - (centre.length - DIRECTIONS) * HALF_LOG_TWO_PI + halfLogDeterminant + tails;
    }

    private static double studentT(RandomGenerator random) {
        double chiSquare = 0;
        for (int k = 0; k < FREEDOM; k++) {
            double g = random.nextGaussian();
            chiSquare += g * g;
        }
        return random.nextGaussian() / Math.sqrt(chiSquare / FREEDOM);
    }

    private static double logT(double s) {
        return LOG_T - 0.5 * (FREEDOM + 1) * Math.log1p(s * s / FREEDOM);
    }
}
