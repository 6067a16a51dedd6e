package org.merewarden.portfolio;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.web.Point;

class StockCurveTest {
    private final Entry entry = Made.entry(
            Made.stock(1, "alder", "pike", "North"),
            Made.assessment(1, 20, 1.0, "FAIR"),
            Made.standing(1, "WATCH", 0.4),
            Made.catchLimit(1, 12),
            null);

    private StockCurve curve(double shape) {
        return StockCurve.of(entry, entry.assessment(), Made.posterior(20, 0.25, shape, 6));
    }

    /** g(B) of the Graham–Schaefer law written out: r B (1 − B/K) with r = 2 FMSY, K = 2 MSY/FMSY. */
    private static double schaefer(SurplusProduction law, double b) {
        double k = 2 * law.msy() / law.fmsy();
        return 2 * law.fmsy() * b * (1 - b / k);
    }

    @Test
    void pointsOfTheCurveAreEquilibria() {
        StockCurve curve = curve(1);
        for (Point p : curve.stable()) {
            assertThat(p.x()).isCloseTo(schaefer(curve.law(), p.y()), within(1e-9 * 20));
        }
        for (Point p : curve.unstable()) {
            assertThat(p.x()).isCloseTo(schaefer(curve.law(), p.y()), within(1e-9 * 20));
        }
    }

    @Test
    void theFoldParts_stableAboveAndUnstableBelow() {
        StockCurve curve = curve(1);
        double bmsy = curve.law().msy() / curve.law().fmsy();
        assertThat(curve.fold().y()).isCloseTo(bmsy, within(1e-6));
        assertThat(curve.stable()).allMatch(p -> p.y() >= bmsy * (1 - 1e-9));
        assertThat(curve.unstable()).allMatch(p -> p.y() <= bmsy * (1 + 1e-9));
        assertThat(curve.stable())
                .extracting(Point::x)
                .allMatch(x -> x <= curve.fold().x() * (1 + 1e-9));
    }

    @Test
    void theLawIsThatOfTheMedians() {
        assertThat(curve(1).law().msy()).isCloseTo(20, within(0.6));
        assertThat(curve(0).law().bmsy() / curve(0).law().capacityTonnes()).isCloseTo(1 / Math.E, within(1e-12));
    }

    @Test
    void presentCatchIsTheLastSeasonsUnderTheDrawsF() {
        // at B = BMSY and F = FMSY the stock stays where it is, so every draw takes its own MSY
        StockCurve curve = curve(1);
        assertThat(curve.catchNow().mid()).isCloseTo(curve.law().msy(), within(1e-9));
        assertThat(curve.cloud()).hasSizeBetween(40, 60);
    }

    @Test
    void withoutASeasonTheRecordedRemovalsStand() {
        StockCurve curve = StockCurve.of(entry, entry.assessment(), Made.posterior(20, 0.25, 1, 0));
        assertThat(curve.catchNow().mid()).isEqualTo(0.9 * 20);
        assertThat(curve.biomassNow().low80()).isLessThan(curve.biomassNow().high80());
    }

    @ParameterizedTest
    @EnumSource(Axes.class)
    void scalesAxes(Axes axes) {
        StockCurve curve = curve(1);
        Diagram.Series s =
                Diagram.of(List.of(curve), axes, 0, "x", "y", null).stocks().get(0);
        double[] expected = switch (axes) {
            case SHARE -> new double[] {1, 0.5};
            case HECTARE -> new double[] {curve.law().msy(), curve.law().bmsy()};
            case ABSOLUTE -> new double[] {curve.law().msy(), curve.law().bmsy()};
        };
        // the lake has 1,000 ha, so kg/ha and t are the same figures
        assertThat(s.fold().x()).isCloseTo(expected[0], within(1e-3));
        assertThat(s.fold().y()).isCloseTo(expected[1], within(1e-2));
    }

    @Test
    void arrowsPointUpBetweenTheBranchesAndDownOutside() {
        StockCurve curve = curve(1);
        Diagram diagram = Diagram.of(List.of(curve), Axes.SHARE, 0, "x", "y", null);
        List<Diagram.Arrow> arrows = diagram.stocks().get(0).arrows();
        assertThat(arrows).isNotEmpty();
        for (Diagram.Arrow a : arrows) {
            // in shares of MSY and K the Graham–Schaefer curve is 4 b (1 − b)
            assertThat(a.up()).isEqualTo(4 * a.y() * (1 - a.y()) > a.x());
        }
        assertThat(arrows).anyMatch(Diagram.Arrow::up).anyMatch(a -> !a.up());
    }

    @Test
    void onlyTheStockInFocusCarriesArrowsBandAndCloud() {
        Diagram diagram = Diagram.of(List.of(curve(1), curve(0)), Axes.SHARE, 1, "x", "y", null);
        assertThat(diagram.stocks().get(0).arrows()).isEmpty();
        assertThat(diagram.stocks().get(0).cloud()).isEmpty();
        assertThat(diagram.stocks().get(1).arrows()).isNotEmpty();
        assertThat(diagram.stocks().get(1).band()).isNotEmpty();
    }

    @Test
    void theDrawingHoldsBothBranchesTheFoldAndTheLimit() {
        Diagram diagram = Diagram.of(List.of(curve(1)), Axes.ABSOLUTE, 0, "Catch", "Biomass", null);
        assertThat(DiagramDrawing.large(diagram, "A < B"))
                .contains("class=\"stable line0\"")
                .contains("stroke-dasharray=\"6 4\" class=\"unstable line0\"")
                .contains("class=\"fold line0\"")
                .contains("class=\"limit line0\"")
                .contains("<title>A &lt; B</title>")
                .doesNotContain("NaN")
                .doesNotContain("style=");
    }
}
