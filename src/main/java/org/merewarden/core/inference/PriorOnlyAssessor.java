package org.merewarden.core.inference;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.SplittableRandom;
import java.util.random.RandomGenerator;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.prior.Prior;
import org.merewarden.core.prior.Priors;

/**
 * Draws from the priors, kept when they can have borne the recorded removals: for stocks without a usable index.
 *
 * <pre>
 *   ln MSY, ln FMSY, ln β ~ N from {@link Priors};   n = 1, r = 2 FMSY, K = 2 MSY/FMSY, B(first) = β K
 *   kept when B(t+1) from {@link AnnualStep} is at least K/100 in every season,
 *   and, for each estimate of absolute biomass, with probability exp(−½ z²), z = ln(B_obs/B(τ))/cv
 * </pre>
 *
 * <p>Plain rejection: the kept draws are the prior given that the stock outlived its removals (as in Kimura &amp; Tagart
 * 1982, Can. J. Fish. Aquat. Sci. 39: 1467–1472) and given the biomass estimates. Without catches there are no seasons:
 * the draws are of β K at the start of the coming one, and the latest biomass estimate counts with cv² + 0.04 per season
 * of its age. FMSY is held at 1 per year, above which annual steps overshoot, and β at 1.5. Up to {@value #TRIES} tries
 * for {@value #DRAWS} draws; fewer than {@value #LEAST_KEPT} kept does not settle. Strength THIN with catches or a biomass
 * estimate, NONE without.
 */
public final class PriorOnlyAssessor implements Assessor {
    static final int DRAWS = 1000;
    static final int TRIES = 200_000;
    static final int LEAST_KEPT = 200;
    private static final double COLLAPSED = 0.01;
    private static final double LARGEST_START = 1.5;
    private static final double DEFAULT_CV = 0.3;
    private static final double VARIANCE_PER_SEASON = 0.04;

    @Override
    public Posterior assess(Evidence evidence, int lastClosedYear, long seed) {
        return assess(evidence, SeasonSeries.of(evidence, lastClosedYear), seed, List.of());
    }

    /** {@code opening}: sentences on why nothing better was possible. */
    Posterior assess(Evidence evidence, SeasonSeries seasons, long seed, List<String> opening) {
        Run run = new Run(seasons, biomassEstimates(evidence, seasons));
        Priors priors = Priors.forStock(evidence);
        if (seasons.failure() == null) {
            run.draw(priors, new SplittableRandom(seed));
        }
        return run.posterior(priors, opening);
    }

    /** An estimate of absolute biomass at a season (0 without seasons), with its log-sd. */
    private record Biomass(int season, double timeOfYear, double tonnes, double logSd) {}

    private static List<Biomass> biomassEstimates(Evidence evidence, SeasonSeries seasons) {
        List<Biomass> estimates = new ArrayList<>();
        int last = seasons.lastYear();
        for (SurveyRecord survey : evidence.surveys()) {
            if (!survey.absoluteBiomass() || survey.value() == 0 || survey.year() > last) {
                continue;
            }
            double cv = survey.cv() != null && survey.cv() > 0 ? survey.cv() : DEFAULT_CV;
            double logSd = Math.sqrt(Math.log1p(cv * cv));
            int t = survey.year() - seasons.firstYear();
            if (seasons.seasons() == 0) {
                double age = (double) last + 1 - survey.year();
                double aged = Math.sqrt(logSd * logSd + VARIANCE_PER_SEASON * age);
                estimates.clear();
                estimates.add(new Biomass(0, 0, survey.value(), aged));
            } else if (t >= 0) {
                estimates.add(new Biomass(t, survey.timeOfYear(), survey.value(), logSd));
            }
        }
        return estimates;
    }

    /** One run's draws and tally. */
    private static final class Run {
        private final SeasonSeries seasons;
        private final List<Biomass> estimates;
        private final double[] msy = new double[DRAWS];
        private final double[] fmsy = new double[DRAWS];
        private final double[][] biomass = new double[DRAWS][];
        private final double[][] fishing = new double[DRAWS][];
        private final double[] path;
        private final double[] afterEvents;
        private int kept;
        private int tries;
        private int held;

        Run(SeasonSeries seasons, List<Biomass> estimates) {
            this.seasons = seasons;
            this.estimates = estimates;
            path = new double[seasons.seasons() + 1];
            afterEvents = new double[seasons.seasons()];
        }

        void draw(Priors priors, RandomGenerator random) {
            while (kept < DRAWS && tries < TRIES) {
                tries++;
                double thisMsy = draw(priors.msy(), random);
                double drawnFmsy = draw(priors.fmsy(), random);
                double thisFmsy = Math.min(0.5 * AnnualStep.LARGEST_R, drawnFmsy);
                double start = Math.min(LARGEST_START, draw(priors.initialFraction(), random));
                double capacity = 2 * thisMsy / thisFmsy;
                boolean possible = thisMsy > 0 && thisFmsy > 0 && start > 0 && capacity < 1e15;
                if (possible && survives(2 * thisFmsy, capacity, start) && random.nextDouble() < agreement()) {
                    held += thisFmsy < drawnFmsy ? 1 : 0;
                    keep(thisMsy, thisFmsy);
                }
            }
        }

