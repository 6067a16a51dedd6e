package org.merewarden.core.outlook;

import org.merewarden.core.dynamics.FishedYear;

/** How a stock is fished, season after season. */
@FunctionalInterface
public interface Course {

    /** Nothing is taken. */
    Course CLOSURE = (draw, biomass, year) -> 0;

    /**
     * The fishing mortality of a season.
     *
     * @param draw which of the assessment's draws
     * @param biomassTonnes at the season's start, t
     * @param year the draw's law of a year
     * @return F in 1/yr, 0–3
     */
    double mortality(int draw, double biomassTonnes, FishedYear year);

    /** The same removals every season, t, as far as they are there. */
    static Course ofCatch(double tonnes) {
        return (draw, biomass, year) -> year.mortality(biomass, tonnes);
    }

    /** The same F every season, by draw, 1/yr; cut at the largest of a season. */
    static Course ofMortality(double... byDraw) {
        return (draw, biomass, year) -> Math.min(byDraw[draw], FishedYear.LARGEST_MORTALITY);
    }
}
