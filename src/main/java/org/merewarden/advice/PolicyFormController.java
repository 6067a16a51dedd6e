package org.merewarden.advice;

import jakarta.servlet.http.HttpServletResponse;
import java.util.Arrays;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.Choice;
import org.merewarden.web.FormBinding;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.WebDataBinder;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.InitBinder;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Proposing a version of the rule. */
@Controller
class PolicyFormController {
    private static final String FORM = "advice/policy-form";

    private final Policies policies;
    private final PolicyFormCheck rules;
    private final PolicyWords words;

    PolicyFormController(Policies policies, PolicyFormCheck rules, PolicyWords words) {
        this.policies = policies;
        this.rules = rules;
        this.words = words;
    }

    /** @param name in the form, e.g. values[tolerance] */
    record Field(String name, String label, String hint) {}

    record Part(String title, List<Field> fields) {}

    @InitBinder("form")
    void binder(WebDataBinder binder) {
        FormBinding.prepare(binder);
    }

    @ModelAttribute("lines")
    List<Choice> lines() {
        return Arrays.stream(Policy.Line.values())
                .map(line -> new Choice(line.name(), words.word("policy.line." + line)))
                .toList();
    }

    @ModelAttribute("parts")
    List<Part> parts() {
        return Arrays.stream(PolicyConstant.Group.values())
                .map(group -> new Part(
                        words.word("policy.group." + group),
                        Arrays.stream(PolicyConstant.values())
                                .filter(c -> c.group == group)
                                .map(this::field)
                                .toList()))
                .toList();
    }

    private Field field(PolicyConstant constant) {
        return new Field(
                PolicyForm.field(constant),
                words.name(constant),
                words.word("policy.hint." + constant.key, words.range(constant)));
    }

    /** @param from the version to start from; the one in force where none is named */
    @GetMapping("/policy/new")
    String form(@RequestParam(required = false) @Nullable Integer from, Model model) {
        List<PolicyVersion> all = policies.all();
        PolicyVersion start = from == null ? Policies.inForce(all) : Policies.find(all, from);
        model.addAttribute("form", PolicyForm.of(start.policy()));
        model.addAttribute("start", words.word("policy.form.start", Integer.toString(start.number())));
        return FORM;
    }

    @PostMapping("/policy")
    String propose(
            @ModelAttribute("form") PolicyForm form,
            BindingResult result,
            HttpServletResponse response,
            RedirectAttributes redirect) {
        rules.check(form, result);
        if (!result.hasErrors()) {
            try {
                int before = policies.number();
                int number = policies.propose(form.toPolicy(), String.valueOf(form.reason));
                redirect.addFlashAttribute("done", words.word("policy.proposed", Integer.toString(number)));
                return "redirect:/policy/" + number + "?against=" + before;
            } catch (NotAllowed e) {
                result.reject("rule", words.word(String.valueOf(e.getMessage())));
            }
        }
        response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
        return FORM;
    }
}