        private static double draw(Prior prior, RandomGenerator random) {
            return prior.median() * Math.exp(prior.logSd() * random.nextGaussian());
        }

        private boolean survives(double r, double capacity, double start) {
            path[0] = start * capacity;
            for (int t = 0; t < afterEvents.length; t++) {
                afterEvents[t] = AnnualStep.afterEvents(path[t], seasons.stocked()[t], seasons.killed()[t]);
                path[t + 1] = AnnualStep.next(afterEvents[t], seasons.removals()[t], r, capacity, 1);
                if (!(path[t + 1] >= COLLAPSED * capacity)) {
                    return false;
                }
            }
            return true;
        }

        private double agreement() {
            double sum = 0;
            for (Biomass estimate : estimates) {
                double expected = Math.log(path[0]);
                if (afterEvents.length > 0) {
                    int t = estimate.season();
                    double tau = estimate.timeOfYear();
                    expected = (1 - tau) * Math.log(afterEvents[t]) + tau * Math.log(path[t + 1]);
                }
                double z = (Math.log(estimate.tonnes()) - expected) / estimate.logSd();
                sum += z * z;
            }
            return Math.exp(-0.5 * sum);
        }

        private void keep(double thisMsy, double thisFmsy) {
            msy[kept] = thisMsy;
            fmsy[kept] = thisFmsy;
            biomass[kept] = path.clone();
            double[] f = new double[afterEvents.length];
            for (int t = 0; t < f.length; t++) {
                f[t] = AnnualStep.fishing(seasons.removals()[t], afterEvents[t], path[t + 1]);
            }
            fishing[kept++] = f;
        }

        Posterior posterior(Priors priors, List<String> opening) {
            double[] shape = new double[kept];
            Arrays.fill(shape, 1);
            double[] keptMsy = Arrays.copyOf(msy, kept);
            double[] keptFmsy = Arrays.copyOf(fmsy, kept);
            boolean evidence = seasons.seasons() > 0 || !estimates.isEmpty();
            return new Posterior(
                    "priors, kept where they bear the recorded removals",
                    seasons.firstYear(),
                    keptMsy,
                    keptFmsy,
                    shape,
                    Arrays.copyOf(biomass, kept),
                    Arrays.copyOf(fishing, kept),
                    estimates(keptMsy, keptFmsy),
                    evidence ? EvidenceStrength.THIN : EvidenceStrength.NONE,
                    verdict(priors, opening));
        }

        private static Map<String, Double> estimates(double[] msy, double[] fmsy) {
            if (msy.length == 0) {
                return Map.of();
            }
            double medianMsy = Quantiles.of(msy, 0.5);
            double medianFmsy = Quantiles.of(fmsy, 0.5);
            return Map.of(
                    "msy_t", medianMsy, "fmsy", medianFmsy, "r", 2 * medianFmsy, "k_t", 2 * medianMsy / medianFmsy);
        }

        private Verdict verdict(Priors priors, List<String> opening) {
            List<String> sentences = new ArrayList<>();
            String failure = seasons.failure();
            boolean settled = failure == null && kept >= LEAST_KEPT;
            if (failure != null) {
                sentences.add(failure);
            } else if (!settled) {
                sentences.add("Only " + kept + " of " + tries
                        + " draws from the priors agree with the recorded removals"
                        + (estimates.isEmpty() ? "" : " and biomass") + ": the priors or the records must be wrong.");
            }
            sentences.add(restsOn());
            sentences.addAll(opening);
            sentences.addAll(seasons.notes());
            sentences.add(said("MSY", priors.msy(), "t"));
            sentences.add(said("FMSY", priors.fmsy(), "per year"));
            if (settled) {
                sentences.add(kept + " of " + tries + " draws were kept.");
            }
            if (held > 0) {
                sentences.add(held + " draws were held at FMSY 1 per year, the most that annual steps can follow.");
            }
            return new Verdict(settled, sentences);
        }

        private String restsOn() {
            String biomassToo = estimates.isEmpty()
                    ? ""
                    : " and on " + estimates.size() + (estimates.size() == 1 ? " estimate" : " estimates")
                            + " of biomass";
            return seasons.seasons() == 0
                    ? "Rests on the lake and the species alone" + biomassToo + "; no catch is recorded."
                    : "Rests on priors, on the removals of " + seasons.seasons() + " seasons" + biomassToo
                            + ", not on any index of abundance.";
        }

        private static String said(String name, Prior prior, String unit) {
            return String.format(
                    Locale.ROOT,
                    "%s before the records: %.3g %s, within a factor of %.2g in two cases of three (%s). %s",
                    name,
                    prior.median(),
                    unit,
                    Math.exp(prior.logSd()),
                    prior.source(),
                    prior.reason());
        }
    }
}
