package org.merewarden.core.inference.statespace;

import java.util.Arrays;

/**
 * U = −ln p(data, z | θ) of the hidden states z, its gradient and its Hessian.
 *
 * <pre>
 *   z = (x_1, l_1, x_2, l_2, …, x_T, l_T, ln q_1, …, ln q_J),   x = ln(B/K_t),  l = ln F
 *   x_1 ~ N(ln β, s_β),  l_1 ~ N(ln F_1, s_F),  l_{t+1} ~ N(l_t, σ_F),  ln q_j ~ N
 *   x⁺ = ln(e^x + S/K_t) + ln(1 − m),  x_{t+1} ~ N(ln b(1; x⁺, F) + ln(K_t/K_{t+1}), √(σ_p² + v_t))
 *   ln ĉ ~ N(ln C, sd);   ln I ~ N(ln q + ln B(τ), √(σ_j² + cv²));   ln B_obs ~ N(ln B(τ), cv)
 *   ln E ~ N(l − ln q, σ_k);   below detection: Φ((ln I_min − ln q − ln B(τ))/√(σ_j² + cv²))
 * </pre>
 *
 * <p>b, C from {@link SeasonStep}; other symbols in {@link SeasonData}. A closed season takes F = 0, or the F that yields
 * its known catch ({@link KnownCatch}); l walks on unseen. v_t widens the step of a season with stocking or kill by the
 * first-order variance of ln x⁺: (cv_S s/(s + ½))² with s = S/K_t and cv_S = {@value #STOCKING_CV} (our judgement; the
 * stock taken at ½ K), plus the kill's. The state after season T carries no data and is drawn afterwards.
 *
 * <p>The Gauss–Newton matrix is in {@link #matrix}; the exact Hessian adds residual × curvature to each season's
 * 2 × 2 block ({@link #addCurvature}). Every normalising constant is included.
 */
final class StateDensity {
    static final double STOCKING_CV = 0.3;
    static final double LARGEST_MORTALITY = 3;
    private static final double LEAST_SD = 1e-3;

    final SeasonData data;
    final int seasons;
    final int size;
    final BorderedBand matrix;
    final double[] gradient;
    final SeasonStep step = new SeasonStep();

    private final KnownCatch knownCatch = new KnownCatch(step);
    private final double[] curveXX;
    private final double[] curveXL;
    private final double[] curveLL;
    private final double startMean;
    private final double harvestMean;
    private final Precisions weights;
    private final double[] scatterVariance;
    private double logCapacity;
    private double capacity;
    private double processVariance;
    private double value;
    private boolean slopes = true;

    StateDensity(SeasonData data, ModelPriors priors) {
        this.data = data;
        seasons = data.seasons();
        int series = data.series().size();
        size = 2 * seasons + series;
        matrix = new BorderedBand(2 * seasons, series);
        gradient = new double[size];
        curveXX = new double[seasons];
        curveXL = new double[seasons];
        curveLL = new double[seasons];
        scatterVariance = new double[series];
        startMean = Math.log(priors.initialFraction().median());
        harvestMean = Math.log(priors.firstHarvestRate().median());
        weights = new Precisions(
                data,
                Math.max(LEAST_SD, priors.initialFraction().logSd()),
                Math.max(LEAST_SD, priors.firstHarvestRate().logSd()));
    }

    double startMean() {
        return startMean;
    }

    double harvestMean() {
        return harvestMean;
    }

    /** ln K_t in the data's unit; t up to T. */
    double logCapacity(int t) {
        return logCapacity + data.logArea()[t];
    }

    /** Variance of the step after season t. */
    double stepVariance(int t) {
        if (data.stocked()[t] == 0) {
            return processVariance + data.killVariance()[t];
        }
        double share = data.stocked()[t] / capacity(t);
        double stocking = STOCKING_CV * share / (share + 0.5);
        return processVariance + stocking * stocking + data.killVariance()[t];
    }

    private double capacity(int t) {
        return data.logArea()[t] == 0 ? capacity : Math.exp(logCapacity(t));
    }

    /** Takes the outer parameters, as {@link OuterParameters} orders them; σ_p may be eased to a larger value. */
    void parameters(double[] theta, double leastProcessSd) {
        double fmsy = Math.exp(theta[OuterParameters.FMSY]);
        double factor = step.law(fmsy, Math.exp(theta[OuterParameters.SHAPE]));
        logCapacity = theta[OuterParameters.MSY] - theta[OuterParameters.FMSY] + factor;
        capacity = Math.exp(logCapacity);
        double process = Math.max(leastProcessSd, Math.exp(theta[OuterParameters.PROCESS_SD]));
        processVariance = process * process;
        for (int j = 0; j < scatterVariance.length; j++) {
            scatterVariance[j] = Math.exp(2 * theta[OuterParameters.FIRST_SCATTER + j]);
        }
        weights.at(this, theta[OuterParameters.HARVEST_SD], processVariance, scatterVariance);
    }

