package org.merewarden.waterbody;

import org.jspecify.annotations.Nullable;

/** A water body as other features see it. Units: ha, m, mg/L, µS/cm, °C. */
public record WaterBodyView(
        long id,
        String code,
        String name,
        @Nullable String district,
        String kind,
        double areaHectares,
        @Nullable Double meanDepthMetres,
        @Nullable Double maxDepthMetres,
        @Nullable Double dissolvedSolidsMgPerLitre,
        @Nullable Double conductivityMicrosiemensPerCm,
        @Nullable Double meanAirTemperatureCelsius) {
    public String path() {
        return "/water-bodies/" + code;
    }
}
