package org.merewarden.season;

import jakarta.servlet.http.HttpServletResponse;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.season.LandingLog.Outcome;
import org.merewarden.web.Seasons;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;

/** The quick entry form, made for a phone. */
@Controller
class LandingController {
    private final LandingLog log;
    private final FormChoices choices;
    private final LandingReply reply;
    private final Seasons seasons;

    LandingController(LandingLog log, FormChoices choices, LandingReply reply, Seasons seasons) {
        this.log = log;
        this.choices = choices;
        this.reply = reply;
        this.seasons = seasons;
    }

    @GetMapping("/landings")
    String landings() {
        return "redirect:/landings/new";
    }

    /** @param stored key of a form sent before, whose outcome is shown above the next one */
    @GetMapping("/landings/new")
    String form(
            @RequestParam(defaultValue = "") String lake,
            @RequestParam(defaultValue = "") String species,
            @RequestParam(defaultValue = "") String cooperative,
            @RequestParam(defaultValue = "") String gear,
            @RequestParam @Nullable String stored,
            Model model) {
        LandingForm form = LandingForm.fresh(seasons.today());
        form.setLake(lake);
        form.setCooperative(cooperative);
        form.setGear(gear);
        form.getLines().get(0).setSpecies(species);
        if (stored != null) {
            List<LandingRow> rows = log.ofForm(stored);
            model.addAttribute("reply", rows.isEmpty() ? null : reply.of(stored, rows));
        }
        return show(form, model);
    }

    @PostMapping("/landings")
    String store(
            @ModelAttribute("form") LandingForm form, BindingResult errors, Model model, HttpServletResponse response) {
        FormReader reader = new FormReader(form, errors);
        List<Entry> entries = reader.entries();
        if (errors.hasErrors()) {
            return again(form, model, response, HttpStatus.UNPROCESSABLE_CONTENT);
        }
        Outcome outcome = log.log(form.getKey(), entries);
        return switch (outcome.result()) {
            case STORED, ALREADY -> "redirect:/landings/new?" + form.address() + "&stored=" + form.getKey();
            case CONFLICT -> {
                model.addAttribute("before", reply.of(form.getKey(), outcome.rows()));
                model.addAttribute("sent", entries.stream().map(Entry::text).toList());
                yield again(form, model, response, HttpStatus.CONFLICT);
            }
            case REFUSED -> {
                reader.show(outcome.problems());
                yield again(form, model, response, HttpStatus.UNPROCESSABLE_CONTENT);
            }
        };
    }

    private String again(LandingForm form, Model model, HttpServletResponse response, HttpStatus status) {
        response.setStatus(status.value());
        return show(form, model);
    }

    private String show(LandingForm form, Model model) {
        form.fill();
        model.addAttribute("form", form);
        model.addAttribute("choices", choices.of(form.getLake()));
        return "season/landing";
    }
}
