package org.merewarden.assessment;

import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.OlderEstimators;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;

/**
 * The older estimators on the evidence of one assessment, with the refits behind their ranges. They are worked out when
 * the page is opened, from the stored evidence and its hash, so that the page says the same whenever it is read.
 */
@Controller
class OlderEstimatorsController {
    private final Assessments assessments;
    private final Register register;

    OlderEstimatorsController(Assessments assessments, Register register) {
        this.assessments = assessments;
        this.register = register;
    }

    /** A quantity: the best fit, and the middle 80 % of the refits (blank where there are none). */
    record Row(String name, String estimate, String range) {}

    record Detail(
            String title,
            String stockPath,
            int number,
            List<Row> difference,
            List<String> said,
            List<Row> regressions) {}

    @GetMapping("/stocks/{lake}/{species}/assessments/{number}/older-estimators")
    String show(@PathVariable String lake, @PathVariable String species, @PathVariable int number, Model model) {
        StockView stock =
                register.stock(lake, species).orElseThrow(() -> new NotFound("stock " + lake + "/" + species));
        AssessmentView view = assessments
                .find(stock.id(), number)
                .orElseThrow(() -> new NotFound("assessment " + number + " of " + stock.title()));
        model.addAttribute("page", detail(stock, view, assessments.evidence(view.id())));
        return "assessment/older";
    }

    private static Detail detail(StockView stock, AssessmentView view, Evidence evidence) {
        Map<String, Double> points = OlderEstimators.of(evidence, view.lastYear());
        List<Row> regressions = new TreeMap<>(points)
                .entrySet().stream()
                        .filter(e -> !e.getKey().startsWith("difference_"))
                        .map(e -> new Row(e.getKey(), Figures.digits(e.getValue(), 6), ""))
                        .toList();
        return OlderEstimators.differenceEquation(evidence, view.lastYear(), evidence.seed())
                .map(fit -> new Detail(
                        stock.title(),
                        stock.path(),
                        view.number(),
                        difference(fit),
                        fit.verdict().reasons(),
                        regressions))
                .orElse(new Detail(stock.title(), stock.path(), view.number(), List.of(), List.of(), regressions));
    }

    private static List<Row> difference(Posterior fit) {
        return new TreeMap<>(fit.estimates())
                .entrySet().stream()
                        .map(e -> new Row(
                                "difference_" + e.getKey(),
                                Figures.digits(e.getValue(), 6),
                                fit.draws() == 0 ? "" : range(fit, e.getKey())))
                        .toList();
    }

    private static String range(Posterior fit, String quantity) {
        double[] values = new double[fit.draws()];
        for (int i = 0; i < values.length; i++) {
            values[i] = switch (quantity) {
                case "msy_t" -> fit.msyTonnes()[i];
                case "fmsy" -> fit.fmsyPerYear()[i];
                case "r" -> fit.fmsyPerYear()[i] * (1 + fit.shape()[i]);
                case "k_t" -> fit.capacity(i);
                default -> Double.NaN;
            };
        }
        if (Double.isNaN(values[0])) {
            return "";
        }
        double[] q = Quantiles.of(values, new double[] {0.1, 0.9});
        return Figures.sig(q[0]) + "–" + Figures.sig(q[1]);
    }
}
