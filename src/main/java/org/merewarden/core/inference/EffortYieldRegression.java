package org.merewarden.core.inference;

import java.util.Optional;
import java.util.OptionalDouble;
import org.apache.commons.math3.stat.regression.SimpleRegression;

/**
 * Catch per unit of effort regressed on effort, as if the stock were in equilibrium every season.
 *
 * <pre>
 *   Schaefer:  C/E = a + b E        MSY = −a²/(4b)          E at MSY = −a/(2b)
 *   Fox:       ln(C/E) = a + b E    MSY = −exp(a − 1)/b     E at MSY = −1/b
 * </pre>
 *
 * <table>
 * <caption>Symbols</caption>
 * <tr><td>C</td><td>removals of the season, t</td></tr>
 * <tr><td>E</td><td>effort of the season, in its series' unit</td></tr>
 * <tr><td>a, b</td><td>intercept and slope by ordinary least squares</td></tr>
 * </table>
 *
 * <p>Source: Schaefer 1954, Fox 1970, as worked in Cadima 2003, FAO Fisheries Technical Paper 393, sec. 8.19, and Sparre
 * &amp; Venema 1998, FAO Fisheries Technical Paper 306/1, ch. 9. Standard errors of MSY and effort are first order (delta
 * method). Edge cases: seasons without effort or catch are left out; fewer than three seasons or a constant effort give
 * no regression; b ≥ 0 gives no MSY. For comparison with older reports only: see {@link #WARNING}.
 */
public final class EffortYieldRegression {
    /** To be shown wherever a result is. */
    public static final String WARNING = "Regressions of catch per effort on effort take every season for a state of"
            + " balance; while a fishery grows they overestimate what it can bear.";

    private EffortYieldRegression() {}

    /**
     * One regression.
     *
     * @param a intercept
     * @param b slope
     * @param aError, bError their standard errors
     * @param rSquared share of the variance explained, 0–1
     * @param msy in the catches' unit; empty where the slope is not negative
     * @param msyError its standard error, first order
     * @param effortAtMsy in the effort's unit; empty where the slope is not negative
     * @param effortAtMsyError its standard error, first order
     */
    public record Line(
            double a,
            double b,
            double aError,
            double bError,
            double rSquared,
            OptionalDouble msy,
            OptionalDouble msyError,
            OptionalDouble effortAtMsy,
            OptionalDouble effortAtMsyError) {}

    /** Catch per effort on effort; empty where no line can be drawn. */
    public static Optional<Line> schaefer(double[] catches, double[] effort) {
        return regression(catches, effort, false).map(r -> {
            double a = r.getIntercept();
            double b = r.getSlope();
            double[] msyGradient = {-a / (2 * b), a * a / (4 * b * b)};
            double[] effortGradient = {-1 / (2 * b), a / (2 * b * b)};
            // without a positive intercept the parabola has no catch on it
            return line(r, a > 0, -a * a / (4 * b), msyGradient, -a / (2 * b), effortGradient);
        });
    }

    /** ln catch per effort on effort; empty where no line can be drawn. */
    public static Optional<Line> fox(double[] catches, double[] effort) {
        return regression(catches, effort, true).map(r -> {
            double b = r.getSlope();
            double msy = -Math.exp(r.getIntercept() - 1) / b;
            return line(r, true, msy, new double[] {msy, -msy / b}, -1 / b, new double[] {0, 1 / (b * b)});
        });
    }

    private static Optional<SimpleRegression> regression(double[] catches, double[] effort, boolean logarithm) {
        if (catches.length != effort.length) {
            throw new IllegalArgumentException(
                    "needs as many catches as efforts, got " + catches.length + " and " + effort.length);
        }
        SimpleRegression regression = new SimpleRegression();
        for (int i = 0; i < catches.length; i++) {
            double perUnit = catches[i] / effort[i];
            if (perUnit > 0 && Double.isFinite(perUnit)) {
                regression.addData(effort[i], logarithm ? Math.log(perUnit) : perUnit);
            }
        }
        boolean drawn = regression.getN() >= 3
                && Double.isFinite(regression.getSlope())
                && Double.isFinite(regression.getIntercept());
        return drawn ? Optional.of(regression) : Optional.empty();
    }

    private static Line line(
            SimpleRegression r,
            boolean possible,
            double msy,
            double[] msyGradient,
            double effort,
            double[] effortGradient) {
        boolean falling = possible && r.getSlope() < 0 && Double.isFinite(msy) && Double.isFinite(effort);
        double total = r.getTotalSumSquares();
        return new Line(
                r.getIntercept(),
                r.getSlope(),
                r.getInterceptStdErr(),
                r.getSlopeStdErr(),
                total > 0 ? r.getRSquare() : 0,
                falling ? OptionalDouble.of(msy) : OptionalDouble.empty(),
                falling ? OptionalDouble.of(deltaError(r, msyGradient)) : OptionalDouble.empty(),
                falling ? OptionalDouble.of(effort) : OptionalDouble.empty(),
                falling ? OptionalDouble.of(deltaError(r, effortGradient)) : OptionalDouble.empty());
    }

    /** √(gᵀ V g), V the covariance of (a, b): cov(a, b) = −mean(E) var(b). */
    private static double deltaError(SimpleRegression r, double[] gradient) {
        double varA = Math.pow(r.getInterceptStdErr(), 2);
        double varB = Math.pow(r.getSlopeStdErr(), 2);
        double meanEffort = meanEffort(r, varA, varB);
        double variance = gradient[0] * gradient[0] * varA
                + gradient[1] * gradient[1] * varB
                - 2 * gradient[0] * gradient[1] * meanEffort * varB;
        return Math.sqrt(Math.max(0, variance));
    }

    /** From var(a)/var(b) = Sxx/N + mean². */
    private static double meanEffort(SimpleRegression r, double varA, double varB) {
        return varB == 0 ? 0 : Math.sqrt(Math.max(0, varA / varB - r.getXSumSquares() / r.getN()));
    }
}
