package org.merewarden.assessment;

import java.util.List;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.NotFound;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** The assessments of one stock. */
@Controller
class AssessmentController {
    private final AssessmentRuns runs;
    private final Assessments assessments;
    private final AssessmentPages pages;
    private final Register register;
    private final Texts texts;

    AssessmentController(
            AssessmentRuns runs, Assessments assessments, AssessmentPages pages, Register register, Texts texts) {
        this.runs = runs;
        this.assessments = assessments;
        this.pages = pages;
        this.register = register;
        this.texts = texts;
    }

    @PostMapping("/stocks/{lake}/{species}/assessments")
    String start(@PathVariable String lake, @PathVariable String species, RedirectAttributes redirect) {
        StockView stock = stock(lake, species);
        runs.start(List.of(stock));
        redirect.addFlashAttribute("done", texts.get("queued"));
        return "redirect:" + stock.path();
    }

    @GetMapping("/stocks/{lake}/{species}/assessments/{number}")
    String show(@PathVariable String lake, @PathVariable String species, @PathVariable int number, Model model) {
        StockView stock = stock(lake, species);
        AssessmentView view = assessments
                .find(stock.id(), number)
                .orElseThrow(() -> new NotFound("assessment " + number + " of " + stock.title()));
        model.addAttribute("page", pages.page(stock, view));
        return "assessment/assessment";
    }

    private StockView stock(String lake, String species) {
        return register.stock(lake, species).orElseThrow(() -> new NotFound("stock " + lake + "/" + species));
    }
}
