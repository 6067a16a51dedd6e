package org.merewarden.waterbody;

import jakarta.servlet.http.HttpServletResponse;
import java.util.List;
import java.util.stream.Stream;
import org.merewarden.web.Cells;
import org.merewarden.web.Choice;
import org.merewarden.web.FormBinding;
import org.springframework.http.HttpStatus;
import org.springframework.ui.Model;
import org.springframework.web.bind.WebDataBinder;
import org.springframework.web.bind.annotation.ControllerAdvice;
import org.springframework.web.bind.annotation.InitBinder;
import org.springframework.web.bind.annotation.ModelAttribute;

/** What the register's forms share. */
@ControllerAdvice(basePackageClasses = FormPages.class)
class FormPages {
    static final List<Choice> KINDS = choices("lake", "reservoir", "lagoon", "river");
    static final List<Choice> RECRUITMENTS = choices("natural", "mixed", "stocked only");
    static final List<Choice> PRODUCTIVITIES = choices("very slow", "slow", "moderate", "fast");

    private static List<Choice> choices(String... words) {
        return Stream.of(words).map(w -> new Choice(w, w)).toList();
    }

    @InitBinder("form")
    void binder(WebDataBinder binder) {
        FormBinding.prepare(binder);
    }

    @ModelAttribute
    void choices(Model model) {
        model.addAttribute("kinds", KINDS);
        model.addAttribute("recruitments", RECRUITMENTS);
        model.addAttribute("productivities", PRODUCTIVITIES);
    }

    /** The form once more, with its errors. */
    static String again(String view, HttpServletResponse response) {
        response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
        return view;
    }

    /** The form once more beside what somebody else stored meanwhile; sending it again then replaces that knowingly. */
    static String conflict(
            String view,
            Conflict conflict,
            java.util.Map<String, ? extends @org.jspecify.annotations.Nullable Object> yours,
            Model model,
            HttpServletResponse response) {
        response.setStatus(HttpStatus.CONFLICT.value());
        model.addAttribute("storedText", conflict.stored());
        model.addAttribute("yourText", Cells.describe(yours));
        model.addAttribute("version", conflict.version());
        return view;
    }
}
