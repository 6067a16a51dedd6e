package org.merewarden.core.dynamics;

/**
 * A {@link FishedYear} of surplus production in closed form, B from {@link ConstantMortality}.
 *
 * <p>Accuracy: the catch of the F found is within 1e-12 relative of the wanted one for n = 1, and within the 1e-10 of
 * {@link ConstantMortality} else.
 */
public final class AnnualMap extends FishedYear {
    private final SurplusProduction growth;

    public AnnualMap(SurplusProduction growth) {
        this.growth = growth;
    }

    /**
     * A season taken.
     *
     * @param biomassAfterTonnes biomass at the start of the next season, t
     * @param mortality F in 1/yr, 0–3
     * @param catchTonnes removals of the season, t
     */
    public record Season(double biomassAfterTonnes, double mortality, double catchTonnes) {}

    /** The season from the given biomass (t, ≥ 0) with the given wanted catch (t, ≥ 0). */
    public Season take(double biomassTonnes, double wantedTonnes) {
        double mortality = mortality(biomassTonnes, wantedTonnes);
        return new Season(after(biomassTonnes, mortality), mortality, removals(biomassTonnes, mortality));
    }

    @Override
    public double after(double biomassTonnes, double mortality) {
        return ConstantMortality.after(growth, mortality, biomassTonnes, 1);
    }

    @Override
    public double removals(double biomassTonnes, double mortality) {
        return ConstantMortality.removals(growth, mortality, biomassTonnes, 1);
    }
}
