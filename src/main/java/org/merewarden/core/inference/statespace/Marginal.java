package org.merewarden.core.inference.statespace;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;

/**
 * ln p(θ, data) of the outer parameters with the hidden states integrated out by Laplace, summed over distinct modes.
 *
 * <pre>
 *   ln p(u, data) = ln N(u; 0, 1) + ln Σ_m e^{Laplace term of mode m}
 * </pre>
 *
 * <p>Modes are followed from {@link Anchor anchors}, one per branch; {@link #explore} looks for further ones from
 * {@link Starts} along both branches, eased in by a process sd of 0.5, then 0.25, then its value. Where no anchor leads
 * to a mode the eased starts are taken, up to 200 times in all: they are a hundred times slower. Two results closer than {@value #DISTINCT} in every state are one mode. Without
 * any mode the value is −∞. An evaluation from anchors allocates nothing.
 */
final class Marginal {
    static final int MOST_ANCHORS = 4;
    private static final double DISTINCT = 0.05;
    private static final double NEGLIGIBLE = 8;
    private static final double ROUGH = 0.1;
    private static final double[] EASING = {0.5, 0.25};
    private static final double FARTHEST = 30;

    private final OuterParameters outer;
    private final StateDensity density;
    private final InnerMode inner;
    private final Starts starts;
    private final List<Anchor> anchors = new ArrayList<>();
    private final StateMixture mixture;
    private final double[] theta;
    private final double[][] found;
    private final double[] terms;
    private int modes;
    private int rescues = 200;
    private long calls;

    Marginal(SeasonData data, ModelPriors priors, OuterParameters outer) {
        this.outer = outer;
        density = new StateDensity(data, priors);
        inner = new InnerMode(density);
        starts = new Starts(density);
        theta = new double[outer.size()];
        found = new double[MOST_ANCHORS + Starts.COUNT][density.size];
        terms = new double[found.length];
        mixture = new StateMixture(density, found.length);
    }

    int dimension() {
        return outer.dimension();
    }

    int anchors() {
        return anchors.size();
    }

    long calls() {
        return calls;
    }

    long innerEvaluations() {
        return inner.evaluations();
    }

    StateDensity density() {
        return density;
    }

    /** ln p(u, data); sharp enough for differences. */
    double evaluate(double[] u) {
        return evaluate(u, InnerMode.SHARP);
    }

    /** ln p(u, data) with Newton's method stopped at a decrement λ² below {@code tolerance}. */
    double evaluate(double[] u, double tolerance) {
        calls++;
        clear();
        if (!ready(u)) {
            return Double.NEGATIVE_INFINITY;
        }
        for (int a = 0; a < anchors.size(); a++) {
            anchors.get(a).predict(u, found[modes]);
            accept(tolerance, InnerMode.FEW_STEPS);
        }
        if (modes == 0 && rescues > 0) {
            rescues--;
            fromStarts();
        }
        return total(u);
    }

    private void clear() {
        modes = 0;
        mixture.clear();
    }

    private boolean ready(double[] u) {
        for (double each : u) {
            if (!(Math.abs(each) < FARTHEST)) {
                return false;
            }
        }
        outer.natural(u, theta);
        density.parameters(theta, 0);
        return true;
    }

    /** Newton from found[modes]; keeps the result if it is a new mode. */
    private void accept(double tolerance, int mostSteps) {
        if (!inner.find(found[modes], tolerance, mostSteps) || !Double.isFinite(inner.logTerm())) {
            return;
        }
        for (int m = 0; m < modes; m++) {
            if (same(found[m], found[modes])) {
                return;
            }
        }
        mixture.add(found[modes], inner.logTerm());
        terms[modes++] = inner.logTerm();
    }

    private static boolean same(double[] a, double[] b) {
        for (int i = 0; i < a.length; i++) {
            if (!(Math.abs(a[i] - b[i]) < DISTINCT)) {
                return false;
            }
        }
        return true;
    }

    private void fromStarts() {
        for (int which = 0; which < Starts.COUNT; which++) {
            density.parameters(theta, 0);
            starts.write(which, found[modes]);
            for (double eased : EASING) {
                if (Math.exp(theta[OuterParameters.PROCESS_SD]) < eased) {
                    density.parameters(theta, eased);
                    inner.find(found[modes], ROUGH, InnerMode.MANY_STEPS);
                }
            }
            density.parameters(theta, 0);
            accept(InnerMode.SHARP, InnerMode.MANY_STEPS);
        }
    }

    private double total(double[] u) {
        if (modes == 0) {
            return Double.NEGATIVE_INFINITY;
        }
        double best = best();
        double sum = 0;
        for (int m = 0; m < modes; m++) {
            sum += Math.exp(terms[m] - best);
        }
        return best + Math.log(sum) + outer.logPrior(u);
    }

    private double best() {
        double best = terms[0];
        for (int m = 1; m < modes; m++) {
            best = Math.max(best, terms[m]);
        }
        return best;
    }

    /** Searches from both branches at u and keeps what the anchors did not lead to; true if there was any. */
    boolean explore(double[] u) {
        evaluate(u);
        if (!ready(u)) {
            return false;
        }
        int known = anchors.isEmpty() ? 0 : modes;
        if (known == 0) {
            clear();
        }
        fromStarts();
        int kept = anchors.size();
        double best = modes == 0 ? 0 : best();
        for (int m = known; m < modes && anchors.size() < MOST_ANCHORS; m++) {
            if (terms[m] > best - NEGLIGIBLE) {
                anchors.add(Anchor.at(u, found[m], density, outer));
            }
        }
        return anchors.size() > kept;
    }

    /** Drops the anchors that lead at none of these u to a mode of their own that matters. */
    void prune(List<double[]> at) {
        for (int a = anchors.size() - 1; a >= 0 && anchors.size() > 1; a--) {
            Anchor candidate = anchors.remove(a);
            if (at.stream().anyMatch(u -> matters(candidate, u))) {
                anchors.add(a, candidate);
            }
        }
    }

    private boolean matters(Anchor candidate, double[] u) {
        evaluate(u);
        if (!ready(u)) {
            return false;
        }
        int others = modes;
        candidate.predict(u, found[modes]);
        accept(InnerMode.SHARP, InnerMode.FEW_STEPS);
        return modes > others && terms[others] > best() - NEGLIGIBLE;
    }

    /** Replaces the anchors by the modes found at u, where there are as many. */
    void recentre(double[] u) {
        evaluate(u);
        if (modes > 0 && modes >= anchors.size()) {
            anchors.clear();
            for (int m = 0; m < Math.min(modes, MOST_ANCHORS); m++) {
                anchors.add(Anchor.at(u, found[m], density, outer));
            }
        }
    }

    /** The best mode of the states at the u of the last {@link #evaluate}; none where it found none. */
    Optional<double[]> likeliestStates() {
        int best = 0;
        for (int m = 1; m < modes; m++) {
            best = terms[m] > terms[best] ? m : best;
        }
        return modes == 0 ? Optional.empty() : Optional.of(found[best].clone());
    }

    /** The states at the u of the last {@link #evaluate}, until the next. */
    StateMixture mixture() {
        return mixture;
    }

    /** Sets the density's parameters to those of u. */
    void parameters(double[] u) {
        ready(u);
    }

    double logPrior(double[] u) {
        return outer.logPrior(u);
    }
}
