package org.merewarden.core.inference;

import java.util.Arrays;
import java.util.Map;
import java.util.OptionalDouble;

/**
 * What every assessment yields, whatever its method: equally weighted draws of the parameters and of the states.
 *
 * <p>Seasons run from {@code firstYear} to {@code firstYear + T − 1}, the last closed one. Arrays are indexed by draw,
 * states by draw and season; biomass has one column more: the start of the season after the last.
 *
 * @param method name of the method, for the record
 * @param firstYear first season; with no season at all, the season after the last closed one
 * @param msyTonnes MSY by draw, t/yr, > 0
 * @param fmsyPerYear FMSY by draw, 1/yr, > 0
 * @param shape n by draw; 1 is Graham–Schaefer, 0 Fox
 * @param biomassTonnes [draw][T + 1], t at the season's start
 * @param fishingPerYear [draw][T], 1/yr
 * @param removalsTonnes [draw][T], t in the season; no columns where the method does not estimate removals
 * @param parameters what else was estimated, by draw: {@code process_sd, harvest_sd, observation_sd:SERIES,
 *     catchability:SERIES}
 * @param estimates named point estimates with units in the name, e.g. {@code msy_t}, {@code catchability:nets}
 * @param strength how much the evidence says
 * @param verdict settled or not, in words
 * @param diagnostics what to make of it
 */
public record Posterior(
        String method,
        int firstYear,
        double[] msyTonnes,
        double[] fmsyPerYear,
        double[] shape,
        double[][] biomassTonnes,
        double[][] fishingPerYear,
        double[][] removalsTonnes,
        Map<String, double[]> parameters,
        Map<String, Double> estimates,
        EvidenceStrength strength,
        Verdict verdict,
        Diagnostics diagnostics) {

    public Posterior {
        int draws = msyTonnes.length;
        boolean asMany = fmsyPerYear.length == draws
                && shape.length == draws
                && biomassTonnes.length == draws
                && fishingPerYear.length == draws
                && removalsTonnes.length == draws
                && parameters.values().stream().allMatch(values -> values.length == draws);
        if (!asMany) {
            throw new IllegalArgumentException("needs as many draws of every quantity, got " + draws + ", "
                    + fmsyPerYear.length + ", " + shape.length + ", " + biomassTonnes.length + ", "
                    + fishingPerYear.length + ", " + removalsTonnes.length);
        }
        parameters = Map.copyOf(parameters);
        estimates = Map.copyOf(estimates);
    }

    /** Of a method that estimates neither removals nor further parameters and makes no diagnostics. */
    public Posterior(
            String method,
            int firstYear,
            double[] msyTonnes,
            double[] fmsyPerYear,
            double[] shape,
            double[][] biomassTonnes,
            double[][] fishingPerYear,
            Map<String, Double> estimates,
            EvidenceStrength strength,
            Verdict verdict) {
        this(
                method,
                firstYear,
                msyTonnes,
                fmsyPerYear,
                shape,
                biomassTonnes,
                fishingPerYear,
                new double[msyTonnes.length][0],
                Map.of(),
                estimates,
                strength,
                verdict,
                Diagnostics.NONE);
    }

    public int draws() {
        return msyTonnes.length;
    }

    /** Number of assessed seasons T; 0 without draws. */
    public int seasons() {
        return draws() == 0 ? 0 : fishingPerYear[0].length;
    }

    /** The last assessed (closed) season. */
    public int lastYear() {
        return firstYear + seasons() - 1;
    }

    /** Median of the removals of the last assessed season, t; empty where the method estimates none. */
    public OptionalDouble lastRemovals() {
        int estimated = draws() == 0 ? 0 : removalsTonnes[0].length;
        return estimated == 0
                ? OptionalDouble.empty()
                : OptionalDouble.of(Quantiles.of(
                        Arrays.stream(removalsTonnes)
                                .mapToDouble(bySeason -> bySeason[estimated - 1])
                                .toArray(),
                        0.5));
    }

    /** Biomass at the start of the season after the last, of one draw, t. */
    public double presentBiomass(int draw) {
        return biomassTonnes[draw][biomassTonnes[draw].length - 1];
    }

    /** Biomass that yields MSY, of one draw, t. */
    public double bmsy(int draw) {
        return msyTonnes[draw] / fmsyPerYear[draw];
    }

    /** K = BMSY (1 + n)^(1/n), of one draw, t; e · BMSY for n = 0. */
    public double capacity(int draw) {
        double n = shape[draw];
        return bmsy(draw) * (n == 0 ? Math.E : Math.exp(Math.log1p(n) / n));
    }
}
