package org.merewarden.waterbody;

import java.time.LocalDate;
import java.util.List;
import java.util.Optional;

/** The register as other features read it. Every call is one statement; lists are ordered by lake name, then species. */
public interface Register {
    List<WaterBodyView> waterBodies();

    Optional<WaterBodyView> waterBody(String code);

    List<StockView> stocks();

    Optional<StockView> stock(long id);

    /** @param speciesKey species code, or code.population */
    Optional<StockView> stock(String lake, String speciesKey);

    List<CooperativeView> cooperatives();

    Optional<CooperativeView> cooperative(String code);

    /** All rights, by stock, then cooperative. */
    List<RightView> rights();

    List<RightView> rightsOfStock(long stockId);

    List<RightView> rightsOfCooperative(long cooperativeId);

    /** Factor from landed to live weight on that date; 1 for {@code whole}, empty where none is recorded. */
    Optional<Double> conversionFactor(String species, String presentation, LocalDate date);

    /** Presentations that have a factor for any species, with {@code whole} first. */
    List<String> presentations();

    /** All known species, by English name; from a file, no statement. */
    List<Species> species();

    Optional<Species> species(String code);
}
