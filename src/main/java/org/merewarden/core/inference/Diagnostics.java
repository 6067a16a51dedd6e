package org.merewarden.core.inference;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.prior.Prior;

/**
 * What to make of a posterior: what the data taught, how well they are met, and how steady the result is.
 *
 * <p>A number that cannot be had (too few values, no catch to go by) is null, never NaN.
 *
 * @param learned each parameter before and after the data; fixed ones included
 * @param series each index and effort series and each kind of absolute biomass
 * @param residuals standardised one by one, in order of series, season and time
 * @param retrospective the same estimate with the last seasons taken away; null without at least two peels (too few seasons)
 * @param helps what further evidence would narrow the result, most helpful first
 */
public record Diagnostics(
        List<Learned> learned,
        List<SeriesCheck> series,
        List<Residual> residuals,
        @Nullable Retrospective retrospective,
        List<Help> helps) {

    public static final Diagnostics NONE = new Diagnostics(List.of(), List.of(), List.of(), null, List.of());

    public Diagnostics {
        learned = List.copyOf(learned);
        series = List.copyOf(series);
        residuals = List.copyOf(residuals);
        helps = List.copyOf(helps);
    }

    /**
     * A parameter before and after the data.
     *
     * @param prior with its source, range and reason
     * @param series the series it belongs to; empty for all
     * @param low 10 % quantile of the posterior, in the parameter's unit
     * @param median of the posterior
     * @param high 90 % quantile of the posterior
     * @param overlap area common to both densities of the logarithm, 0–1: 1, the data taught nothing; null where fixed
     */
    public record Learned(
            Prior prior,
            String series,
            double low,
            double median,
            double high,
            @Nullable Double overlap) {}

    /** What a series measures. */
    public enum Kind {
        INDEX,
        BIOMASS,
        EFFORT
    }

    /**
     * How one series is met by the model.
     *
     * @param series its name
     * @param kind what it measures
     * @param values how many entered
     * @param contrast largest over smallest value above zero
     * @param meanResidual of the standardised residuals
     * @param residualSd their standard deviation; somewhat under 1 is expected, since states lean towards the values
     * @param runsProbability two-sided probability of so few or so many runs of sign if residuals were independent
     * @param lagOne their lag-1 correlation
     * @param scaledError one-year-ahead hindcast error over the usual error of "same as last time" (mean absolute scaled
     *     error); null with fewer than three predictions
     * @param hindcasts how many predictions that rests on
     * @param msyWithout MSY without the series, t/yr, at the most likely parameters; null where no other series remains
     * @param msyWith the same with it
     * @param relativeBiomassWithout present B/BMSY without the series, at the most likely parameters
     * @param relativeBiomassWith the same with it
     */
    public record SeriesCheck(
            String series,
            Kind kind,
            int values,
            @Nullable Double contrast,
            @Nullable Double meanResidual,
            @Nullable Double residualSd,
            @Nullable Double runsProbability,
            @Nullable Double lagOne,
            @Nullable Double scaledError,
            int hindcasts,
            @Nullable Double msyWithout,
            @Nullable Double msyWith,
            @Nullable Double relativeBiomassWithout,
            @Nullable Double relativeBiomassWith) {}

    /**
     * One observation against the model.
     *
     * @param series its name
     * @param year season
     * @param timeOfYear 0–1
     * @param standardised (ln observed − ln expected)/sd, mean over draws
     */
    public record Residual(String series, int year, double timeOfYear, double standardised) {}

    /**
     * Retrospective peels: the assessment as it would have been made some seasons ago, at the most likely parameters.
     *
     * @param peels the full data first, then one season less each, counted from the last season with a record
     * @param rhoBiomass Mohn's ρ of biomass at the start of each peel's last season: mean of (peel − full)/full
     * @param rhoRelativeBiomass the same of B/BMSY
     * @param rhoFishing the same of F in each peel's last season
     */
    public record Retrospective(List<Peel> peels, double rhoBiomass, double rhoRelativeBiomass, double rhoFishing) {
        public Retrospective {
            peels = List.copyOf(peels);
        }
    }

    /**
     * The most likely course of the stock by the records up to one season.
     *
     * @param lastYear last season whose records count
     * @param msyTonnes MSY, t/yr
     * @param biomassTonnes from the assessment's first season to lastYear, at the season's start, t
     * @param relativeBiomass B/BMSY in the same seasons
     * @param fishingPerYear F in the same seasons, 1/yr
     */
    public record Peel(
            int lastYear,
            double msyTonnes,
            List<Double> biomassTonnes,
            List<Double> relativeBiomass,
            List<Double> fishingPerYear) {}

    /** Evidence that could be gathered next. */
    public enum Gathering {
        /** An estimate of absolute biomass at the start of the coming season, e.g. mark–recapture, cv 0.3. */
        BIOMASS_ESTIMATE,
        /** One more value of an existing index. */
        INDEX_VALUE,
        /** Removals of the last season counted without error. */
        CATCH_COUNT,
        /** Age or growth of the species, from which natural mortality and FMSY follow. */
        LIFE_HISTORY
    }

    /**
     * What one more piece of evidence would be expected to do.
     *
     * @param gathering what
     * @param series of an index value; else empty
     * @param narrowing expected fall of the standard deviation of the logarithm of next season's catch at FMSY, 0–1
     */
    public record Help(Gathering gathering, String series, double narrowing) {}
}
