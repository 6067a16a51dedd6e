package org.merewarden.core.inference;

import java.util.Map;

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
 * @param estimates named point estimates with units in the name, e.g. {@code msy_t}, {@code catchability:nets}
 * @param strength how much the evidence says
 * @param verdict settled or not, in words
 */
public record Posterior(
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

    public Posterior {
        int draws = msyTonnes.length;
        if (fmsyPerYear.length != draws
                || shape.length != draws
                || biomassTonnes.length != draws
                || fishingPerYear.length != draws) {
            throw new IllegalArgumentException("needs as many draws of every quantity, got " + draws + ", "
                    + fmsyPerYear.length + ", " + shape.length + ", " + biomassTonnes.length + ", "
                    + fishingPerYear.length);
        }
        estimates = Map.copyOf(estimates);
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