    /** U at z; leaves gradient, Gauss–Newton matrix and curvature. Not finite where z is beyond the arithmetic. */
    double evaluate(double[] z) {
        slopes = true;
        Arrays.fill(gradient, 0);
        matrix.clear();
        return sum(z);
    }

    /** U at z alone, at half the cost; the gradient and the matrix keep what they hold. */
    double value(double[] z) {
        slopes = false;
        return sum(z);
    }

    private double sum(double[] z) {
        step.slopes = slopes;
        value = weights.constant;
        hiddenStarts(z);
        for (int t = 0; t < seasons; t++) {
            season(z, t);
        }
        step.slopes = true;
        return value;
    }

    private void hiddenStarts(double[] z) {
        single(0, z[0] - startMean, weights.start);
        single(1, z[1] - harvestMean, weights.firstHarvest);
        int band = 2 * seasons;
        for (int j = 0; j < matrix.borders; j++) {
            double weight = weights.catchability[j];
            double e = z[band + j] - data.series().get(j).qMean();
            value += 0.5 * weight * e * e;
            if (slopes) {
                gradient[band + j] += weight * e;
                matrix.corner[j][j] += weight;
            }
        }
    }

    private void single(int i, double e, double weight) {
        value += 0.5 * weight * e * e;
        if (slopes) {
            gradient[i] += weight * e;
            matrix.diagonal[i] += weight;
        }
    }

    /** x⁺ from x; e^x/(e^x + S/K) is its derivative. */
    double afterEvents(int t, double x) {
        double stocked = data.stocked()[t];
        return (stocked == 0 ? x : Math.log(Math.exp(x) + stocked / capacity(t))) + data.logSurvival()[t];
    }

    /** Starts the step of season t from its state; returns ln F as the dynamics take it, −∞ for none. */
    double beginSeason(int t, double x, double l) {
        double plus = afterEvents(t, x);
        boolean closed = data.removals().closed()[t];
        double known = data.removals().known()[t];
        if (closed && known > 0) {
            return knownCatch.solve(plus, Math.log(known) - logCapacity(t));
        }
        knownCatch.none();
        step.start(plus, l, !closed);
        return closed ? Double.NEGATIVE_INFINITY : l;
    }

    /** Mean of x_{t+1}; with slopes, its derivatives by x⁺ and l are left in {@link #step}. */
    double stepFrom(int t, double x, double l, boolean withSlopes) {
        step.slopes = withSlopes;
        beginSeason(t, x, l);
        step.biomassAt(1);
        if (withSlopes) {
            knownCatch.eliminate();
        }
        step.slopes = true;
        return step.y + data.logArea()[t] - data.logArea()[t + 1];
    }

    /** Derivative of x⁺ by x. */
    double kept(int t, double x) {
        return data.stocked()[t] == 0 ? 1 : Math.exp(x - afterEvents(t, x) + data.logSurvival()[t]);
    }

    private void season(double[] z, int t) {
        double x = z[2 * t];
        double plus = afterEvents(t, x);
        double kept = kept(t, x);
        beginSeason(t, x, z[2 * t + 1]);
        curveXX[t] = slopes ? 0 : curveXX[t];
        curveXL[t] = slopes ? 0 : curveXL[t];
        curveLL[t] = slopes ? 0 : curveLL[t];
        wholeSeason(z, t, kept);
        Observations o = data.observations();
        for (int i = o.firstOf()[t]; i < o.firstOf()[t + 1]; i++) {
            observe(z, t, i, plus, kept);
        }
        if (t + 1 < seasons) {
            walk(t, z[2 * t + 3] - z[2 * t + 1]);
        }
    }

    private void walk(int t, double e) {
        double weight = weights.walk;
        value += 0.5 * weight * e * e;
        if (slopes) {
            gradient[2 * t + 1] -= weight * e;
            gradient[2 * t + 3] += weight * e;
            matrix.diagonal[2 * t + 1] += weight;
            matrix.diagonal[2 * t + 3] += weight;
            matrix.below2[2 * t + 3] -= weight;
        }
    }

