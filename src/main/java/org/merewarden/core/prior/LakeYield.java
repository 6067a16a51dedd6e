package org.merewarden.core.prior;

import java.util.ArrayList;
import java.util.List;
import java.util.OptionalDouble;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Habitat;

/**
 * Yearly fish yield of a whole lake, all species together, from the lake itself.
 *
 * <pre>
 *   Ryder                 Y = 1.2376 √(D/z)                 (2 √(D/z) lb/acre with ppm and ft, converted exactly)
 *   Ryder, metric form    Y = 0.966 √(D/z)                  (often quoted; 22 % lower)
 *   Henderson &amp; Welcomme  Y = 14.3136 (κ/z)^0.4681
 *   Schlesinger &amp; Regier  log10 Y = 0.050 T + 0.280 log10(D/z) + 0.236
 *   Crul                  C = 8.93 A^0.92 (lakes), 7.09 A^0.94 (reservoirs)
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>Y, C</td><td>yield in kg/ha/yr; catch of the lake in t/yr</td></tr>
 * <tr><td>D, κ</td><td>total dissolved solids, mg/L; conductivity, µS/cm</td></tr>
 * <tr><td>z, T, A</td><td>mean depth, m; mean annual air temperature, °C; area, <b>km²</b></td></tr>
 * </table>
 *
 * <p>Sources: Ryder 1965, Trans. Am. Fish. Soc. 94: 214–218 (formula recalled, range 0.39–68.2 (mg/L)/m published; metric
 * form Ryder et al. 1974, recalled); Henderson &amp; Welcomme 1974, CIFA Occas. Pap. 1 (coefficients published, unit
 * recalled); Schlesinger &amp; Regier 1982, Trans. Am. Fish. Soc. 111: 141–150 (recalled; n 43, R² 0.81); Crul 1992, CIFA
 * Occas. Pap. 16 (recalled; r² 0.93–0.94).
 *
 * <p>Accuracy: none of these sources states a prediction error that we hold; every log-sd here is <b>our judgement</b>
 * (a factor of 2 to 2.5 either way). Fish production is not correlated with the morphoedaphic index in Downing et al.
 * 1990, Can. J. Fish. Aquat. Sci. 47: 1929–1936, so these are wide priors, never assessments.
 *
 * <p>Choice for a lake: below {@value #WARM} °C, or with no temperature known, Ryder (north-temperate lakes); from there
 * on Henderson &amp; Welcomme and Crul (African lakes); Schlesinger &amp; Regier wherever a temperature is known. Without
 * dissolved solids they are taken as 0.65 κ (common practice). Outside a range the log-sd grows by half. Rivers get none.
 */
public final class LakeYield {
    static final double WARM = 18;
    private static final double SOLIDS_PER_CONDUCTIVITY = 0.65;
    private static final double RYDER_LOG_SD = 0.8;
    private static final double HENDERSON_WELCOMME_LOG_SD = 0.7;
    private static final double SCHLESINGER_REGIER_LOG_SD = 0.7;
    private static final double CRUL_LOG_SD = 0.9;
    private static final double OUTSIDE = 1.5;
    private static final double HECTARES_PER_KM2 = 100;

    private LakeYield() {}

    /** Ryder 1965 by exact units, kg/ha/yr; the default. */
    public static double ryder(double dissolvedSolidsMgPerLitre, double meanDepthMetres) {
        return 1.2376 * Math.sqrt(dissolvedSolidsMgPerLitre / meanDepthMetres);
    }

    /** The metric form often quoted, kg/ha/yr. */
    public static double ryderMetric(double dissolvedSolidsMgPerLitre, double meanDepthMetres) {
        return 0.966 * Math.sqrt(dissolvedSolidsMgPerLitre / meanDepthMetres);
    }

    /** Henderson &amp; Welcomme 1974, kg/ha/yr. */
    public static double hendersonWelcomme(double conductivityMicrosiemensPerCm, double meanDepthMetres) {
        return 14.3136 * Math.pow(conductivityMicrosiemensPerCm / meanDepthMetres, 0.4681);
    }

