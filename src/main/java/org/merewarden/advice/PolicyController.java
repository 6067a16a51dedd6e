package org.merewarden.advice;

import org.merewarden.core.policy.Policy;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;

/** The rule that is in use, in words. */
@Controller
class PolicyController {
    record Rule(String limitFraction, String watch, String strained, String critical) {}

    @GetMapping("/policy")
    String show(Model model) {
        Policy policy = Policy.DEFAULT;
        model.addAttribute(
                "rule",
                new Rule(
                        Figures.percent(policy.limitFraction()),
                        Figures.percent(policy.standing().watchFrom()),
                        Figures.percent(policy.standing().strainedFrom()),
                        Figures.percent(policy.standing().criticalFrom())));
        return "advice/policy";
    }
}
