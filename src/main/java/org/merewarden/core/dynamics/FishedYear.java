package org.merewarden.core.dynamics;

/**
 * A year under a constant fishing mortality F. A wanted catch is taken as the F that yields it,
 *
 * <pre>
 *   C(F) = F ∫₀¹ B dt = wanted,   0 ≤ F ≤ 3
 * </pre>
 *
 * <p>so a catch that is not there is not taken. F is the smallest that yields the catch; where none does, F = 3 and the
 * catch is what that takes. C usually rises over the whole range, but a small, fast-growing stock yields most at an F
 * below 3; C then rises to one maximum and falls after it.
 *
 * <p>More biomass at the start never ends in less, and a larger wanted catch never in more: what follows from a start
 * rests on that.
 *
 * <p>Edge cases: an empty lake gives F = 0 when nothing is wanted, else F = 3, and no catch.
 */
public abstract class FishedYear {
    /** The largest fishing mortality of a season, 1/yr. */
    public static final double LARGEST_MORTALITY = 3;

    private static final double CATCH_ACCURACY = 1e-13;

    private static final int MOST_STEPS = 200;

    /** Share by which the largest mortality is lowered to see whether the catch still rises there. */
    private static final double PROBE = 1e-6;

    private static final double INVERSE_GOLDEN = (Math.sqrt(5) - 1) / 2;

    /** Biomass in t a year later under the given F (1/yr, ≥ 0); without allocation. */
    public abstract double after(double biomassTonnes, double mortality);

    /** Removals in t of a year under the given F (1/yr, ≥ 0); without allocation. */
    public abstract double removals(double biomassTonnes, double mortality);

    /** The F in 1/yr, 0–3, that takes the wanted catch (t, ≥ 0) from the given biomass (t, ≥ 0); without allocation. */
    public final double mortality(double biomassTonnes, double wantedTonnes) {
        Require.notNegative("B", biomassTonnes);
        Require.notNegative("catch", wantedTonnes);
        if (wantedTonnes == 0) {
            return 0;
        }
        double most = removals(biomassTonnes, LARGEST_MORTALITY);
        if (most >= wantedTonnes) {
            return solve(biomassTonnes, wantedTonnes, LARGEST_MORTALITY);
        }
        if (!(removals(biomassTonnes, LARGEST_MORTALITY * (1 - PROBE)) > most)) {
            return LARGEST_MORTALITY;
        }
        double best = bestMortality(biomassTonnes);
        return removals(biomassTonnes, best) >= wantedTonnes
                ? solve(biomassTonnes, wantedTonnes, best)
                : LARGEST_MORTALITY;
    }

    /** The F up to {@code high} with the wanted catch, by secants kept inside a shrinking bracket. */
    private double solve(double biomass, double wanted, double high) {
        double low = 0;
        double top = high;
        double before = 0;
        double beforeExcess = -wanted;
        double mortality = Math.min(wanted / biomass, high);
        for (int step = 0; step < MOST_STEPS; step++) {
            double excess = removals(biomass, mortality) - wanted;
            if (Math.abs(excess) <= CATCH_ACCURACY * wanted || top - low <= Math.ulp(top)) {
                break;
            }
            if (excess < 0) {
                low = mortality;
            } else {
                top = mortality;
            }
            double next = mortality - excess * (mortality - before) / (excess - beforeExcess);
            before = mortality;
            beforeExcess = excess;
            mortality = next > low && next < top ? next : low + (top - low) / 2;
        }
        return mortality;
    }

    /** The F of the largest catch, by golden sections; the catch has one maximum. */
    private double bestMortality(double biomass) {
        double low = 0;
        double high = LARGEST_MORTALITY;
        while (high - low > 1e-9) {
            double left = high - INVERSE_GOLDEN * (high - low);
            double right = low + INVERSE_GOLDEN * (high - low);
            if (removals(biomass, left) < removals(biomass, right)) {
                low = left;
            } else {
                high = right;
            }
        }
        return low + (high - low) / 2;
    }
}
