package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.assertj.core.api.Assertions.within;
import static org.assertj.core.api.Assertions.withinPercentage;

import java.util.List;
import java.util.Random;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.Arguments;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.MethodSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.merewarden.core.dynamics.EquilibriumCurve.Branch;
import org.merewarden.core.dynamics.EquilibriumCurve.Fold;
import org.merewarden.core.dynamics.EquilibriumCurve.Point;

class EquilibriumCurveTest {
    private static final SurplusProduction SCHAEFER = new SurplusProduction(0.4, 1000, 1);

    private static final HarvestRule CONSTANT_CATCH = new ConstantCatch();

    static Stream<Arguments> laws() {
        GrowthLaw fox = new SurplusProduction(0.4, 1000, 0);
        GrowthLaw type3 = new SurplusProduction(1, 10, 1);
        return Stream.of(
                Arguments.of(SCHAEFER, CONSTANT_CATCH),
                Arguments.of(fox, CONSTANT_CATCH),
                Arguments.of(new SurplusProduction(0.4, 1e-6, 1e-9), CONSTANT_CATCH),
                Arguments.of(new SurplusProduction(0.4, 1e12, 4), CONSTANT_CATCH),
                Arguments.of(SCHAEFER, new ConstantEffort()),
                Arguments.of(fox, new ConstantEffort()),
                Arguments.of(SCHAEFER, new Reserve(300)),
                Arguments.of(SCHAEFER, new PolicyRamp(200, 500)),
                Arguments.of(fox, new CatchLinearRamp(100, 400)),
                Arguments.of(new Depensation(SCHAEFER, 0.1), new ConstantEffort()),
                Arguments.of(new Depensation(fox, 0.05), CONSTANT_CATCH),
                Arguments.of(new CriticalDepensation(0.5, 200, 1000), new ConstantEffort()),
                Arguments.of(new CriticalDepensation(0.5, 200, 1000), CONSTANT_CATCH),
                Arguments.of(type3, new SaturatingRemoval()));
    }

    /** Computed values of the reference, six decimals. */
    @ParameterizedTest
    @CsvSource({
        "50, 146.446609, 853.553391, 0.282843",
        "75, 250, 750, 0.2",
        "96, 400, 600, 0.08",
    })
    void logisticUnderConstantCatch(double harvest, double lower, double upper, double eigenvalue) {
        EquilibriumCurve curve = EquilibriumCurve.trace(SCHAEFER, CONSTANT_CATCH);
        List<Equilibrium> found = curve.equilibria(harvest);
        assertThat(found).hasSize(2);
        assertThat(found.get(0).biomassTonnes()).isCloseTo(lower, within(5e-7));
        assertThat(found.get(0).eigenvalue()).isCloseTo(eigenvalue, within(5e-7));
        assertThat(found.get(0).stable()).isFalse();
        assertThat(found.get(1).biomassTonnes()).isCloseTo(upper, within(5e-7));
        assertThat(found.get(1).eigenvalue()).isCloseTo(-eigenvalue, within(5e-7));
        assertThat(found.get(1).stable()).isTrue();
        assertThat(found.get(1).returnTimeYears()).isCloseTo(1 / eigenvalue, withinPercentage(1e-3));
        assertThat(curve.tippingBiomass(harvest)).hasValueCloseTo(lower, within(5e-7));
    }

    /** Computed values of the reference: the fold of the logistic, 100 at 500. */
    @Test
    void logisticFoldsAtMsy() {
        EquilibriumCurve curve = EquilibriumCurve.trace(SCHAEFER, CONSTANT_CATCH);
        assertThat(curve.folds()).hasSize(1);
        assertThat(curve.folds().get(0).harvest()).isCloseTo(100, within(1e-10));
        assertThat(curve.folds().get(0).biomassTonnes()).isCloseTo(500, within(1e-9));
        assertThat(curve.foldHarvest()).hasValueCloseTo(100.0, within(1e-10));
        assertThat(curve.branches()).extracting(Branch::stable).containsExactly(false, true);
        assertThat(curve.equilibria(100.001)).isEmpty();
        assertThat(curve.tippingBiomass(100.001)).isEmpty();
    }

