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
 * @param shareOfRecordedCatch this stock's mean recorded removals a season over the sum of all stocks' means, 0–1; null
 *     unless every stock of the lake has a catch on record
 */
public record Habitat(
        String kind,
        double areaHectares,
        @Nullable Double meanDepthMetres,
        @Nullable Double dissolvedSolidsMgPerLitre,
        @Nullable Double conductivityMicrosiemensPerCm,
        @Nullable Double meanAirTemperatureCelsius,
        int stocksInLake,
        @Nullable Double shareOfRecordedCatch) {
    public Habitat {
        Check.positive("area_ha", areaHectares);
        Check.that(stocksInLake >= 1, "stocks in lake >= 1", stocksInLake);
        if (shareOfRecordedCatch != null) {
            Check.that(
                    shareOfRecordedCatch >= 0 && shareOfRecordedCatch <= 1,
                    "0 <= share of recorded catch <= 1",
                    shareOfRecordedCatch);
        }
    }

    /** Where the stocks' shares of the recorded catch are not known. */
    public Habitat(
            String kind,
            double areaHectares,
            @Nullable Double meanDepthMetres,
            @Nullable Double dissolvedSolidsMgPerLitre,
            @Nullable Double conductivityMicrosiemensPerCm,
            @Nullable Double meanAirTemperatureCelsius,
            int stocksInLake) {
        this(
                kind,
                areaHectares,
                meanDepthMetres,
                dissolvedSolidsMgPerLitre,
                conductivityMicrosiemensPerCm,
                meanAirTemperatureCelsius,
                stocksInLake,
                null);
    }
}
