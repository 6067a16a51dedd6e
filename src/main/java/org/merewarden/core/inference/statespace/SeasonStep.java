package org.merewarden.core.inference.statespace;

/**
 * One season under a constant F, with first and second derivatives by x = ln b and l = ln F.
 *
 * <pre>
 *   a = r − nF,  z = aτ,  φ(z) = (e^z − 1)/z,  w = ln(1 + r τ φ e^(nx)),  p = 1 − e^(−w)
 *   ln b(τ) = x + (z − w)/n                              n → 0:  (x + F/r) e^(−rτ) − F/r
 *   n = 1:  ln C/K = l − ln r + ln w(1);   else  ln C/K = l + ln Σ ω_k b(τ_k),   Gauss–Legendre
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>b, C</td><td>biomass over capacity K; removals of the whole season</td></tr>
 * <tr><td>r, n</td><td>growth of Pella &amp; Tomlinson 1969, 1/yr; shape, 1 Graham–Schaefer, 0 Fox</td></tr>
 * <tr><td>F, τ</td><td>fishing mortality, 1/yr; time of the season, 0–1</td></tr>
 * </table>
 *
 * <p>With h = ln φ as a function of l, w depends on nx + h alone; that gives every derivative below. n under
 * {@value #LEAST_SHAPE} is taken as 0, which changes ln b by about as much. Accuracy: 1e-12 for ln b, 1e-10 for ln C with
 * n = 1; otherwise by {@link Quadrature}. Results are left in fields, so that an evaluation allocates nothing.
 */
final class SeasonStep {
    static final double LEAST_SHAPE = 1e-3;
    private static final double SMALL = 0.05;

    private double r;
    private double logR;
    private double n;
    private double perN;
    private double x;
    private double l;
    private double mortality;
    private double growing;
    private double h1;
    private double h2;
    private double w;
    private double p;

    /** Whether derivatives are wanted; without them y and c alone are set. */
    boolean slopes = true;

    /** ln b(τ) and its derivatives. */
    double y;

    double yX;
    double yL;
    double yXX;
    double yXL;
    double yLL;

    /** ln C/K and its derivatives. */
    double c;

    double cX;
    double cL;
    double cXX;
    double cXL;
    double cLL;

    /** The law for the coming steps: FMSY in 1/yr, n ≥ 0. Returns ln(K · FMSY/MSY) = ln(1 + n)/n. */
    double law(double fmsy, double shape) {
        n = shape < LEAST_SHAPE ? 0 : shape;
        perN = n == 0 ? 0 : 1 / n;
        r = fmsy * (1 + n);
        logR = Math.log(r);
        return n == 0 ? 1 : Math.log1p(n) / n;
    }

    /** A season from ln b = x under F = e^l, or under F = 0 where there is no fishing. */
    void start(double logState, double logMortality, boolean fished) {
        x = logState;
        l = logMortality;
        mortality = fished ? Math.exp(l) : 0;
        growing = n == 0 ? 0 : Math.exp(n == 1 ? x : n * x);
    }

    /** Sets y and its derivatives. */
    void biomassAt(double tau) {
        if (n == 0) {
            foxBiomassAt(tau);
            return;
        }
        double z = (r - n * mortality) * tau;
        double e = Math.exp(z);
        double f0 = Math.abs(z) < SMALL ? e - z * firstMoment(e, z) : (e - 1) / z;
        double u = r * growing * tau * f0;
        w = logOnePlus(u);
        y = x + (z - w) * perN;
        if (slopes) {
            p = u / (1 + u);
            derive(z, e, f0, tau);
        }
    }

    private void derive(double z, double e, double f0, double tau) {
        boolean small = Math.abs(z) < SMALL;
        double f1 = small ? firstMoment(e, z) : (e - f0) / z;
        double f2 = small ? secondMoment(z) : (e - 2 * f1) / z;
        double v = n * mortality * tau;
        double rho = f1 / f0;
        h1 = -v * rho;
        h2 = v * (v * (f2 / f0 - rho * rho) - rho);
        double q = p * (1 - p);
        double byFishing = mortality * tau;
        yX = 1 - p;
        yL = -byFishing - p * h1 * perN;
        yXX = -n * q;
        yXL = -q * h1;
        yLL = -byFishing - (q * h1 * h1 + p * h2) * perN;
    }

    /** φ′ = ∫₀¹ t e^(zt) dt for small z. */
    private static double firstMoment(double e, double z) {
        return (e - z * secondMoment(z)) / 2;
    }

    /** φ″ = ∫₀¹ t² e^(zt) dt = Σ z^k/(k! (k + 3)) for small z; the next term is below 1e-12. */
    private static double secondMoment(double z) {
        double high = 1 / 36.0 + z * (1 / 168.0 + z * (1 / 960.0 + z / 6480.0));
        return 1 / 3.0 + z * (0.25 + z * (0.1 + z * high));
    }

    /** ln(1 + u), u ≥ 0; faster than log1p and as good where it matters. */
    private static double logOnePlus(double u) {
        return u < 1e-3 ? u * (1 - u * (1 / 2.0 - u * (1 / 3.0 - u * (1 / 4.0 - u / 5.0)))) : Math.log(1 + u);
    }

    private void foxBiomassAt(double tau) {
        double decay = Math.exp(-r * tau);
        double lost = mortality / r * (1 - decay);
        y = x * decay - lost;
        yX = decay;
        yL = -lost;
        yXX = 0;
        yXL = 0;
        yLL = -lost;
    }

    /** Sets c and its derivatives for a fished season; for n = 1 right after {@code biomassAt(1)}. */
    void removals() {
        if (n != 1) {
            quadrature();
            return;
        }
        c = l - logR + Math.log(w);
        if (slopes) {
            double s = p / w;
            double sX = s * (1 - p - s);
            cX = s;
            cL = 1 + s * h1;
            cXX = sX;
            cXL = sX * h1;
            cLL = sX * h1 * h1 + s * h2;
        }
    }

    /** Spread of the season's rates, which the nodes must follow: r max(1, bⁿ) + nF + |d ln b/dt at its start|. */
    private double liveliness() {
        double rate = n == 0 ? -r * x : r * perN * (1 - growing);
        return r * Math.max(1, growing) + n * mortality + Math.abs(rate - mortality);
    }

    private void quadrature() {
        Quadrature rule = Quadrature.of(liveliness());
        double sum = 0;
        double mX = 0;
        double mL = 0;
        double mXX = 0;
        double mXL = 0;
        double mLL = 0;
        for (int k = 0; k < rule.nodes(); k++) {
            biomassAt(rule.time(k));
            double weight = rule.weight(k) * Math.exp(y - x);
            sum += weight;
            mX += weight * yX;
            mL += weight * yL;
            mXX += weight * (yXX + yX * yX);
            mXL += weight * (yXL + yX * yL);
            mLL += weight * (yLL + yL * yL);
        }
        c = l + x + Math.log(sum);
        cX = mX / sum;
        cL = 1 + mL / sum;
        cXX = mXX / sum - cX * cX;
        cXL = (mXL - mX * mL / sum) / sum;
        cLL = (mLL - mL * mL / sum) / sum;
    }
}
