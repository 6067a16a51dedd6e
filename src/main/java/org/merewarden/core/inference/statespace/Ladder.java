package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.random.RandomGenerator;

/**
 * From the marginal density of the outer parameters to weighted draws that can be trusted, rung by rung.
 *
 * <ol>
 *   <li>modes of the hidden states looked for at a few draws of the prior and around the outer mode; then draws from the
 *       prior as a multivariate t (the defensive round), around the mode, and adapted;
 *   <li>more rounds, each from the whole sample widened and from its two halves along the longest axis;
 *   <li>{@link Chains}, whose draws are weighted by p̂/Laplace;
 *   <li>not settled: the draws with the larger ESS are kept.
 * </ol>
 *
 * <p>Weighting is accepted when ESS ≥ {@value #LEAST_EFFECTIVE} and k̂ &lt; {@value #LARGEST_SHAPE}, chains when R̂ &lt;
 * 1.01 and bulk ESS ≥ {@value #LEAST_EFFECTIVE}, also after weighting; a rung goes on to {@value #WANTED_EFFECTIVE}
 * effective draws while that is cheap. Where a rung would fail, large corrections are cut more tightly before it is given
 * up: calibration holds with the tightest bound too, while a stock without a result helps nobody. Each rung leaves a sentence.
 *
 * <p>Bounded: at most {@value #MOST_EVALUATIONS} evaluations of the marginal density, and no further round of weighting
 * once {@value #MOST_WORK} evaluations × hidden states of the inner density are spent, about two seconds. No clock is
 * asked: the same seed gives the same bits.
 */
final class Ladder {
    static final double LEAST_EFFECTIVE = 400;
    static final double LARGEST_SHAPE = 0.7;
    static final double WANTED_EFFECTIVE = 1000;
    private static final int PROBES = 6;
    private static final int DEFENSIVE = 300;
    private static final int FIRST_ROUND = 500;
    private static final int LEAST_ROUND = 200;
    private static final int MOST_ROUND = 800;
    private static final int ROUNDS = 5;
    private static final double EFFICIENCY = 0.6;
    private static final int MORE_ROUNDS = 5;
    private static final int PART = 600;
    private static final double WHOLE_WIDENED = 2;
    private static final double HALF_WIDENED = 1.5;
    private static final int MOST_RESTARTS = 2;

    static final int MOST_EVALUATIONS = 100_000;
    static final long MOST_WORK = 20_000_000;

    private final Marginal marginal;
    private final RandomGenerator random;
    private final StudentT prior;
    private final List<String> rungs = new ArrayList<>();
    private double[] mode;
    private double[][] covariance;
    private ImportanceSample sample;
    private final long stateSeed;
    private final int leastRung;
    private int rung;
    private boolean settled;

    Ladder(Marginal marginal, RandomGenerator random) {
        this(marginal, random, 1);
    }

    /** {@code leastRung}: rungs below it are climbed but never accepted. */
    Ladder(Marginal marginal, RandomGenerator random, int leastRung) {
        this.leastRung = leastRung;
        this.marginal = marginal;
        this.random = random;
        stateSeed = random.nextLong();
        prior = StudentT.standard(marginal.dimension());
        mode = new double[marginal.dimension()];
        covariance = new double[0][];
        sample = new ImportanceSample(marginal, stateSeed);
        climb();
    }

    ImportanceSample sample() {
        return sample;
    }

    List<String> rungs() {
        return rungs;
    }

    /** 1, 2 or 3, where it ended. */
    int rung() {
        return rung;
    }

    boolean settled() {
        return settled;
    }

    private void climb() {
        if (!findModes()) {
            rung = 3;
            rungs.add("No path of biomass and harvest was found that agrees with the records.");
            return;
        }
        for (int restart = 0; restart <= MOST_RESTARTS; restart++) {
            firstRung();
            if (restart == MOST_RESTARTS || !work() || !furtherModes()) {
                break;
            }
        }
        record("Draws around the most likely parameters");
        if (!settled) {
            secondRung();
        }
        if (!settled) {
            thirdRung();
        }
    }

    /** False where the records agree with no path at all. */
    private boolean findModes() {
        marginal.explore(new double[marginal.dimension()]);
        double[] best = new double[marginal.dimension()];
        double bestValue = marginal.evaluate(best);
        for (int k = 0; k < PROBES; k++) {
            double[] u = new double[marginal.dimension()];
            prior.draw(random, u);
            marginal.explore(u);
            double value = marginal.evaluate(u);
            if (value > bestValue) {
                bestValue = value;
                best = u;
            }
        }
        if (marginal.anchors() == 0) {
            return false;
        }
        outerMode(best);
        return true;
    }

