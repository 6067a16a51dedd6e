package org.merewarden.core.dynamics;

/**
 * A {@link FishedYear} of surplus production that is weakened at low biomass ({@link Depensation}). With u = ln(B/K):
 *
 * <pre>
 *   du/dt = g(B)/B · B/(B + dK) − F,      dC/dt = F B
 * </pre>
 *
 * <p>By the classical Runge–Kutta method in {@value #STEPS} steps. Accuracy: biomass and catch within 1e-5 relative for
 * r ≤ 1.5, F ≤ 1 and biomass up to K; within 1e-3 up to F = 3.
 */
public final class DepensatedYear extends FishedYear {
    static final int STEPS = 8;
    private static final double STEP = 1.0 / STEPS;

    private final SurplusProduction growth;
    private final double halfGrowthState;

    /** @param halfGrowthState d, the state B/K at which growth is halved, ≥ 0 */
    public DepensatedYear(SurplusProduction growth, double halfGrowthState) {
        Require.notNegative("d", halfGrowthState);
        this.growth = growth;
        this.halfGrowthState = halfGrowthState;
    }

    @Override
    public double after(double biomassTonnes, double mortality) {
        return biomassTonnes == 0 ? 0 : growth.capacityTonnes() * Math.exp(run(biomassTonnes, mortality, false));
    }

    @Override
    public double removals(double biomassTonnes, double mortality) {
        return biomassTonnes == 0 ? 0 : mortality * growth.capacityTonnes() * run(biomassTonnes, mortality, true);
    }

    /** ln of the state after the year, or the year's integral of the state. */
    private double run(double biomassTonnes, double mortality, boolean integral) {
        double u = Math.log(biomassTonnes / growth.capacityTonnes());
        double sum = 0;
        for (int i = 0; i < STEPS; i++) {
            double k1 = slope(u, mortality);
            double middle1 = u + STEP / 2 * k1;
            double k2 = slope(middle1, mortality);
            double middle2 = u + STEP / 2 * k2;
            double k3 = slope(middle2, mortality);
            double end = u + STEP * k3;
            double k4 = slope(end, mortality);
            if (integral) {
                sum += STEP / 6 * (Math.exp(u) + 2 * Math.exp(middle1) + 2 * Math.exp(middle2) + Math.exp(end));
            }
            u += STEP / 6 * (k1 + 2 * k2 + 2 * k3 + k4);
        }
        return integral ? sum : u;
    }

    private double slope(double u, double mortality) {
        double state = Math.exp(u);
        double perCapita = -growth.r() * Stable.expm1Over(growth.shape(), u);
        return perCapita * state / (state + halfGrowthState) - mortality;
    }
}
