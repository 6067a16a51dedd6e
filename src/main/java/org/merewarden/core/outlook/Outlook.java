package org.merewarden.core.outlook;

import java.util.Arrays;
import java.util.List;
import java.util.OptionalInt;
import java.util.SplittableRandom;
import java.util.function.DoubleFunction;
import java.util.function.IntPredicate;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import org.merewarden.core.dynamics.AnnualMap;
import org.merewarden.core.dynamics.CatchBalance;
import org.merewarden.core.dynamics.DepensatedYear;
import org.merewarden.core.dynamics.FishedYear;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.inference.Posterior;

/**
 * The seasons ahead of an assessment, draw by draw:
 *
 * <pre>
 *   B(t+1) = b(1; B(t), F(t)) · e^ε,     ε ~ N(0, σ_p)
 *   risk(course) = chance of B &lt; B lim at the end of at least one of the seasons S … S + Y − 1
 *
 *   B     biomass at a season's start, t           σ_p   process error of the draw
 *   b     the year's law ({@link FishedYear})      Y     horizon, seasons
 *   F(t)  of the course, 1/yr                      S     first season looked at
 * </pre>
 *
 * <p>The seasons between the assessment and S are run first, with their own removals. The start of season S does not count
 * as a crossing: no course of season S can change it.
 *
 * <p>All courses meet the same process errors, drawn once from the seed. A larger catch therefore never leaves more biomass
 * in any draw, so that the risk curve is monotone exactly, and each draw has one largest catch that it bears. Accuracy:
 * that of the draws; at a chance of 10 % and 1,000 draws the standard error is 1 point.
 *
 * <p>Left out: stocking and fish kills to come, changes of the lake's area, errors of later assessments.
 */
public final class Outlook {
    /** σ_p of an assessment that keeps none: the median of its prior. */
    static final double USUAL_PROCESS_SD = 0.1;

    /** Relative accuracy of the largest catch. */
    private static final double ACCURACY = 1e-6;

    private static final int LONGEST_RECOVERY = 50;

    private final Posterior posterior;
    private final List<SeasonBetween> between;
    private final double limitFraction;
    private final double depensation;
    private final long seed;
    private final SurplusProduction[] laws;
    private final FishedYear[] years;
    private final double[] start;
    private final double[][] deviations;

    /**
     * @param posterior with at least one draw
     * @param between the seasons from the one after the last assessed to the one before S, in order
     * @param horizon Y, >= 1
     * @param limitFraction B lim as a fraction of K, >= 0
     * @param depensation d of {@link DepensatedYear}, 0 for none: a stress test
     * @param seed of the process errors
     */
    public Outlook(
            Posterior posterior,
            List<SeasonBetween> between,
            int horizon,
            double limitFraction,
            double depensation,
            long seed) {
        if (posterior.draws() == 0 || horizon < 1) {
            throw new IllegalArgumentException(
                    "needs draws >= 1 and horizon >= 1, got " + posterior.draws() + ", " + horizon);
        }
        this.posterior = posterior;
        this.between = List.copyOf(between);
        this.limitFraction = limitFraction;
        this.depensation = depensation;
        this.seed = seed;
        int draws = posterior.draws();
        this.laws = IntStream.range(0, draws).mapToObj(this::law).toArray(SurplusProduction[]::new);
        this.years = Arrays.stream(laws)
                .map(law -> depensation == 0 ? new AnnualMap(law) : new DepensatedYear(law, depensation))
                .toArray(FishedYear[]::new);
        SplittableRandom random = new SplittableRandom(seed);
        this.start = IntStream.range(0, draws)
                .mapToDouble(i -> throughSeasonsBetween(i, random))
                .toArray();
        this.deviations = IntStream.range(0, draws)
                .mapToObj(i -> deviations(i, horizon, random))
                .toArray(double[][]::new);
    }

    /** The same outlook with growth weakened at low biomass. */
    public Outlook withDepensation(double halfGrowthState) {
        return new Outlook(posterior, between, horizon(), limitFraction, halfGrowthState, seed);
    }

    public Posterior posterior() {
        return posterior;
    }

    public int draws() {
        return start.length;
    }

    /** Y, seasons. */
    public int horizon() {
        return deviations[0].length;
    }

    /** First season looked at, S. */
    public int firstSeason() {
        return posterior.lastYear() + 1 + between.size();
    }

    /** Biomass of one draw at the start of season S, t. */
    public double startBiomass(int draw) {
        return start[draw];
    }

    /** B lim of one draw, t. */
    public double limitBiomass(int draw) {
        return limitFraction * laws[draw].capacityTonnes();
    }

    /** Surplus production of one draw, without depensation. */
    public SurplusProduction law(int draw) {
        return SurplusProduction.fromReferencePoints(
                posterior.msyTonnes()[draw],
                posterior.fmsyPerYear()[draw],
                posterior.shape()[draw]);
    }

    /** Removals of season S under a course, by draw, t. */
    public double[] firstCatch(Course course) {
        return byDraw(i -> years[i].removals(start[i], course.mortality(i, start[i], years[i])));
    }

    public Projection project(Course course) {
        double[][] biomass = new double[draws()][horizon() + 1];
        double[][] removals = new double[draws()][horizon()];
        for (int i = 0; i < draws(); i++) {
            biomass[i][0] = start[i];
            for (int t = 0; t < horizon(); t++) {
                double mortality = course.mortality(i, biomass[i][t], years[i]);
                removals[i][t] = years[i].removals(biomass[i][t], mortality);
                biomass[i][t + 1] = years[i].after(biomass[i][t], mortality) * deviations[i][t];
            }
        }
        return new Projection(biomass, removals, byDraw(this::limitBiomass));
    }

