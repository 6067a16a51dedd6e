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

/** What the office knows of a stock: form, stored columns and import cells in one. Units stand in the names. */
@Embeddable
class StockDetails {
    @NotBlank(message = "{form.needed}")
    @Size(max = 3, message = "{form.long}")
    public String species = "";

    /** Stands in addresses after the species. */
    @Size(max = 40, message = "{form.long}")
    @Pattern(regexp = "[a-z0-9-]*", message = "{form.slug}")
    public @Nullable String population = "";

    @Size(max = 120, message = "{form.long}")
    public @Nullable String localName;

    @NotNull(message = "{form.needed}")
    @Pattern(regexp = "natural|mixed|stocked only", message = "{form.choice}")
    public String recruitment = "natural";

    @Pattern(regexp = "very slow|slow|moderate|fast", message = "{form.choice}")
    public @Nullable String productivity;

    @DecimalMin(value = "0.1", message = "{form.least}")
    @DecimalMax(value = "300", message = "{form.most}")
    public @Nullable Double maxAgeYears;

    @Column(name = "growth_k_per_year")
    @DecimalMin(value = "0.001", message = "{form.least}")
    @DecimalMax(value = "10", message = "{form.most}")
    public @Nullable Double growthKPerYear;

    @DecimalMin(value = "1", message = "{form.least}")
    @DecimalMax(value = "600", message = "{form.most}")
    public @Nullable Double growthLinfCm;

    @DecimalMin(value = "0.0001", message = "{form.least}")
    @DecimalMax(value = "1000", message = "{form.most}")
    public @Nullable Double meanWeightKg;

    @DecimalMin(value = "0.0001", message = "{form.least}")
    @DecimalMax(value = "1", message = "{form.most}")
    public @Nullable Double shareOfLakeYield;

    @DecimalMin(value = "0", message = "{form.least}")
    @DecimalMax(value = "1000000", message = "{form.most}")
    public @Nullable Double pricePerKg;

    @DecimalMin(value = "0", message = "{form.least}")
    @DecimalMax(value = "1000000000", message = "{form.most}")
    public @Nullable Double effortCost;

    @Size(max = 2000, message = "{form.long}")
    public @Nullable String note;

    static StockDetails of(TableRow row) {
        StockDetails details = new StockDetails();
        details.species = row.need("species");
        details.population = row.textOrEmpty("population");
        details.localName = row.text("local_name");
        details.recruitment = Objects.requireNonNullElse(row.text("recruitment"), "natural");
        details.productivity = row.text("productivity");
        details.maxAgeYears = row.number("max_age_years");
        details.growthKPerYear = row.number("growth_k_per_year");
        details.growthLinfCm = row.number("growth_linf_cm");
        details.meanWeightKg = row.number("mean_weight_kg");
        details.shareOfLakeYield = row.number("share_of_lake_yield");
        details.pricePerKg = row.number("price_per_kg");
        details.effortCost = row.number("effort_cost");
        details.note = row.text("note");
        return details;
    }

    /** By import column, in order. */
    Map<String, @Nullable Object> cells() {
        Map<String, @Nullable Object> cells = new LinkedHashMap<>();
        cells.put("species", species);
        cells.put("population", populationOrEmpty());
        cells.put("local_name", localName);
        cells.put("recruitment", recruitment);
        cells.put("productivity", productivity);
        cells.put("max_age_years", maxAgeYears);
        cells.put("growth_k_per_year", growthKPerYear);
        cells.put("growth_linf_cm", growthLinfCm);
        cells.put("mean_weight_kg", meanWeightKg);
        cells.put("share_of_lake_yield", shareOfLakeYield);
        cells.put("price_per_kg", pricePerKg);
        cells.put("effort_cost", effortCost);
        cells.put("note", note);
        return cells;
    }

    String populationOrEmpty() {
        return Objects.requireNonNullElse(population, "");
    }

    String key() {
        return populationOrEmpty().isEmpty() ? species : species + "." + population;
    }
}