    @Test
    void atTheFoldThereIsOneEquilibriumThatIsNotStable() {
        List<Equilibrium> found =
                EquilibriumCurve.trace(SCHAEFER, CONSTANT_CATCH).equilibria(SCHAEFER.msy());
        assertThat(found).hasSize(1);
        assertThat(found.get(0).stable()).isFalse();
        assertThat(found.get(0).biomassTonnes()).isCloseTo(500, within(1e-9));
        assertThat(found.get(0).returnTimeYears()).isInfinite();
    }

    @ParameterizedTest
    @ValueSource(doubles = {0, 1e-9, 0.188115, 0.5, 1, 2, 4})
    void constantCatchFoldsAtMsyForEveryShape(double n) {
        SurplusProduction law = new SurplusProduction(0.7, 3.3, n);
        EquilibriumCurve curve = EquilibriumCurve.trace(law, CONSTANT_CATCH);
        assertThat(curve.foldHarvest()).hasValueCloseTo(law.msy(), withinPercentage(1e-10));
        assertThat(curve.folds()).hasSize(1);
        assertThat(curve.folds().get(0).biomassTonnes()).isCloseTo(law.bmsy(), withinPercentage(1e-9));
        assertThat(curve.equilibria(0)).hasSize(1);
        assertThat(curve.equilibria(0).get(0).biomassTonnes()).isCloseTo(3.3, withinPercentage(1e-10));
        assertThat(curve.equilibria(0).get(0).eigenvalue()).isCloseTo(-0.7, within(1e-9));
    }

    /** Under surplus production the equilibrium of a constant effort slides to zero at g′(0) = r/n. */
    @ParameterizedTest
    @ValueSource(doubles = {0.5, 1, 2})
    void constantEffortHasNoFold(double n) {
        SurplusProduction law = new SurplusProduction(0.4, 1000, n);
        EquilibriumCurve curve = EquilibriumCurve.trace(law, new ConstantEffort());
        assertThat(curve.folds()).isEmpty();
        assertThat(curve.foldHarvest()).isEmpty();
        assertThat(curve.branches()).singleElement().extracting(Branch::stable).isEqualTo(true);
        assertThat(curve.equilibria(law.fmsy())).singleElement().satisfies(found -> {
            assertThat(found.biomassTonnes()).isCloseTo(law.bmsy(), withinPercentage(1e-9));
            // λ at BMSY is −FMSY, since g′ = 0 there
            assertThat(found.eigenvalue()).isCloseTo(-law.fmsy(), withinPercentage(1e-7));
        });
        assertThat(curve.equilibria(0.4 / n * 1.0001)).isEmpty();
        assertThat(curve.tippingBiomass(law.fmsy())).isEmpty();
    }

    /** Computed value of the reference: fold E = 0.4 at 600 under critical depensation. */
    @Test
    void criticalDepensationFolds() {
        EquilibriumCurve curve = EquilibriumCurve.trace(new CriticalDepensation(0.5, 200, 1000), new ConstantEffort());
        assertThat(curve.folds()).singleElement().satisfies(fold -> {
            assertThat(fold.harvest()).isCloseTo(0.4, within(1e-12));
            assertThat(fold.biomassTonnes()).isCloseTo(600, within(1e-8));
        });
        assertThat(curve.tippingBiomass(0)).hasValueCloseTo(200.0, within(1e-9));
        assertThat(curve.equilibria(0)).extracting(Equilibrium::stable).containsExactly(false, true);
        assertThat(curve.branches().get(0).points().get(0).biomassTonnes()).isCloseTo(200, within(1e-9));
    }

