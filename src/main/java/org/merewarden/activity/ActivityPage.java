package org.merewarden.activity;

import java.util.List;
import org.merewarden.web.Choice;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;

/** Who did what, when, from what to what. */
@Controller
class ActivityPage {
    private final ActivityReader reader;

    ActivityPage(ActivityReader reader) {
        this.reader = reader;
    }

    /** A date that cannot be read leaves its field empty and is said on the page. */
    @GetMapping("/activity")
    String page(@ModelAttribute("filter") ActivityFilter filter, BindingResult errors, Model model) {
        boolean unreadable = errors.hasErrors() || !filter.daysWithinReason();
        ActivityFilter asked = unreadable ? new ActivityFilter(null, null, null, null, null) : filter;
        long count = reader.count(asked);
        int page = asked.pageNumber();
        List<Choice> people =
                reader.people().stream().map(p -> new Choice(p, p)).toList();
        model.addAttribute("asked", asked);
        model.addAttribute("unreadable", unreadable);
        model.addAttribute("rows", reader.rows(asked));
        model.addAttribute("count", count);
        model.addAttribute("people", people);
        model.addAttribute("newer", page > 1 ? asked.address(page - 1) : null);
        model.addAttribute("older", (long) page * ActivityFilter.PAGE_SIZE < count ? asked.address(page + 1) : null);
        return "activity/activity";
    }
}
