package org.merewarden.core.evidence;

import org.jspecify.annotations.Nullable;

/**
 * The lake as the priors see it.
 *
 * @param kind lake, reservoir, lagoon or river
 * @param areaHectares register's area, > 0
 * @param meanDepthMetres mean depth, > 0
 * @param dissolvedSolidsMgPerLitre total dissolved solids
 * @param conductivityMicrosiemensPerCm conductivity
 * @param meanAirTemperatureCelsius mean annual air temperature
 * @param stocksInLake number of registered stocks sharing the lake's yield, at least 1
 */
public record Habitat(
        String kind,
        double areaHectares,
        @Nullable Double meanDepthMetres,
        @Nullable Double dissolvedSolidsMgPerLitre,
        @Nullable Double conductivityMicrosiemensPerCm,
        @Nullable Double meanAirTemperatureCelsius,
        int stocksInLake) {
    public Habitat {
        Check.positive("area_ha", areaHectares);
        Check.that(stocksInLake >= 1, "stocks in lake >= 1", stocksInLake);
    }
}