    /** Computed values of the reference: two folds of the type III removal (May 1977, Nature 269: 471–477). */
    @Test
    void typeThreeRemovalFoldsTwice() {
        EquilibriumCurve curve = EquilibriumCurve.trace(new SurplusProduction(1, 10, 1), new SaturatingRemoval());
        assertThat(curve.folds()).hasSize(2);
        Fold lower = curve.folds().get(0);
        Fold upper = curve.folds().get(1);
        assertThat(lower.harvest()).isCloseTo(1.7872302002, within(5e-11));
        assertThat(lower.biomassTonnes()).isCloseTo(1.1378052016, within(5e-10));
        assertThat(lower.maximum()).isFalse();
        assertThat(upper.harvest()).isCloseTo(2.6043651707, within(5e-11));
        assertThat(upper.biomassTonnes()).isCloseTo(4.7812837960, within(5e-10));
        assertThat(curve.foldHarvest()).hasValue(upper.harvest());
        assertThat(curve.branches()).extracting(Branch::stable).containsExactly(true, false, true);
        assertThat(curve.equilibria(2)).extracting(Equilibrium::stable).containsExactly(true, false, true);
        assertThat(curve.equilibria(1)).extracting(Equilibrium::stable).containsExactly(true);
        assertThat(curve.equilibria(3)).extracting(Equilibrium::stable).containsExactly(true);
        assertThat(curve.tippingBiomass(2).getAsDouble()).isBetween(1.138, 4.781);
        assertThat(curve.tippingBiomass(1)).isEmpty();
    }

    @Test
    void atAFoldTheOtherBranchIsStillThereAndOrderIsByBiomass() {
        EquilibriumCurve curve = EquilibriumCurve.trace(new SurplusProduction(1, 10, 1), new SaturatingRemoval());
        List<Equilibrium> found = curve.equilibria(curve.folds().get(1).harvest());
        assertThat(found).extracting(Equilibrium::stable).containsExactly(true, false);
        assertThat(found.get(0).biomassTonnes()).isLessThan(1.138);
        assertThat(found.get(1).biomassTonnes()).isCloseTo(4.7812837960, within(5e-10));
    }

    /** Growth with two humps, the lower one higher: the fold harvest belongs to the upper one, found here by a scan. */
    @Test
    void theFoldHarvestIsThatOfTheUpperBranch() {
        GrowthLaw humps = new GrowthLaw() {
            @Override
            public double rate(double b) {
                return b * (10 - b) * (10 - b) * (1.1 - Math.cos(2 * Math.PI * b / 5));
            }

            @Override
            public double slope(double b) {
                double wave = 1.1 - Math.cos(2 * Math.PI * b / 5);
                return (10 - b) * (10 - 3 * b) * wave
                        + b * (10 - b) * (10 - b) * 2 * Math.PI / 5 * Math.sin(2 * Math.PI * b / 5);
            }

            @Override
            public double capacity() {
                return 10;
            }
        };
        double upper = 0;
        for (double b = 5; b < 10; b += 1e-5) {
            upper = Math.max(upper, humps.rate(b));
        }
        EquilibriumCurve curve = EquilibriumCurve.trace(humps, CONSTANT_CATCH);
        assertThat(curve.folds()).extracting(Fold::maximum).containsExactly(true, false, true);
        assertThat(curve.folds().get(0).harvest()).isGreaterThan(1.5 * upper);
        assertThat(curve.foldHarvest()).hasValueCloseTo(upper, withinPercentage(1e-7));
    }

    /** Dennis: u*(B) = r (1 − b) b/(b + d) is largest at b = √(d² + d) − d. */
    @ParameterizedTest
    @ValueSource(doubles = {1e-6, 1e-3, 0.1, 0.5})
    void depensationFoldsUnderConstantEffort(double d) {
        EquilibriumCurve curve = EquilibriumCurve.trace(new Depensation(SCHAEFER, d), new ConstantEffort());
        double state = Math.sqrt(d * d + d) - d;
        assertThat(curve.folds()).singleElement().satisfies(fold -> {
            assertThat(fold.biomassTonnes()).isCloseTo(1000 * state, withinPercentage(1e-7));
            assertThat(fold.harvest()).isCloseTo(0.4 * (1 - state) * state / (state + d), withinPercentage(1e-10));
        });
        assertThat(curve.branches()).extracting(Branch::stable).containsExactly(false, true);
    }