    private void outerMode(double[] start) {
        OuterMode found = new OuterMode(marginal::evaluate, start);
        if (marginal.explore(found.mode())) {
            found = new OuterMode(marginal::evaluate, found.mode());
        }
        mode = found.mode();
        covariance = found.covariance();
        StudentT around = new StudentT(mode, covariance);
        List<double[]> near = new ArrayList<>();
        for (int k = 0; k < PROBES; k++) {
            double[] u = new double[mode.length];
            around.draw(random, u);
            near.add(u);
            marginal.explore(u);
        }
        marginal.recentre(mode);
        marginal.prune(near);
    }

    private void firstRung() {
        rung = 1;
        sample = new ImportanceSample(marginal, stateSeed);
        sample.add(new StudentT(mode, covariance), FIRST_ROUND, random);
        sample.add(prior, DEFENSIVE, random);
        for (int round = 1; round < ROUNDS && work() && !good(WANTED_EFFECTIVE); round++) {
            sample.add(sample.adapted(mode, covariance), needed(), random);
        }
    }

    private boolean work() {
        return marginal.innerEvaluations() * marginal.density().size < MOST_WORK;
    }

    /** Looks for modes at draws of the posterior; true if there were any that the anchors did not lead to. */
    private boolean furtherModes() {
        boolean further = false;
        for (int i : sample.resample(PROBES, random)) {
            further |= marginal.explore(sample.draw(i));
        }
        if (further) {
            outerMode(mode);
        }
        return further;
    }

    private void secondRung() {
        rung = 2;
        sample.loosen();
        for (int round = 0; round < MORE_ROUNDS && work() && !good(LEAST_EFFECTIVE); round++) {
            StudentT whole = sample.adapted(mode, covariance);
            double[] axis = whole.longestAxis();
            StudentT upper = sample.half(axis, 1, covariance, HALF_WIDENED);
            StudentT lower = sample.half(axis, -1, covariance, HALF_WIDENED);
            sample.add(sample.widened(mode, covariance, WHOLE_WIDENED), PART, random);
            sample.add(upper, PART, random);
            sample.add(lower, PART, random);
        }
        record("More rounds, split and widened");
    }

    /** Size of the next round, so that none is drawn in vain. */
    private int needed() {
        double missing = WANTED_EFFECTIVE - sample.effectiveSize();
        return (int) Math.max(LEAST_ROUND, Math.min(MOST_ROUND, missing / EFFICIENCY));
    }

    private void thirdRung() {
        rung = 3;
        double[][] spread = sample.covariance(covariance);
        Chains chains = new Chains(marginal, sample.widened(mode, covariance, WHOLE_WIDENED), spread, random);
        ImportanceSample followed =
                ImportanceSample.following(marginal, stateSeed, chains.draws(), chains.effectiveSize());
        while (followed.effectiveSize() < LEAST_EFFECTIVE && followed.tighten()) {}
        double effective = Math.min(chains.effectiveSize(), followed.effectiveSize());
        settled = chains.rHat() < Chains.LARGEST_R_HAT && effective >= LEAST_EFFECTIVE;
        rungs.add(String.format(
                Locale.ROOT,
                "Four Markov chains of %d steps in all: they differ by a factor of %.3f (R̂), worth %.0f independent"
                        + " draws; %s.",
                chains.steps(),
                chains.rHat(),
                effective,
                settled ? "accepted" : "not accepted (needs under 1.01 and 400)"));
        sample = settled || followed.effectiveSize() > sample.effectiveSize() ? followed : sample;
    }

    private boolean good(double effective) {
        return leastRung <= rung && sample.effectiveSize() >= effective && sample.paretoShape() < LARGEST_SHAPE;
    }

    private void record(String what) {
        while (!good(LEAST_EFFECTIVE) && sample.tighten()) {}
        settled = good(LEAST_EFFECTIVE);
        rungs.add(String.format(
                Locale.ROOT,
                "%s: %d draws worth %.0f independent ones, tail index %.2f; %s.",
                what,
                sample.size(),
                sample.effectiveSize(),
                sample.paretoShape(),
                settled ? "accepted" : "not accepted (needs 400 and under 0.7)"));
    }
}
