package org.merewarden.core.dynamics;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;
import static org.assertj.core.api.Assertions.withinPercentage;

import java.util.ArrayList;
import java.util.List;
import java.util.Random;
import java.util.stream.Stream;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.MethodSource;

/** What every flow obeys, closed or integrated: one suite, run for each; seeds fixed. */
class FlowLawsTest {
    private static final double PERCENT = 100;

    /** A flow, the same flow at 1000 times the scale, and its accuracy. */
    record Case(String name, double capacity, Flow flow, Flow scaled, double accuracy) {
        @Override
        public String toString() {
            return name;
        }
    }

    static Stream<Case> cases() {
        Random random = new Random(90125);
        List<Case> cases = new ArrayList<>();
        double[] shapes = {0, 1e-9, 0.188115, 0.5, 1, 2, 4};
        for (int i = 0; i < 21; i++) {
            double shape = shapes[i % shapes.length];
            double r = 0.1 + 1.2 * random.nextDouble();
            double capacity = Math.pow(10, -2 + 8 * random.nextDouble());
            SurplusProduction law = new SurplusProduction(r, capacity, shape);
            SurplusProduction large = new SurplusProduction(r, 1000 * capacity, shape);
            double mortality = 1.5 * law.fmsy() * random.nextDouble();
            double removals = 1.4 * law.msy() * random.nextDouble();
            cases.add(of("mortality", law, large, new ConstantEffort(), new ConstantEffort(), mortality, mortality));
            cases.add(of("removals", law, large, new ConstantCatch(), new ConstantCatch(), removals, 1000 * removals));
            HarvestRule ramp = new PolicyRamp(0.2 * law.bmsy(), law.bmsy());
            HarvestRule largeRamp = new PolicyRamp(0.2 * large.bmsy(), large.bmsy());
            cases.add(of("ramp", law, large, ramp, largeRamp, mortality, mortality));
            HarvestRule reserve = new Reserve(0.3 * capacity);
            HarvestRule largeReserve = new Reserve(300 * capacity);
            cases.add(of("reserve", law, large, reserve, largeReserve, mortality, mortality));
            Depensation weak = new Depensation(law, 0.1);
            Depensation largeWeak = new Depensation(large, 0.1);
            cases.add(of(
                    "depensation", weak, largeWeak, new ConstantEffort(), new ConstantEffort(), mortality, mortality));
        }
        return cases.stream();
    }

    private static Case of(
            String name,
            GrowthLaw law,
            GrowthLaw large,
            HarvestRule rule,
            HarvestRule largeRule,
            double u,
            double largeU) {
        Flow flow = Flow.of(law, rule, u);
        double accuracy = flow instanceof IntegratedFlow ? 1e-7 : 1e-9;
        return new Case(name + " " + flow, law.capacity(), flow, Flow.of(large, largeRule, largeU), accuracy);
    }

    @ParameterizedTest
    @MethodSource("cases")
    void stepsCompose(Case subject) {
        Random random = new Random(17);
        for (int i = 0; i < 8; i++) {
            double start = 1.5 * subject.capacity() * random.nextDouble();
            double first = 10 * random.nextDouble();
            double second = 10 * random.nextDouble();
            double whole = subject.flow().after(start, first + second);
            double stepped = subject.flow().after(subject.flow().after(start, first), second);
            // a stock about to run out is its removals times the time left, so its relative error is not bounded
            double floor = 1e-3 * subject.accuracy() * subject.capacity();
            assertThat(stepped).isCloseTo(whole, within(subject.accuracy() * whole + floor));
        }
    }

    @ParameterizedTest
    @MethodSource("cases")
    void scalesWithCapacity(Case subject) {
        for (double state : new double[] {0.05, 0.4, 1, 1.3}) {
            double start = state * subject.capacity();
            double plain = subject.flow().after(start, 4);
            assertThat(subject.scaled().after(1000 * start, 4))
                    .isCloseTo(1000 * plain, within(subject.accuracy() * 1000 * (plain + 1e-3 * subject.capacity())));
            double gone = subject.flow().extinctionTime(start);
            if (Double.isFinite(gone)) {
                assertThat(subject.scaled().extinctionTime(1000 * start))
                        .isCloseTo(gone, withinPercentage(subject.accuracy() * PERCENT));
            } else {
                assertThat(subject.scaled().extinctionTime(1000 * start)).isInfinite();
            }
        }
    }

    @ParameterizedTest
    @MethodSource("cases")
    void moreStaysMoreAndNothingIsNegative(Case subject) {
        double below = 0;
        for (double state = 0.05; state < 1.6; state += 0.1) {
            double end = subject.flow().after(state * subject.capacity(), 5);
            assertThat(end)
                    .isGreaterThanOrEqualTo(below * (1 - subject.accuracy()))
                    .isFinite();
            below = end;
        }
    }

    @ParameterizedTest
    @MethodSource("cases")
    void timeRunsOutWhenTheFlowSaysSo(Case subject) {
        double start = 0.3 * subject.capacity();
        double gone = subject.flow().extinctionTime(start);
        if (Double.isInfinite(gone)) {
            assertThat(subject.flow().after(start, 50)).isPositive();
        } else {
            assertThat(subject.flow().after(start, gone * (1 - 1e-5))).isPositive();
            assertThat(subject.flow().after(start, gone * (1 + 1e-5))).isZero();
        }
    }
}