    /** B = r b (1 − b) K = u (B − B₀): the root of a quadratic, above the reserve whatever the harvest. */
    @ParameterizedTest
    @ValueSource(doubles = {0.01, 0.4, 5, 1000})
    void aReserveIsNeverFishedAway(double harvest) {
        EquilibriumCurve curve = EquilibriumCurve.trace(SCHAEFER, new Reserve(300));
        double half = (0.4 - harvest) / 0.8 * 1000;
        double expected = half + Math.sqrt(half * half + harvest * 300 / 0.4 * 1000);
        assertThat(curve.equilibria(harvest)).singleElement().satisfies(found -> {
            assertThat(found.biomassTonnes()).isCloseTo(expected, withinPercentage(1e-9));
            assertThat(found.stable()).isTrue();
        });
        assertThat(curve.folds()).isEmpty();
    }

    @Test
    void theRampTurnsACollapseIntoAHold() {
        EquilibriumCurve curve = EquilibriumCurve.trace(SCHAEFER, new PolicyRamp(200, 500));
        assertThat(curve.folds()).isEmpty();
        assertThat(curve.equilibria(0.16))
                .singleElement()
                .satisfies(found -> assertThat(found.biomassTonnes()).isCloseTo(600, withinPercentage(1e-10)));
        assertThat(curve.equilibria(50)).singleElement().satisfies(found -> {
            assertThat(found.biomassTonnes()).isBetween(200.0, 205.0);
            assertThat(found.stable()).isTrue();
        });
    }

    /** A rule that bites harder above 400 t: u* turns there from rising to falling with a corner. */
    @Test
    void aKinkCanBeAFold() {
        HarvestRule rule = new HarvestRule() {
            @Override
            public double effect(double biomass) {
                return biomass < 400 ? 400 : 400 + 20 * (biomass - 400);
            }

            @Override
            public double slope(double biomass) {
                return biomass < 400 ? 0 : 20;
            }

            @Override
            public double[] kinks() {
                return new double[] {400};
            }
        };
        EquilibriumCurve curve = EquilibriumCurve.trace(SCHAEFER, rule);
        assertThat(curve.folds()).containsExactly(new Fold(96.0 / 400, 400, true));
        assertThat(curve.branches()).extracting(Branch::stable).containsExactly(false, true);
    }

    @ParameterizedTest
    @MethodSource("laws")
    void everyPointIsAnEquilibriumAndItsSlopeAgreesWithItsBranch(GrowthLaw law, HarvestRule rule) {
        EquilibriumCurve curve = EquilibriumCurve.trace(law, rule);
        assertThat(curve.branches()).isNotEmpty();
        for (Branch branch : curve.branches()) {
            List<Point> points = branch.points();
            for (Point point : points) {
                double growth = law.rate(point.biomassTonnes());
                double removed = point.harvest() * rule.effect(point.biomassTonnes());
                assertThat(removed).isCloseTo(growth, within(1e-9 * Math.abs(growth) + 1e-13 * law.capacity()));
            }
            for (int i = 1; i < points.size(); i++) {
                assertThat(points.get(i).biomassTonnes())
                        .isGreaterThan(points.get(i - 1).biomassTonnes());
                double rise = points.get(i).harvest() - points.get(i - 1).harvest();
                assertThat(branch.stable() ? -rise : rise)
                        .isGreaterThanOrEqualTo(-1e-14 * points.get(i).harvest());
            }
        }
    }

    @ParameterizedTest
    @MethodSource("laws")
    void foundEquilibriaAreEquilibriaAndEigenvaluesAgreeWithStability(GrowthLaw law, HarvestRule rule) {
        EquilibriumCurve curve = EquilibriumCurve.trace(law, rule);
        double top = curve.foldHarvest().orElse(0.35);
        Random random = new Random(5);
        for (int i = 0; i < 20; i++) {
            double harvest = top * random.nextDouble();
            List<Equilibrium> found = curve.equilibria(harvest);
            assertThat(found).isNotEmpty();
            for (Equilibrium each : found) {
                double growth = law.rate(each.biomassTonnes());
                assertThat(harvest * rule.effect(each.biomassTonnes()))
                        .isCloseTo(growth, within(1e-9 * growth + 1e-13 * law.capacity()));
                assertThat(each.eigenvalue() < 0).isEqualTo(each.stable());
            }
        }
    }

