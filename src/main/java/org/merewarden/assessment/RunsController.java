package org.merewarden.assessment;

import org.jspecify.annotations.Nullable;
import org.merewarden.jobs.Jobs;
import org.merewarden.waterbody.Register;
import org.merewarden.web.NotFound;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** The region's runs: start, progress, stop, and what became of each stock. */
@Controller
class RunsController {
    private static final String BACK = "redirect:/assessments";

    private final AssessmentRuns runs;
    private final RunsPages pages;
    private final Jobs jobs;
    private final Register register;
    private final Texts texts;

    RunsController(AssessmentRuns runs, RunsPages pages, Jobs jobs, Register register, Texts texts) {
        this.runs = runs;
        this.pages = pages;
        this.jobs = jobs;
        this.register = register;
        this.texts = texts;
    }

    /** @param run the run whose stocks are listed; the latest where none is named */
    @GetMapping("/assessments")
    String list(@RequestParam(required = false) @Nullable Long run, Model model) {
        model.addAttribute("page", pages.page(run));
        return "assessment/runs";
    }

    @PostMapping("/assessments")
    String start(RedirectAttributes redirect) {
        if (register.stocks().isEmpty()) {
            redirect.addFlashAttribute("refused", texts.get("noStocks"));
        } else {
            runs.startAll();
            redirect.addFlashAttribute("done", texts.get("queued"));
        }
        return BACK;
    }

    @PostMapping("/assessments/{id}/cancel")
    String cancel(@PathVariable long id, RedirectAttributes redirect) {
        runs.cancel(jobs.find(id).orElseThrow(() -> new NotFound("job " + id)));
        redirect.addFlashAttribute("done", texts.get("stopping"));
        return BACK;
    }
}
