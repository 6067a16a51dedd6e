package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.List;
import org.apache.commons.math3.analysis.solvers.BrentSolver;
import org.junit.jupiter.api.Test;
import org.merewarden.core.dynamics.ConstantMortality;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.inference.statespace.ModeSearch.Fit;

class HindcastTest {
    /** By hand: mean |e| 0.2, mean change (0.4 + 0.2)/2 = 0.3. */
    @Test
    void theScaledErrorByHand() {
        double[] before = {0, 0.4, 0.2};
        assertThat(Hindcast.scaledError(new double[] {0.1, -0.2, 0.3}, before)).isEqualTo(2 / 3.0, offset(1e-12));
        assertThat(Hindcast.scaledError(new double[] {0.1, -0.2}, before)).isNull();
        assertThat(Hindcast.scaledError(new double[] {0.1, -0.2, 0.3}, new double[] {1, 1, 1}))
                .isNull();
        assertThat(Hindcast.scaledError(new double[] {0.1, -0.2, 0.3}, new double[] {1}))
                .isNull();
        assertThat(Hindcast.scaledError(new double[] {0, 0, 0}, before)).isZero();
    }

    /**
     * The first peel's prediction worked again with the dynamics package: its biomass under the F, found by root search,
     * that yields the recorded catch.
     */
    @Test
    void aPredictionIsTheFlowUnderTheRecordedCatch() {
        Evidence evidence = Simulated.of(Simulated.Regime.RICH, 7).evidence;
        StateSpaceFit fit = fit(evidence, Simulated.LAST);
        ModeSearch search = new ModeSearch(fit);
        Fit full = search.ofAll().orElseThrow();
        List<Fit> peels = Peels.of(evidence, fit.priors(), search, full).fits();
        ValuesOfSeries nets = ValuesOfSeries.of(fit.data()).get(0);
        double[] errors = new Hindcast(full, fit.priors(), peels).errors(nets);
        assertThat(errors).hasSize(5);

        Fit peel = peels.get(0);
        int next = peel.data().seasons();
        SurplusProduction law = SurplusProduction.fromReferencePoints(
                peel.msyTonnes(), Math.exp(peel.theta()[OuterParameters.FMSY]), 1);
        double biomass = peel.biomassTonnes(next);
        double caught = evidence.removals(Simulated.LAST).getAsDouble();
        double f = new BrentSolver(1e-13)
                .solve(200, rate -> new ConstantMortality(law, rate).removals(biomass, 1) - caught, 1e-6, 3);
        Series series = peel.data().series().get(0);
        double q = Math.exp(peel.path().logQ()[0][0] + series.logMean())
                / peel.data().unitTonnes();
        SurveyRecord last = evidence.surveys().get(evidence.surveys().size() - 1);
        double expected = Math.log(q * new ConstantMortality(law, f).after(biomass, 0.5));
        assertThat(last.year()).isEqualTo(Simulated.LAST);
        assertThat(errors[4]).isEqualTo(Math.log(last.value()) - expected, offset(1e-9));
    }

    @Test
    void whatIsBelowDetectionOrHasNoSeriesIsNotPredicted() {
        Cases cases = Cases.albacore(0.1);
        cases.surveys.removeIf(s -> s.year() == 1988);
        cases.index("longline", 1988, 0, 0).index("late", 1988, 0.5, 3).index("late", 1989, 0.5, 3.5);
        StateSpaceFit fit = fit(cases.evidence(), 1989);
        ModeSearch search = new ModeSearch(fit);
        Fit full = search.ofAll().orElseThrow();
        List<Fit> peels = Peels.of(cases.evidence(), fit.priors(), search, full).fits();
        Hindcast hindcast = new Hindcast(full, fit.priors(), peels);
        List<ValuesOfSeries> series = ValuesOfSeries.of(fit.data());
        assertThat(series).extracting(ValuesOfSeries::name).containsExactly("late", "longline");
        assertThat(hindcast.errors(series.get(0))).isEmpty();
        assertThat(hindcast.errors(series.get(1))).hasSize(4);
        assertThat(hindcast.scaledError(series.get(0))).isNull();
    }

    static StateSpaceFit fit(Evidence evidence, int last) {
        ModelPriors priors = ModelPriors.of(evidence);
        return StateSpaceFit.of(SeasonData.of(evidence, last, priors), priors, 1);
    }
}