    private void wholeSeason(double[] z, int t, double kept) {
        boolean caught = weights.taken[t] > 0;
        if (t + 1 >= seasons && !caught) {
            return;
        }
        step.biomassAt(1);
        if (t + 1 < seasons) {
            knownCatch.eliminate();
            transition(z[2 * t + 2], t, kept);
        }
        if (caught) {
            step.removals();
            double e = step.c + logCapacity(t) - data.removals().logCatch()[t];
            double weight = weights.taken[t];
            value += 0.5 * weight * e * e;
            if (slopes) {
                onSeason(t, kept, weight, weight * e, step.cX, step.cL);
                bend(t, kept, weight * e, step.cX, step.cXX, step.cXL, step.cLL);
            }
        }
    }

    private void transition(double next, int t, double kept) {
        double weight = weights.step[t];
        double e = next - step.y - data.logArea()[t] + data.logArea()[t + 1];
        value += 0.5 * weight * e * e;
        if (slopes) {
            int i = 2 * t;
            gradient[i + 2] += weight * e;
            matrix.diagonal[i + 2] += weight;
            matrix.below[i + 2] -= weight * step.yL;
            matrix.below2[i + 2] -= weight * step.yX * kept;
            onSeason(t, kept, weight, -weight * e, step.yX, step.yL);
            bend(t, kept, -weight * e, step.yX, step.yXX, step.yXL, step.yLL);
        }
    }

    /** A term of weight and slope (derivative of U by the mean m) whose m depends on x⁺ and l of season t. */
    private void onSeason(int t, double kept, double weight, double slope, double mPlus, double mL) {
        int i = 2 * t;
        double mX = mPlus * kept;
        gradient[i] += slope * mX;
        gradient[i + 1] += slope * mL;
        matrix.diagonal[i] += weight * mX * mX;
        matrix.diagonal[i + 1] += weight * mL * mL;
        matrix.below[i + 1] += weight * mX * mL;
    }

    private void bend(int t, double kept, double slope, double mX, double mXX, double mXL, double mLL) {
        curveXX[t] += slope * kept * (mXX * kept + mX * (1 - kept));
        curveXL[t] += slope * kept * mXL;
        curveLL[t] += slope * mLL;
    }

    private void observe(double[] z, int t, int i, double plus, double kept) {
        int kind = data.observations().kind()[i];
        if (kind == Observations.EFFORT) {
            observeEffort(z, t, i);
            return;
        }
        int j = data.observations().series()[i];
        double q = j < 0 ? 0 : z[2 * seasons + j];
        biomassAt(data.observations().time()[i], plus);
        double e = q + step.y + logCapacity(t) - data.observations().value()[i];
        double weight = weights.observed[i];
        double slope = weight * e;
        if (kind == Observations.BELOW_DETECTION) {
            double perSd = Math.sqrt(weight);
            double u = -e * perSd;
            double mills = slopes ? NormalTail.mills(u) : 0;
            value -= NormalTail.logCdf(u);
            slope = mills * perSd;
            weight = mills * (mills + u) * weight;
        } else {
            value += 0.5 * weight * e * e;
        }
        if (slopes) {
            onSeason(t, kept, weight, slope, step.yX, step.yL);
            bend(t, kept, slope, step.yX, step.yXX, step.yXL, step.yLL);
            if (j >= 0) {
                onSeries(t, j, weight, slope, step.yX * kept, step.yL, 1);
            }
        }
    }

    private void observeEffort(double[] z, int t, int i) {
        if (data.removals().closed()[t]) {
            return;
        }
        int j = data.observations().series()[i];
        double e = z[2 * t + 1] - z[2 * seasons + j] - data.observations().value()[i];
        double weight = weights.observed[i];
        value += 0.5 * weight * e * e;
        if (slopes) {
            onSeason(t, 1, weight, weight * e, 0, 1);
            onSeries(t, j, weight, weight * e, 0, 1, -1);
        }
    }

    private void biomassAt(double time, double plus) {
        if (time > 0) {
            step.biomassAt(time);
            knownCatch.eliminate();
            return;
        }
        step.y = plus;
        step.yX = 1;
        step.yL = 0;
        step.yXX = 0;
        step.yXL = 0;
        step.yLL = 0;
    }

    private void onSeries(int t, int j, double weight, double slope, double mX, double mL, double mQ) {
        gradient[2 * seasons + j] += slope * mQ;
        matrix.corner[j][j] += weight;
        matrix.border[j][2 * t] += weight * mX * mQ;
        matrix.border[j][2 * t + 1] += weight * mL * mQ;
    }

    /** Turns the Gauss–Newton matrix into the exact Hessian (sign 1) or back (sign −1). */
    void addCurvature(double sign) {
        for (int t = 0; t < seasons; t++) {
            matrix.diagonal[2 * t] += sign * curveXX[t];
            matrix.diagonal[2 * t + 1] += sign * curveLL[t];
            matrix.below[2 * t + 1] += sign * curveXL[t];
        }
    }
}
