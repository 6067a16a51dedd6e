package org.merewarden.advice;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Choice;
import org.merewarden.web.FormBinding;
import org.merewarden.web.NotFound;
import org.merewarden.web.Seasons;
import org.springframework.context.MessageSource;
import org.springframework.dao.DuplicateKeyException;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.WebDataBinder;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.InitBinder;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** What should the limit be, and can it be defended; proposing and deciding. */
@Controller
class AdviceController {
    private static final String PAGE = "advice/advice";

    private final Register register;
    private final Decisions decisions;
    private final AdviceView view;
    private final OutlookPages outlook;
    private final Adviser adviser;
    private final Assessments assessments;
    private final Seasons seasons;
    private final MessageSource messages;

    AdviceController(
            Register register,
            Decisions decisions,
            AdviceView view,
            OutlookPages outlook,
            Adviser adviser,
            Assessments assessments,
            Seasons seasons,
            MessageSource messages) {
        this.register = register;
        this.decisions = decisions;
        this.view = view;
        this.outlook = outlook;
        this.adviser = adviser;
        this.assessments = assessments;
        this.seasons = seasons;
        this.messages = messages;
    }

    @InitBinder("form")
    void binder(WebDataBinder binder) {
        FormBinding.numbers(binder);
    }

    @ModelAttribute("kinds")
    List<Choice> kinds(Locale locale) {
        return List.of("catch", "effort", "measures only").stream()
                .map(kind ->
                        new Choice(kind, messages.getMessage("advice.kind." + kind.replace(' ', '-'), null, locale)))
                .toList();
    }

    @GetMapping("/stocks/{lake}/{species}/advice")
    String show(
            @PathVariable String lake,
            @PathVariable String species,
            @RequestParam @org.jspecify.annotations.Nullable Integer season,
            @RequestParam @org.jspecify.annotations.Nullable Double own,
            @RequestParam @org.jspecify.annotations.Nullable Double weak,
            Model model) {
        StockView stock = stock(lake, species);
        int advised = season == null ? adviser.season(stock.id()) : season;
        model.addAttribute("outlook", outlook.page(stock, advised, WhatIf.of(own, weak)));
        var form = new LimitForm();
        form.setSeason(advised);
        form.setValidFrom(seasons.start(advised));
        form.setValidTo(seasons.end(advised));
        model.addAttribute("form", form);
        return page(stock, model);
    }

    @PostMapping("/stocks/{lake}/{species}/limits")
    String propose(
            @PathVariable String lake,
            @PathVariable String species,
            @Valid @ModelAttribute("form") LimitForm form,
            BindingResult result,
            Model model,
            HttpServletResponse response,
            RedirectAttributes redirect,
            Locale locale) {
        StockView stock = stock(lake, species);
        crossField(result, "amountGiven", "amount");
        crossField(result, "setAsidesWithinLimit", "subsistence");
        crossField(result, "datesInOrder", "validTo");
        crossField(result, "datesWithinReason", "validTo");
        if (result.hasErrors()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            model.addAttribute("outlook", outlook.page(stock, adviser.season(stock.id()), WhatIf.of(null, null)));
            return page(stock, model);
        }
        Optional<AssessmentView> assessment = assessments.latest(stock.id());
        long id = decisions.propose(
                form.toLimit(stock.id(), assessment.map(AssessmentView::id).orElse(null)),
                form.getReason().strip());
        redirect.addFlashAttribute("done", messages.getMessage("advice.proposed", new Object[] {id}, locale));
        return "redirect:" + stock.path() + "/advice";
    }

    /** Shows a rule about several fields at the field that a reader would change. */
    private static void crossField(BindingResult result, String rule, String field) {
        var error = result.getFieldError(rule);
        if (error != null) {
            result.rejectValue(field, rule, java.util.Objects.requireNonNullElse(error.getDefaultMessage(), rule));
        }
    }

    @PostMapping("/limits/{id}/issue")
    String issue(
            @PathVariable long id,
            @RequestParam(defaultValue = "") String reason,
            RedirectAttributes redirect,
            Locale locale) {
        return act(
                id,
                "advice.issued",
                redirect,
                locale,
                () -> decisions.issue(id, reason.isBlank() ? null : reason.strip()));
    }

    @PostMapping("/limits/{id}/refuse")
    String refuse(
            @PathVariable long id,
            @RequestParam(defaultValue = "") String reason,
            RedirectAttributes redirect,
            Locale locale) {
        return withReason(id, "advice.refused", reason, redirect, locale, () -> decisions.refuse(id, reason.strip()));
    }

    @PostMapping("/limits/{id}/withdraw")
    String withdraw(
            @PathVariable long id,
            @RequestParam(defaultValue = "") String reason,
            RedirectAttributes redirect,
            Locale locale) {
        return withReason(
                id, "advice.withdrawn", reason, redirect, locale, () -> decisions.withdraw(id, reason.strip()));
    }

    private String withReason(
            long id, String doneKey, String reason, RedirectAttributes redirect, Locale locale, Runnable act) {
        return act(id, doneKey, redirect, locale, () -> {
            if (reason.isBlank()) {
                throw new Decisions.NotAllowed("advice.reason.needed");
            }
            act.run();
        });
    }

    private String act(long id, String doneKey, RedirectAttributes redirect, Locale locale, Runnable act) {
        StockView stock = register.stock(decisions.find(id).stockId()).orElseThrow();
        try {
            act.run();
            redirect.addFlashAttribute("done", messages.getMessage(doneKey, new Object[] {id}, locale));
        } catch (Decisions.NotAllowed e) {
            redirect.addFlashAttribute(
                    "refused", messages.getMessage(String.valueOf(e.getMessage()), new Object[] {id}, locale));
        } catch (DuplicateKeyException e) {
            redirect.addFlashAttribute("refused", messages.getMessage("advice.decided", new Object[] {id}, locale));
        }
        return "redirect:" + stock.path() + "/advice";
    }

    private String page(StockView stock, Model model) {
        model.addAttribute("page", view.page(stock));
        model.addAttribute("stock", stock);
        return PAGE;
    }

    private StockView stock(String lake, String species) {
        return register.stock(lake, species).orElseThrow(() -> new NotFound("stock " + lake + "/" + species));
    }
}
