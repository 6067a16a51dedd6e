package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.merewarden.core.dynamics.ConstantMortality;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.evidence.Evidence;

class StateDensityTest {
    private static StateDensity density(Evidence evidence, int last, double[] u) {
        ModelPriors priors = ModelPriors.of(evidence);
        SeasonData data = SeasonData.of(evidence, last, priors);
        OuterParameters outer = new OuterParameters(priors, data);
        StateDensity density = new StateDensity(data, priors);
        double[] theta = new double[outer.size()];
        double[] all = new double[outer.dimension()];
        for (int k = 0; k < all.length; k++) {
            all[k] = u[k % u.length];
        }
        outer.natural(all, theta);
        density.parameters(theta, 0);
        return density;
    }

    /** Central differences, error about h² = 1e-10 relative to the third derivative. */
    @ParameterizedTest
    @ValueSource(doubles = {1, 1e-9, 0.4, 2.5})
    void gradientAndHessianAreThoseOfTheDensityWhateverHappens(double shape) {
        SplittableRandom random = new SplittableRandom(4);
        Evidence evidence = Cases.everything().own("shape", shape, 0).evidence();
        for (int repeat = 0; repeat < 5; repeat++) {
            StateDensity density = density(evidence, 2017, new double[] {0.3 * repeat, -0.5, 0.7});
            double[] z = Cases.states(density, random);
            density.evaluate(z);
            density.addCurvature(1);
            double[] gradient = density.gradient.clone();
            double[][] hessian = dense(density.matrix);
            double h = 1e-5;
            for (int i = 0; i < z.length; i++) {
                double kept = z[i];
                z[i] = kept + h;
                double up = density.evaluate(z);
                double[] gradientUp = density.gradient.clone();
                z[i] = kept - h;
                double down = density.evaluate(z);
                double[] gradientDown = density.gradient.clone();
                z[i] = kept;
                assertThat(gradient[i]).isEqualTo((up - down) / (2 * h), offset(1e-5 * (1 + Math.abs(gradient[i]))));
                for (int j = 0; j < z.length; j++) {
                    double difference = (gradientUp[j] - gradientDown[j]) / (2 * h);
                    assertThat(hessian[i][j])
                            .as("second derivative by %d and %d", i, j)
                            .isEqualTo(difference, offset(2e-5 * (1 + Math.abs(difference))));
                }
            }
        }
    }

    @ParameterizedTest
    @ValueSource(doubles = {1, 1e-9, 0.4})
    void theValueAloneIsThatOfTheFullEvaluation(double shape) {
        SplittableRandom random = new SplittableRandom(5);
        StateDensity density =
                density(Cases.everything().own("shape", shape, 0).evidence(), 2017, new double[] {0.3, -0.5, 0.7});
        for (int repeat = 0; repeat < 5; repeat++) {
            double[] z = Cases.states(density, random);
            double full = density.evaluate(z);
            double[] gradient = density.gradient.clone();
            assertThat(density.value(z)).isEqualTo(full, offset(1e-10 * Math.abs(full)));
            assertThat(density.gradient).containsExactly(gradient);
        }
    }

    /** The season against the closed forms of the dynamics package, which are checked against integration there. */
    @ParameterizedTest
    @ValueSource(doubles = {1, 0, 0.3, 2, 4})
    void theSeasonIsThatOfTheDynamics(double shape) {
        SeasonStep step = new SeasonStep();
        SplittableRandom random = new SplittableRandom(9);
        for (int repeat = 0; repeat < 200; repeat++) {
            double fmsy = Math.exp(-1.5 + 0.4 * random.nextGaussian());
            double f = Math.min(1.5, Math.exp(-1.5 + random.nextGaussian()));
            double x = -0.5 + 0.5 * random.nextGaussian();
            SurplusProduction law = SurplusProduction.fromReferencePoints(1, fmsy, shape);
            double capacity = law.capacity();
            ConstantMortality exact = new ConstantMortality(law, f);
            assertThat(Math.exp(step.law(fmsy, shape)) / fmsy).isEqualTo(capacity, offset(1e-12 * capacity));
            step.start(x, Math.log(f), true);
            step.biomassAt(0.4);
            double part = step.y;
            step.biomassAt(1);
            double whole = step.y;
            step.removals();
            double b = capacity * Math.exp(x);
            assertThat(part).isEqualTo(Math.log(exact.after(b, 0.4) / capacity), offset(1e-11));
            assertThat(whole).isEqualTo(Math.log(exact.after(b, 1) / capacity), offset(1e-11));
            double grown = Math.exp(shape * x);
            double rate = shape == 0 ? -law.r() * x : law.r() / shape * (1 - grown);
            double m = law.r() * Math.max(1, grown) + shape * f + Math.abs(rate - f);
            assertThat(m).isLessThan(30);
            double tolerance = shape == 1 ? 1e-10 : m <= 7 ? 2e-7 : m <= 10 ? 1e-6 : m <= 20 ? 2e-5 : 2e-4;
            assertThat(step.c).isEqualTo(Math.log(exact.removals(b, 1) / capacity), offset(tolerance));
        }
    }

    @Test
    void aClosedSeasonTakesItsKnownCatch() {
        SeasonStep step = new SeasonStep();
        step.law(0.2, 1);
        KnownCatch known = new KnownCatch(step);
        double l = known.solve(-0.7, Math.log(0.05));
        step.start(-0.7, l, true);
        step.biomassAt(1);
        step.removals();
        assertThat(Math.exp(step.c)).isEqualTo(0.05, offset(1e-12));
        assertThat(known.solve(-6, Math.log(0.5))).isEqualTo(Math.log(3));
    }

    private static double[][] dense(BorderedBand m) {
        int size = m.band + m.borders;
        double[][] full = new double[size][size];
        for (int i = 0; i < m.band; i++) {
            full[i][i] = m.diagonal[i];
            if (i > 0) {
                full[i][i - 1] = full[i - 1][i] = m.below[i];
            }
            if (i > 1) {
                full[i][i - 2] = full[i - 2][i] = m.below2[i];
            }
        }
        for (int j = 0; j < m.borders; j++) {
            for (int i = 0; i < m.band; i++) {
                full[m.band + j][i] = full[i][m.band + j] = m.border[j][i];
            }
            for (int k = 0; k < m.borders; k++) {
                full[m.band + j][m.band + k] = m.corner[j][k];
            }
        }
        return full;
    }
}
