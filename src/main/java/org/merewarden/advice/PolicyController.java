package org.merewarden.advice;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** The rule in words, its versions, and adopting or refusing one. */
@Controller
class PolicyController {
    private final Policies policies;
    private final PolicyPages pages;
    private final PolicyTrials trials;
    private final PolicyTrialPages trialPages;
    private final PolicyWords words;

    PolicyController(
            Policies policies, PolicyPages pages, PolicyTrials trials, PolicyTrialPages trialPages, PolicyWords words) {
        this.policies = policies;
        this.pages = pages;
        this.trials = trials;
        this.trialPages = trialPages;
        this.words = words;
    }

    @GetMapping("/policy")
    String show(Model model) {
        List<PolicyVersion> all = policies.all();
        model.addAttribute("page", pages.page(all, Policies.inForce(all), null));
        model.addAttribute("versions", pages.rows(all));
        return "advice/policy";
    }

    /** @param against the version to compare with */
    @GetMapping("/policy/{number}")
    String version(@PathVariable int number, @RequestParam(required = false) @Nullable Integer against, Model model) {
        List<PolicyVersion> all = policies.all();
        PolicyVersion version = Policies.find(all, number);
        model.addAttribute("page", pages.page(all, version, against == null ? null : Policies.find(all, against)));
        model.addAttribute("trial", trialPages.page(number));
        return "advice/policy-version";
    }

    @PostMapping("/policy/{number}/trial")
    String tryOut(@PathVariable int number, RedirectAttributes redirect) {
        return act(number, "policy.trial.queued", redirect, () -> trials.start(number));
    }

    @PostMapping("/policy/{number}/adopt")
    String adopt(
            @PathVariable int number, @RequestParam(defaultValue = "") String reason, RedirectAttributes redirect) {
        return act(number, "policy.adopted", redirect, () -> policies.adopt(number, reason.strip()));
    }

    @PostMapping("/policy/{number}/refuse")
    String refuse(
            @PathVariable int number, @RequestParam(defaultValue = "") String reason, RedirectAttributes redirect) {
        return act(number, "policy.refused", redirect, () -> policies.refuse(number, reason.strip()));
    }

    private String act(int number, String doneKey, RedirectAttributes redirect, Runnable act) {
        String name = Integer.toString(number);
        try {
            act.run();
            redirect.addFlashAttribute("done", words.word(doneKey, name));
        } catch (NotAllowed e) {
            redirect.addFlashAttribute("refused", words.word(String.valueOf(e.getMessage()), name));
        }
        return "redirect:/policy/" + number;
    }
}
