package org.merewarden.season;

import jakarta.servlet.http.HttpServletResponse;
import java.util.List;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Problem;
import org.merewarden.season.LandingLog.Outcome;
import org.merewarden.season.LandingLog.Result;
import org.merewarden.web.NotFound;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Corrections and withdrawals: new entries beside the old, with a reason. */
@Controller
class CorrectionController {
    private final LandingLog log;
    private final FormChoices choices;
    private final LogEntries entries;
    private final MessageSource messages;

    CorrectionController(LandingLog log, FormChoices choices, LogEntries entries, MessageSource messages) {
        this.log = log;
        this.choices = choices;
        this.entries = entries;
        this.messages = messages;
    }

    @GetMapping("/landings/{id}/correct")
    String form(@PathVariable long id, Model model) {
        LandingRow row = find(id);
        return show(LandingForm.of(row), row, model);
    }

    @PostMapping("/landings/{id}/correct")
    String correct(
            @PathVariable long id,
            @ModelAttribute("form") LandingForm form,
            BindingResult errors,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        LandingRow row = find(id);
        FormReader reader = new FormReader(form, errors);
        List<Entry> read = reader.entries();
        if (form.getReason().isBlank() || form.getReason().length() > 2000) {
            errors.rejectValue("reason", "season.reason", word("season.reason.needed"));
        }
        if (read.size() > 1) {
            errors.reject("season.lines", word("season.correct.one-line"));
        }
        if (errors.hasErrors()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return show(form, row, model);
        }
        Outcome outcome = log.correct(row, read.get(0), form.getReason());
        if (outcome.result() == Result.REFUSED) {
            reader.show(outcome.problems());
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return show(form, row, model);
        }
        if (outcome.result() == Result.CONFLICT) {
            model.addAttribute("sent", read.get(0).text());
            response.setStatus(HttpStatus.CONFLICT.value());
            return show(form, find(id), model);
        }
        flash.addFlashAttribute("done", word("season.corrected", String.valueOf(id)));
        return toLog(outcome.rows().get(0).season());
    }

    @PostMapping("/landings/{id}/withdraw")
    String withdraw(@PathVariable long id, @RequestParam(defaultValue = "") String reason, RedirectAttributes flash) {
        LandingRow row = find(id);
        if (reason.isBlank() || reason.length() > 2000) {
            flash.addFlashAttribute("refused", word("season.reason.needed"));
            return "redirect:/landings/" + id + "/correct";
        }
        tell(log.withdraw(row, reason.trim()), id, flash);
        return toLog(row.season());
    }

    /** Withdraws every line of a form just sent; what was corrected since stays. */
    @PostMapping("/landings/undo")
    String undo(@RequestParam String key, RedirectAttributes flash) {
        for (LandingRow row : log.ofForm(key)) {
            if (row.correctedBy() == null) {
                tell(log.withdraw(row, word("season.undo.reason")), row.id(), flash);
            }
        }
        return "redirect:/landings/new?stored=" + Texts.encode(key);
    }

    private void tell(Outcome outcome, long id, RedirectAttributes flash) {
        switch (outcome.result()) {
            case STORED, ALREADY -> flash.addFlashAttribute("done", word("season.withdrawn", String.valueOf(id)));
            case CONFLICT -> flash.addFlashAttribute("refused", word("season.already-corrected", String.valueOf(id)));
            case REFUSED -> {
                Problem problem = outcome.problems().get(0).get(0);
                flash.addFlashAttribute("refused", "“" + problem.value() + "” " + problem.rule() + ".");
            }
        }
    }

    private LandingRow find(long id) {
        return log.find(id).orElseThrow(() -> new NotFound("landing " + id));
    }

    private String show(LandingForm form, LandingRow row, Model model) {
        model.addAttribute("form", form);
        model.addAttribute("choices", choices.of(form.getLake()));
        model.addAttribute("entry", entries.withHistory(List.of(row)).get(0));
        return "season/correct";
    }

    private static String toLog(int season) {
        return "redirect:/season/" + season + "/landings";
    }

    private String word(String key, @Nullable Object... values) {
        return Objects.requireNonNull(messages.getMessage(key, values, LocaleContextHolder.getLocale()));
    }
}
