package org.merewarden.core.inference.statespace;

/**
 * Bends a straight deviation from a mode of the hidden states along the season's step, so that a proposal follows the
 * path of the biomass where few records hold it.
 *
 * <pre>
 *   gap_t = f(z_t) − f(z*_t) − f′(z*_t) (z_t − z*_t),     shift_{t+1} = M_t shift_t + V_{t+1} e_x gap_t/v_t
 *   V_t = S_t⁻¹,   S_t = H_tt − H_{t,t+1} V_{t+1} H_{t+1,t},   M_t = −V_{t+1} H_{t+1,t}
 * </pre>
 *
 * <p>z*: the mode; z_t = (x_t, l_t); f: mean of x_{t+1}; v: variance of the step; H: Hessian at the mode, of the states
 * given the ln q's. S is what season t's step, records and all later ones say of (x, l): the shift is the share of the
 * gap that they leave to the step. A shift depends on earlier states alone, so the bend has Jacobian 1 and is undone
 * by the same sweep.
 */
final class GuidedPath {
    private static final int SLOPES = 9;

    private final StateDensity density;
    private final double[][] slopes;
    private double[] centre = new double[0];

    GuidedPath(StateDensity density) {
        this.density = density;
        slopes = new double[density.seasons][SLOPES];
    }

    /** Takes a mode and the Hessian there; the density's parameters are those of the mode. */
    void at(double[] mode, BorderedBand h) {
        centre = mode;
        int end = 2 * density.seasons - 2;
        double sxx = h.diagonal[end];
        double sxl = h.below[end + 1];
        double sll = h.diagonal[end + 1];
        for (int t = density.seasons - 2; t >= 0; t--) {
            int i = 2 * t;
            double determinant = sxx * sll - sxl * sxl;
            double vxx = sll / determinant;
            double vxl = -sxl / determinant;
            double vll = sxx / determinant;
            double xx = h.below2[i + 2];
            double xl = h.below[i + 2];
            double ll = h.below2[i + 3];
            double[] s = slopes[t];
            s[0] = -vxx * xx;
            s[1] = -(vxx * xl + vxl * ll);
            s[2] = -vxl * xx;
            s[3] = -(vxl * xl + vll * ll);
            double variance = density.stepVariance(t);
            s[4] = vxx / variance;
            s[5] = vxl / variance;
            s[6] = density.stepFrom(t, mode[i], mode[i + 1], true);
            s[7] = density.step.yX * density.kept(t, mode[i]);
            s[8] = density.step.yL;
            sxx = h.diagonal[i] + xx * s[0];
            sxl = h.below[i + 1] + xx * s[1];
            sll = h.diagonal[i + 1] + xl * s[1] + ll * s[3];
        }
    }

    /** Bends z in place. */
    void bend(double[] z) {
        sweep(z, z, 1);
    }

    /** Writes to {@code straight} the z that {@link #bend} would make of it; the two are different arrays. */
    void unbend(double[] z, double[] straight) {
        System.arraycopy(z, 0, straight, 0, z.length);
        sweep(z, straight, -1);
    }

    private void sweep(double[] bent, double[] out, int sign) {
        double shiftX = 0;
        double shiftL = 0;
        for (int t = 0; t + 1 < density.seasons; t++) {
            int i = 2 * t;
            double[] s = slopes[t];
            double line = s[6] + s[7] * (bent[i] - centre[i]) + s[8] * (bent[i + 1] - centre[i + 1]);
            double gap = density.stepFrom(t, bent[i], bent[i + 1], false) - line;
            double x = s[0] * shiftX + s[1] * shiftL + s[4] * gap;
            shiftL = s[2] * shiftX + s[3] * shiftL + s[5] * gap;
            shiftX = x;
            out[i + 2] += sign * shiftX;
            out[i + 3] += sign * shiftL;
        }
    }
}
