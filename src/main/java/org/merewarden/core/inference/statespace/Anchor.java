package org.merewarden.core.inference.statespace;

/**
 * A mode of the hidden states kept as a warm start, with its first-order change by the outer parameters.
 *
 * <pre>
 *   z(u) ≈ z_a + J (u − u_a),   J = −H⁻¹ ∂²U/∂z ∂u          (implicit function theorem)
 * </pre>
 *
 * <p>Far away the line misleads, so no state is moved by more than {@value #FARTHEST}.
 */
final class Anchor {
    private static final double FARTHEST = 2;
    private static final double DIFFERENCE = 1e-4;

    private final double[] u;
    private final double[] z;
    private final double[][] slopes;

    private Anchor(double[] u, double[] z, double[][] slopes) {
        this.u = u;
        this.z = z;
        this.slopes = slopes;
    }

    /** At a mode z for the outer parameters u. */
    static Anchor at(double[] u, double[] z, StateDensity density, OuterParameters outer) {
        double[] theta = new double[outer.size()];
        outer.natural(u, theta);
        density.parameters(theta, 0);
        density.evaluate(z);
        density.addCurvature(1);
        boolean factored = density.matrix.factor();
        double[] base = density.gradient.clone();
        double[][] slopes = new double[u.length][z.length];
        for (int k = 0; k < u.length && factored; k++) {
            double[] shifted = u.clone();
            shifted[k] += DIFFERENCE;
            outer.natural(shifted, theta);
            density.parameters(theta, 0);
            density.evaluate(z);
            for (int i = 0; i < z.length; i++) {
                slopes[k][i] = (base[i] - density.gradient[i]) / DIFFERENCE;
            }
            density.matrix.solve(slopes[k], slopes[k]);
        }
        return new Anchor(u.clone(), z.clone(), slopes);
    }

    void predict(double[] at, double[] out) {
        System.arraycopy(z, 0, out, 0, z.length);
        for (int k = 0; k < u.length; k++) {
            double move = at[k] - u[k];
            double[] slope = slopes[k];
            for (int i = 0; i < out.length; i++) {
                out[i] += slope[i] * move;
            }
        }
        for (int i = 0; i < out.length; i++) {
            out[i] = Math.max(z[i] - FARTHEST, Math.min(z[i] + FARTHEST, out[i]));
        }
    }
}
