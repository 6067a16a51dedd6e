package org.merewarden.core.inference.statespace;

/** What the model expects of the values of one season, on the scale of {@link Observations}. */
final class Expected {
    private final StateDensity density;
    private final KnownCatch taken;
    private double plus;
    private double harvest;
    private int season;

    /** For the density's present parameters, whatever they are at each call. */
    Expected(StateDensity density) {
        this.density = density;
        taken = new KnownCatch(density.step);
    }

    /** Season t from x = ln(B/K_t) at its start and the walk's l = ln F. */
    void season(int t, double x, double l) {
        season = t;
        plus = density.afterEvents(t, x);
        harvest = density.beginSeason(t, x, l);
    }

    /** The same with the F that yields the recorded catch where there is one. */
    void seasonOfKnownCatch(int t, double x, double l) {
        season(t, x, l);
        double logCatch = density.data.removals().logCatch()[t];
        if (!density.data.removals().closed()[t] && !Double.isNaN(logCatch)) {
            harvest = taken.solve(plus, logCatch - density.logCapacity(t));
        }
    }

    /** Expected logarithm of value i, which is of that season; {@code logQ} of its series, 0 for a biomass. */
    double log(int i, double logQ) {
        Observations o = density.data.observations();
        if (o.kind()[i] == Observations.EFFORT) {
            return harvest - logQ;
        }
        double state = plus;
        if (o.time()[i] > 0) {
            density.step.biomassAt(o.time()[i]);
            state = density.step.y;
        }
        return logQ + state + density.logCapacity(season);
    }

    /** Whether value i can be compared: not below detection, and no effort of a closed season. */
    static boolean comparable(SeasonData data, int i, int season) {
        int kind = data.observations().kind()[i];
        return kind != Observations.BELOW_DETECTION
                && !(kind == Observations.EFFORT && data.removals().closed()[season]);
    }
}