    /** Started a little above and below, a flow returns to a stable equilibrium and leaves any other. */
    @ParameterizedTest
    @MethodSource("laws")
    void theFlowDoesWhatStabilitySays(GrowthLaw law, HarvestRule rule) {
        EquilibriumCurve curve = EquilibriumCurve.trace(law, rule);
        double harvest = 0.8 * curve.foldHarvest().orElse(0.35);
        Flow flow = new IntegratedFlow(law, rule, harvest);
        for (Equilibrium each : curve.equilibria(harvest)) {
            for (double shift : new double[] {-1e-3, 1e-3}) {
                double start = each.biomassTonnes() * (1 + shift);
                double end = flow.after(start, 0.1 * each.returnTimeYears());
                double before = Math.abs(start - each.biomassTonnes());
                double after = Math.abs(end - each.biomassTonnes());
                assertThat(after / before).isCloseTo(Math.exp(each.stable() ? -0.1 : 0.1), withinPercentage(1));
            }
        }
    }

    /**
     * Small disturbances once a year: the lag-1 autocorrelation is exp(λΔt) (Scheffer et al. 2009). The estimate over
     * 40,000 years has a standard error of √((1 − ρ²)/40,000); five of them alarm falsely with probability 6e-7 per case.
     */
    @ParameterizedTest
    @ValueSource(doubles = {50, 75, 96})
    void smallDisturbancesAreCorrelatedAsTheEigenvalueSays(double removals) {
        Equilibrium upper = EquilibriumCurve.trace(SCHAEFER, CONSTANT_CATCH)
                .equilibria(removals)
                .get(1);
        Flow flow = new ConstantRemovals(SCHAEFER, removals);
        Random random = new Random(20090903);
        int years = 40_000;
        double biomass = upper.biomassTonnes();
        double products = 0;
        double squares = 0;
        for (int year = 0; year < years; year++) {
            double before = biomass - upper.biomassTonnes();
            biomass = flow.after(biomass, 1) + 1e-3 * random.nextGaussian();
            products += before * (biomass - upper.biomassTonnes());
            squares += before * before;
        }
        double expected = Math.exp(upper.eigenvalue());
        double standardError = Math.sqrt((1 - expected * expected) / years);
        assertThat(products / squares).isCloseTo(expected, within(5 * standardError));
    }

    @ParameterizedTest
    @MethodSource("laws")
    void aFinerGridFindsTheSameFolds(GrowthLaw law, HarvestRule rule) {
        List<Fold> coarse = EquilibriumCurve.trace(law, rule, 100).folds();
        List<Fold> fine = EquilibriumCurve.trace(law, rule, 3000).folds();
        assertThat(coarse).hasSameSizeAs(fine);
        for (int i = 0; i < fine.size(); i++) {
            assertThat(coarse.get(i).harvest()).isCloseTo(fine.get(i).harvest(), withinPercentage(1e-9));
            assertThat(coarse.get(i).biomassTonnes()).isCloseTo(fine.get(i).biomassTonnes(), withinPercentage(1e-6));
        }
    }

    @Test
    void tinyHarvestsHaveTinyTippingPoints() {
        EquilibriumCurve curve = EquilibriumCurve.trace(SCHAEFER, CONSTANT_CATCH);
        assertThat(curve.tippingBiomass(1e-6)).hasValueCloseTo(1e-6 / 0.4, withinPercentage(1e-5));
        assertThat(curve.tippingBiomass(0)).isEmpty();
    }

    @Test
    void rejectsBadValues() {
        EquilibriumCurve curve = EquilibriumCurve.trace(SCHAEFER, CONSTANT_CATCH);
        assertThatThrownBy(() -> curve.equilibria(-1))
                .isInstanceOf(IllegalArgumentException.class)
                .hasMessage("0 <= harvest < infinity is violated: harvest = -1.0");
        assertThatThrownBy(() -> EquilibriumCurve.trace(SCHAEFER, CONSTANT_CATCH, 1))
                .hasMessageContaining("cells = 1");
    }
}