    /** Schlesinger &amp; Regier 1982, kg/ha/yr. */
    public static double schlesingerRegier(
            double airTemperatureCelsius, double dissolvedSolidsMgPerLitre, double meanDepthMetres) {
        double logIndex = Math.log10(dissolvedSolidsMgPerLitre / meanDepthMetres);
        return Math.pow(10, 0.050 * airTemperatureCelsius + 0.280 * logIndex + 0.236);
    }

    /** Crul 1992 for lakes, t/yr. */
    public static double crulLakes(double areaSquareKilometres) {
        return 8.93 * Math.pow(areaSquareKilometres, 0.92);
    }

    /** Crul 1992 for reservoirs, t/yr. */
    public static double crulReservoirs(double areaSquareKilometres) {
        return 7.09 * Math.pow(areaSquareKilometres, 0.94);
    }

    /** The applicable predictions of the lake's whole yield, t/yr; none for rivers or without depth and solids. */
    public static List<Estimate> predictTonnes(Habitat habitat) {
        if (habitat.kind().equals("river")) {
            return List.of();
        }
        List<Estimate> predictions = new ArrayList<>();
        OptionalDouble temperature = known(habitat.meanAirTemperatureCelsius());
        OptionalDouble depth = positive(habitat.meanDepthMetres());
        OptionalDouble conductivity = positive(habitat.conductivityMicrosiemensPerCm());
        OptionalDouble solids = positive(habitat.dissolvedSolidsMgPerLitre());
        if (solids.isEmpty() && conductivity.isPresent()) {
            solids = OptionalDouble.of(SOLIDS_PER_CONDUCTIVITY * conductivity.getAsDouble());
        }
        boolean warm = temperature.isPresent() && temperature.getAsDouble() >= WARM;
        double area = habitat.areaHectares();
        if (depth.isPresent() && solids.isPresent()) {
            if (!warm) {
                predictions.add(ryderTonnes(solids.getAsDouble(), depth.getAsDouble(), area));
            }
            if (temperature.isPresent()) {
                predictions.add(schlesingerRegierTonnes(
                        temperature.getAsDouble(), solids.getAsDouble(), depth.getAsDouble(), area));
            }
        }
        if (warm && depth.isPresent() && conductivity.isPresent()) {
            predictions.add(new Estimate(
                    hendersonWelcomme(conductivity.getAsDouble(), depth.getAsDouble()) * area / 1000,
                    HENDERSON_WELCOMME_LOG_SD,
                    "Henderson & Welcomme 1974",
                    "African lakes"));
        }
        if (warm) {
            predictions.add(crulTonnes(habitat));
        }
        return predictions.stream().filter(Estimate::usable).toList();
    }

    private static Estimate ryderTonnes(double solids, double depth, double areaHectares) {
        double index = solids / depth;
        boolean inside = index >= 0.39 && index <= 68.2;
        return new Estimate(
                ryder(solids, depth) * areaHectares / 1000,
                RYDER_LOG_SD * (inside ? 1 : OUTSIDE),
                "Ryder 1965, exact units",
                "north-temperate lakes, moderately to heavily fished, index 0.39–68.2 (mg/L)/m"
                        + (inside ? "" : ": this lake is outside"));
    }

    private static Estimate schlesingerRegierTonnes(
            double temperature, double solids, double depth, double areaHectares) {
        return new Estimate(
                schlesingerRegier(temperature, solids, depth) * areaHectares / 1000,
                SCHLESINGER_REGIER_LOG_SD,
                "Schlesinger & Regier 1982",
                "43 lakes from cold to tropical");
    }

    private static Estimate crulTonnes(Habitat habitat) {
        double area = habitat.areaHectares() / HECTARES_PER_KM2;
        boolean reservoir = habitat.kind().equals("reservoir");
        return new Estimate(
                reservoir ? crulReservoirs(area) : crulLakes(area),
                CRUL_LOG_SD,
                "Crul 1992",
                reservoir ? "African reservoirs" : "African lakes");
    }

    private static OptionalDouble known(@Nullable Double value) {
        return value != null && Double.isFinite(value) ? OptionalDouble.of(value) : OptionalDouble.empty();
    }

    private static OptionalDouble positive(@Nullable Double value) {
        return value != null && value > 0 ? known(value) : OptionalDouble.empty();
    }
}
