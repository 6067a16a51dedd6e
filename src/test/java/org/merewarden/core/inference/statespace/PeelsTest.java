package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.Objects;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.CheckBounds;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Peel;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.statespace.ModeSearch.Fit;

class PeelsTest {
    /** By hand: (0.2 − 0.1 + 0)/3. */
    @Test
    void mohnsRhoByHand() {
        assertThat(Peels.mohnsRho(new double[] {12, 9, 0}, new double[] {10, 10, 0}))
                .isEqualTo(0.1 / 3, offset(1e-12));
        assertThat(Peels.mohnsRho(new double[] {1.5, 3}, new double[] {1, 2})).isEqualTo(0.5, offset(1e-12));
        assertThat(Peels.mohnsRho(new double[0], new double[0])).isNaN();
    }

    private static Peels peels(Evidence evidence, int last) {
        StateSpaceFit fit = HindcastTest.fit(evidence, last);
        ModeSearch search = new ModeSearch(fit);
        return Peels.of(evidence, fit.priors(), search, search.ofAll().orElseThrow());
    }

    /** A peel is what the records of that year alone lead to: a search of its own, from the prior medians. */
    @Test
    void aPeelIsTheModeOfTheRecordsOfThatYear() {
        Evidence evidence = Cases.albacoreReference().evidence();
        ModelPriors priors = ModelPriors.of(evidence);
        Peels peels = peels(evidence, 1989);
        Retrospective retrospective = Objects.requireNonNull(peels.retrospective());
        assertThat(retrospective.peels())
                .extracting(Peel::lastYear)
                .containsExactly(1989, 1988, 1987, 1986, 1985, 1984);
        for (Fit peel : peels.fits()) {
            int last = peel.data().firstYear() + peel.data().seasons() - 1;
            SeasonData data = SeasonData.of(evidence, last, priors);
            OuterParameters outer = new OuterParameters(priors, data);
            Marginal marginal = new Marginal(data, priors, outer);
            double[] middle = new double[outer.dimension()];
            marginal.explore(middle);
            OuterMode own = new OuterMode(marginal::evaluate, middle);
            double[] theta = new double[outer.size()];
            outer.natural(own.mode(), theta);
            assertThat(data.seasons()).isEqualTo(peel.data().seasons());
            for (int k = 0; k < theta.length; k++) {
                assertThat(peel.theta()[k]).isEqualTo(theta[k], offset(0.02));
            }
        }
        Peel second = retrospective.peels().get(1);
        Peel full = retrospective.peels().get(0);
        assertThat(second.biomassTonnes()).hasSize(22);
        assertThat(full.biomassTonnes()).hasSize(23);
        double sum = 0;
        for (Peel peel : retrospective.peels().subList(1, 6)) {
            int t = peel.relativeBiomass().size() - 1;
            sum += peel.relativeBiomass().get(t) / full.relativeBiomass().get(t) - 1;
        }
        assertThat(retrospective.rhoRelativeBiomass()).isEqualTo(sum / 5, offset(1e-12));
    }

    @Test
    void fewerThanEightSeasonsAreNotPeeled() {
        assertThat(peels(seasons(7, 1).evidence(), 2006).retrospective()).isNull();
        assertThat(Objects.requireNonNull(peels(seasons(8, 1).evidence(), 2007).retrospective())
                        .peels())
                .hasSize(3);
    }

    /** Four silent years at the end: the peels take away seasons that have records. */
    @Test
    void silentYearsAreNotPeeled() {
        Retrospective retrospective =
                Objects.requireNonNull(peels(seasons(20, 1).evidence(), 2023).retrospective());
        assertThat(retrospective.peels())
                .extracting(Peel::lastYear)
                .containsExactly(2023, 2018, 2017, 2016, 2015, 2014);
    }

    /** Catch 10 t/yr and an index around 1, which in the last two seasons stands at {@code end}. */
    private static Cases seasons(int count, double end) {
        Cases cases = new Cases().own("msy_t", 15, 0.6).own("fmsy", 0.2, 0.4);
        SplittableRandom random = new SplittableRandom(3);
        for (int t = 0; t < count; t++) {
            double value = (t < count - 2 ? 1 : end) * Math.exp(0.1 * random.nextGaussian());
            cases.caught(2000 + t, 10, 0.1).index("nets", 2000 + t, 0.5, value);
        }
        return cases;
    }

    /** A change of regime at the end is what the earlier assessments did not foresee. */
    @Test
    void aChangeOfRegimeShowsInThePeels() {
        Diagnostics steady = diagnostics(seasons(20, 1).evidence());
        Diagnostics changed = diagnostics(seasons(20, 0.25).evidence());
        assertThat(Objects.requireNonNull(steady.retrospective()).rhoRelativeBiomass())
                .isBetween(-0.1, 0.1);
        assertThat(Objects.requireNonNull(changed.retrospective()).rhoRelativeBiomass())
                .isGreaterThan(CheckBounds.LARGEST_RHO);
        assertThat(FailedChecks.of(steady)).noneMatch(s -> s.contains("Mohn"));
        assertThat(FailedChecks.of(changed)).anyMatch(s -> s.contains("Mohn"));
    }

    private static Diagnostics diagnostics(Evidence evidence) {
        return StateSpaceDiagnostics.of(HindcastTest.fit(evidence, 2019), evidence);
    }
}
