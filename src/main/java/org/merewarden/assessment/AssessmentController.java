package org.merewarden.assessment;

import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.TreeMap;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.springframework.context.MessageSource;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** The page of one stored assessment. */
@Controller
class AssessmentController {
    private final AssessmentRuns runs;
    private final Assessments assessments;
    private final Register register;
    private final MessageSource messages;

    AssessmentController(
            AssessmentRuns runs, Assessments assessments, Register register, MessageSource messages) {
        this.runs = runs;
        this.assessments = assessments;
        this.register = register;
        this.messages = messages;
    }

    /** One quantity with its 10, 50 and 90 % quantiles. */
    record Quantity(String name, String interval) {}

    /** One season's biomass and fishing. */
    record Season(int year, String biomass, String ratio, String fishing) {}

    record Detail(
            String title,
            String stockPath,
            int number,
            boolean settled,
            List<String> verdict,
            String method,
            String strength,
            String seasons,
            String madeAt,
            String madeBy,
            String evidenceHash,
            int draws,
            List<Quantity> quantities,
            Map<String, String> estimates,
            List<Season> years) {}

    @PostMapping("/stocks/{lake}/{species}/assessments")
    String startOne(
            @PathVariable String lake, @PathVariable String species, RedirectAttributes redirect, Locale locale) {
        StockView stock = stock(lake, species);
        runs.start(List.of(stock));
        redirect.addFlashAttribute("done", messages.getMessage("assessment.queued", null, locale));
        return "redirect:" + stock.path();
    }

    @GetMapping("/stocks/{lake}/{species}/assessments/{number}")
    String show(@PathVariable String lake, @PathVariable String species, @PathVariable int number, Model model) {
        StockView stock = stock(lake, species);
        AssessmentView view = assessments
                .find(stock.id(), number)
                .orElseThrow(() -> new NotFound("assessment " + number + " of " + stock.title()));
        model.addAttribute("page", detail(stock, view, assessments.posterior(view.id())));
        return "assessment/assessment";
    }

    private StockView stock(String lake, String species) {
        return register.stock(lake, species).orElseThrow(() -> new NotFound("stock " + lake + "/" + species));
    }

    private static Detail detail(StockView stock, AssessmentView view, Posterior posterior) {
        return new Detail(
                stock.title(),
                stock.path(),
                view.number(),
                view.settled(),
                view.verdict(),
                view.method(),
                view.strength().toLowerCase(Locale.ROOT),
                posterior.seasons() == 0 ? "" : posterior.firstYear() + "–" + posterior.lastYear(),
                Figures.dateTime(view.madeAt()),
                view.madeBy(),
                view.evidenceHash(),
                posterior.draws(),
                quantities(posterior),
                estimates(posterior),
                years(posterior));
    }

    private static List<Quantity> quantities(Posterior p) {
        if (p.draws() == 0) {
            return List.of();
        }
        return List.of(
                quantity("msy_t", p, i -> p.msyTonnes()[i]),
                quantity("fmsy", p, i -> p.fmsyPerYear()[i]),
                quantity("k_t", p, p::capacity),
                quantity("bmsy_t", p, p::bmsy),
                quantity("biomass_t", p, p::presentBiomass),
                quantity("b_over_bmsy", p, i -> p.presentBiomass(i) / p.bmsy(i)));
    }

    private static Quantity quantity(String name, Posterior posterior, IntToDoubleFunction ofDraw) {
        return new Quantity(name, interval(posterior, ofDraw));
    }

    private static String interval(Posterior posterior, IntToDoubleFunction ofDraw) {
        double[] values =
                IntStream.range(0, posterior.draws()).mapToDouble(ofDraw).toArray();
        double[] q = Quantiles.of(values, new double[] {0.1, 0.5, 0.9});
        return Figures.interval(q[1], q[0], q[2]);
    }

    private static Map<String, String> estimates(Posterior posterior) {
        Map<String, String> sorted = new TreeMap<>();
        posterior.estimates().forEach((name, value) -> sorted.put(name, Figures.digits(value, 6)));
        return sorted;
    }

    private static List<Season> years(Posterior p) {
        if (p.draws() == 0) {
            return List.of();
        }
        return IntStream.rangeClosed(0, p.seasons())
                .mapToObj(t -> new Season(
                        p.firstYear() + t,
                        interval(p, i -> p.biomassTonnes()[i][t]),
                        interval(p, i -> p.biomassTonnes()[i][t] / p.bmsy(i)),
                        t == p.seasons() ? Figures.UNKNOWN : interval(p, i -> p.fishingPerYear()[i][t])))
                .toList();
    }
}
