package org.merewarden.waterbody;

import org.jspecify.annotations.Nullable;

/**
 * A stock as other features see it.
 *
 * @param lake the water body's code
 * @param species FAO three-letter code
 * @param population empty unless a water holds two stocks of one species
 * @param speciesName the office's local name, else the English name of the species
 */
public record StockView(
        long id,
        long waterBodyId,
        String lake,
        String lakeName,
        @Nullable String district,
        double areaHectares,
        String species,
        String population,
        String speciesName,
        String recruitment,
        @Nullable String productivity,
        @Nullable Double maxAgeYears,
        @Nullable Double growthKPerYear,
        @Nullable Double growthLinfCm,
        @Nullable Double shareOfLakeYield) {

    /** The species' part of the address: the code, followed by a dot and the population where there is one. */
    public String speciesKey() {
        return population.isEmpty() ? species : species + "." + population;
    }

    /** The stock's name in addresses that choose stocks: lake:species. */
    public String key() {
        return lake + ":" + speciesKey();
    }

    public String path() {
        return "/stocks/" + lake + "/" + speciesKey();
    }

    /** For people: "Pike in Skelder Water". */
    public String title() {
        String which = population.isEmpty() ? speciesName : speciesName + " (" + population + ")";
        return which.substring(0, 1).toUpperCase(java.util.Locale.ROOT) + which.substring(1) + " in " + lakeName;
    }
}