    /** Chance of B &lt; B lim at the end of at least one season, 0–1. */
    public double risk(Course course) {
        return share(i -> !bears(i, course));
    }

    /**
     * The risk of each level of a family of courses in which a higher level never leaves more biomass.
     *
     * @param levels in ascending order
     * @return as many, ascending
     */
    public double[] risks(DoubleFunction<Course> family, double... levels) {
        Course[] courses = Arrays.stream(levels).mapToObj(family).toArray(Course[]::new);
        int[] notBorne = new int[levels.length + 1];
        for (int i = 0; i < draws(); i++) {
            notBorne[firstNotBorne(i, courses)]++;
        }
        double[] risks = new double[levels.length];
        int sum = 0;
        for (int k = 0; k < levels.length; k++) {
            sum += notBorne[k];
            risks[k] = (double) sum / draws();
        }
        return risks;
    }

    private int firstNotBorne(int draw, Course[] courses) {
        int low = 0;
        int high = courses.length;
        while (low < high) {
            int middle = (low + high) / 2;
            if (bears(draw, courses[middle])) {
                low = middle + 1;
            } else {
                high = middle;
            }
        }
        return low;
    }

    /**
     * The highest level of such a family whose risk is at most the tolerance, to 1e-6 relative, from below.
     *
     * @param usual a level of the family's usual size, &gt; 0, where the search starts
     * @return infinity where every level is borne; NaN where level 0 is not
     */
    public double largest(DoubleFunction<Course> family, double usual, double tolerance) {
        int allowed = (int) Math.floor(tolerance * draws() + 1e-9);
        int[] undecided = IntStream.range(0, draws()).toArray();
        int[] failing = failing(undecided, family.apply(0));
        if (failing.length > allowed) {
            return Double.NaN;
        }
        allowed -= failing.length;
        undecided = without(undecided, failing);
        failing = failing(undecided, family.apply(Double.MAX_VALUE));
        if (failing.length <= allowed) {
            return Double.POSITIVE_INFINITY;
        }
        // those that bear every level are out of the search; of the others, a level decides
        undecided = failing;
        double low = 0;
        double high = usual;
        boolean bracketed = false;
        while (!bracketed || high - low > ACCURACY * high) {
            double middle = bracketed ? low + (high - low) / 2 : high;
            failing = failing(undecided, family.apply(middle));
            if (failing.length > allowed) {
                undecided = failing;
                high = middle;
                bracketed = true;
            } else {
                allowed -= failing.length;
                undecided = without(undecided, failing);
                low = middle;
                high = bracketed ? high : 2 * middle;
            }
        }
        return low;
    }

    /** The largest constant catch with at most that risk, t/yr: see {@link #largest}. */
    public double largestCatch(double tolerance) {
        double usual = Arrays.stream(posterior.msyTonnes()).average().orElseThrow();
        return largest(Course::ofCatch, usual, tolerance);
    }

    private int[] failing(int[] draws, Course course) {
        return Arrays.stream(draws).filter(i -> !bears(i, course)).toArray();
    }

    /** Both in ascending order. */
    private static int[] without(int[] draws, int[] taken) {
        return Arrays.stream(draws)
                .filter(i -> Arrays.binarySearch(taken, i) < 0)
                .toArray();
    }

    /** Whether the draw stays at or above B lim at the end of every season. */
    private boolean bears(int draw, Course course) {
        FishedYear year = years[draw];
        double limit = limitBiomass(draw);
        double biomass = start[draw];
        for (double deviation : deviations[draw]) {
            biomass = year.after(biomass, course.mortality(draw, biomass, year)) * deviation;
            if (biomass < limit) {
                return false;
            }
        }
        return true;
    }

    /** Chance that these constant removals (t/yr), held for ever from the start of season S, end at nothing, 0–1. */
    public double collapseCourse(double catchTonnes) {
        return share(i -> CatchBalance.collapses(laws[i], start[i], catchTonnes));
    }

    /**
     * With nothing taken, the seasons until the chance of B &lt; B lim is at most the tolerance.
     *
     * @return 1 is the end of season S; empty where {@value #LONGEST_RECOVERY} seasons do not suffice
     */
    public OptionalInt recovery(double tolerance) {
        double[] below = new Outlook(posterior, between, LONGEST_RECOVERY, limitFraction, depensation, seed)
                .project(Course.CLOSURE)
                .belowLimit();
        return IntStream.rangeClosed(1, LONGEST_RECOVERY)
                .filter(t -> below[t - 1] <= tolerance)
                .findFirst();
    }

    private double throughSeasonsBetween(int draw, SplittableRandom random) {
        double biomass = posterior.presentBiomass(draw);
        for (SeasonBetween season : between) {
            double wanted = season.medianTonnes() * Math.exp(season.logSd() * random.nextGaussian());
            double mortality = years[draw].mortality(biomass, wanted);
            biomass = years[draw].after(biomass, mortality) * Math.exp(processSd(draw) * random.nextGaussian());
        }
        return biomass;
    }

    private double[] deviations(int draw, int seasons, SplittableRandom random) {
        return IntStream.range(0, seasons)
                .mapToDouble(t -> Math.exp(processSd(draw) * random.nextGaussian()))
                .toArray();
    }

    private double processSd(int draw) {
        double[] ofDraws = posterior.parameters().get("process_sd");
        return ofDraws == null ? USUAL_PROCESS_SD : ofDraws[draw];
    }

    private double[] byDraw(IntToDoubleFunction value) {
        return IntStream.range(0, draws()).mapToDouble(value).toArray();
    }

    private double share(IntPredicate holds) {
        return (double) IntStream.range(0, draws()).filter(holds).count() / draws();
    }
}
