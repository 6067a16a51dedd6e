package org.merewarden.waterbody;

import jakarta.persistence.Column;
import jakarta.persistence.Embeddable;
import jakarta.validation.constraints.DecimalMax;
import jakarta.validation.constraints.DecimalMin;
import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Pattern;
import jakarta.validation.constraints.Size;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.TableRow;

/** What the office knows of a water body: form, stored columns and import cells in one. Units stand in the names. */
@Embeddable
class WaterBodyDetails {
    @NotBlank(message = "{form.needed}")
    @Size(max = 60, message = "{form.long}")
    @Pattern(regexp = Slug.PATTERN, message = "{form.slug}")
    public String code = "";

    @NotBlank(message = "{form.needed}")
    @Size(max = 120, message = "{form.long}")
    public String name = "";

    @Size(max = 120, message = "{form.long}")
    public @Nullable String district;

    @Pattern(regexp = "lake|reservoir|lagoon|river", message = "{form.choice}")
    @NotNull(message = "{form.needed}")
    public String kind = "lake";

    @Column(name = "area_ha")
    @NotNull(message = "{form.needed}")
    @DecimalMin(value = "0.001", message = "{form.least}")
    @DecimalMax(value = "100000000", message = "{form.most}")
    public @Nullable Double areaHectares;

    @Column(name = "mean_depth_m")
    @DecimalMin(value = "0.01", message = "{form.least}")
    @DecimalMax(value = "2000", message = "{form.most}")
    public @Nullable Double meanDepthMetres;

    @Column(name = "max_depth_m")
    @DecimalMin(value = "0.01", message = "{form.least}")
    @DecimalMax(value = "2000", message = "{form.most}")
    public @Nullable Double maxDepthMetres;

    @Column(name = "elevation_m")
    @DecimalMin(value = "-500", message = "{form.least}")
    @DecimalMax(value = "6000", message = "{form.most}")
    public @Nullable Double elevationMetres;

    @DecimalMin(value = "-90", message = "{form.least}")
    @DecimalMax(value = "90", message = "{form.most}")
    public @Nullable Double latitude;

    @DecimalMin(value = "-180", message = "{form.least}")
    @DecimalMax(value = "180", message = "{form.most}")
    public @Nullable Double longitude;

    @Column(name = "dissolved_solids_mg_l")
    @DecimalMin(value = "0.1", message = "{form.least}")
    @DecimalMax(value = "100000", message = "{form.most}")
    public @Nullable Double dissolvedSolidsMgPerLitre;

    @Column(name = "conductivity_us_cm")
    @DecimalMin(value = "0.1", message = "{form.least}")
    @DecimalMax(value = "200000", message = "{form.most}")
    public @Nullable Double conductivityMicrosiemensPerCm;

    @Column(name = "mean_air_temperature_c")
    @DecimalMin(value = "-30", message = "{form.least}")
    @DecimalMax(value = "40", message = "{form.most}")
    public @Nullable Double meanAirTemperatureCelsius;

    @Size(max = 2000, message = "{form.long}")
    public @Nullable String note;

    static WaterBodyDetails of(TableRow row) {
        WaterBodyDetails details = new WaterBodyDetails();
        details.code = row.need("code");
        details.name = row.need("name");
        details.district = row.text("district");
        details.kind = Objects.requireNonNullElse(row.text("kind"), "lake");
        details.areaHectares = row.number("area_ha");
        details.meanDepthMetres = row.number("mean_depth_m");
        details.maxDepthMetres = row.number("max_depth_m");
        details.elevationMetres = row.number("elevation_m");
        details.latitude = row.number("latitude");
        details.longitude = row.number("longitude");
        details.dissolvedSolidsMgPerLitre = row.number("dissolved_solids_mg_l");
        details.conductivityMicrosiemensPerCm = row.number("conductivity_us_cm");
        details.meanAirTemperatureCelsius = row.number("mean_air_temperature_c");
        details.note = row.text("note");
        return details;
    }

    /** By import column, in order. */
    Map<String, @Nullable Object> cells() {
        Map<String, @Nullable Object> cells = new LinkedHashMap<>();
        cells.put("code", code);
        cells.put("name", name);
        cells.put("district", district);
        cells.put("kind", kind);
        cells.put("area_ha", areaHectares);
        cells.put("mean_depth_m", meanDepthMetres);
        cells.put("max_depth_m", maxDepthMetres);
        cells.put("elevation_m", elevationMetres);
        cells.put("latitude", latitude);
        cells.put("longitude", longitude);
        cells.put("dissolved_solids_mg_l", dissolvedSolidsMgPerLitre);
        cells.put("conductivity_us_cm", conductivityMicrosiemensPerCm);
        cells.put("mean_air_temperature_c", meanAirTemperatureCelsius);
        cells.put("note", note);
        return cells;
    }

    boolean depthsDisagree() {
        return meanDepthMetres != null && maxDepthMetres != null && meanDepthMetres > maxDepthMetres;
    }
}
