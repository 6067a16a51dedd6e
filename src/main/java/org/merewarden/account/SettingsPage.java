package org.merewarden.account;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.time.Month;
import java.time.format.TextStyle;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import org.merewarden.web.Choice;
import org.merewarden.web.OfficeSettings;
import org.springframework.context.MessageSource;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** What the office has settled about itself. */
@Controller
@RequestMapping("/settings")
class SettingsPage {
    private static final String PAGE = "account/settings";

    private final OfficeSettings settings;
    private final SettingsChange change;
    private final MessageSource texts;

    SettingsPage(OfficeSettings settings, SettingsChange change, MessageSource texts) {
        this.settings = settings;
        this.change = change;
        this.texts = texts;
    }

    @ModelAttribute("months")
    List<Choice> months(Locale locale) {
        return Arrays.stream(Month.values())
                .map(m ->
                        new Choice(Integer.toString(m.getValue()), m.getDisplayName(TextStyle.FULL_STANDALONE, locale)))
                .toList();
    }

    @ModelAttribute("yesNo")
    List<Choice> yesNo(Locale locale) {
        return List.of(
                new Choice("no", texts.getMessage("settings.own.no", null, locale)),
                new Choice("yes", texts.getMessage("settings.own.yes", null, locale)));
    }

    @GetMapping
    String page(Model model) {
        model.addAttribute("form", SettingsForm.of(settings.all()));
        return PAGE;
    }

    @PostMapping
    String save(
            @Valid @ModelAttribute("form") SettingsForm form,
            BindingResult errors,
            Locale locale,
            RedirectAttributes next,
            HttpServletResponse response) {
        form.checkZone(errors);
        if (errors.hasErrors()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return PAGE;
        }
        int changed = change.to(form.settings());
        next.addFlashAttribute("done", texts.getMessage("settings.done", new Object[] {changed}, locale));
        return "redirect:/settings";
    }
}
