package org.merewarden.advice;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.FormBinding;
import org.merewarden.web.NotFound;
import org.merewarden.web.OfficeSettings;
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

/** What should the limit be, and can it be defended; drafting and proposing it. */
@Controller
class AdviceController {
    private final AdvicePages pages;
    private final LimitRules rules;
    private final ProposalDesk desk;
    private final Recommendations recommendations;
    private final Assessments assessments;
    private final OfficeSettings settings;

    AdviceController(
            AdvicePages pages,
            LimitRules rules,
            ProposalDesk desk,
            Recommendations recommendations,
            Assessments assessments,
            OfficeSettings settings) {
        this.pages = pages;
        this.rules = rules;
        this.desk = desk;
        this.recommendations = recommendations;
        this.assessments = assessments;
        this.settings = settings;
    }

    @InitBinder({"form", "closure", "ask"})
    void binder(WebDataBinder binder) {
        FormBinding.prepare(binder);
    }

    /**
     * @param season for which season the form is; without it the one that is to be decided next
     * @param revise fills the form in with the season's limit, to be changed from a moment on
     * @param draft number of the draft that is gone on with
     * @param ask what to look at besides
     */
    @GetMapping("/stocks/{lake}/{species}/advice")
    String show(
            @PathVariable String lake,
            @PathVariable String species,
            @RequestParam @Nullable Integer season,
            @RequestParam(defaultValue = "false") boolean revise,
            @RequestParam @Nullable Long draft,
            @ModelAttribute("ask") AskForm ask,
            BindingResult asked,
            Model model) {
        StockView stock = pages.stock(lake, species);
        int of = season == null ? recommendations.season(stock.id()) : season;
        if (of < 1800 || !recommendations.advisable(of)) {
            throw new NotFound("season " + of);
        }
        return pages.fresh(stock, of, revise, Optional.ofNullable(draft), ask.check(asked), model);
    }

    /** @param act draft or propose */
    @PostMapping("/stocks/{lake}/{species}/limits")
    String write(
            @PathVariable String lake,
            @PathVariable String species,
            @RequestParam(defaultValue = "propose") String act,
            @Valid @ModelAttribute("form") LimitForm form,
            BindingResult result,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        StockView stock = pages.stock(lake, species);
        boolean draft = act.equals("draft");
        Optional<Adviser.Advice> advice = form.season == null || result.hasFieldErrors("season")
                ? Optional.empty()
                : recommendations.current(stock.id(), form.season);
        rules.check(form, stock.id(), advice, draft, result);
        if (result.hasErrors()) {
            return pages.again(stock, form, model, response);
        }
        Long assessment = advice.map(Adviser.Advice::assessmentId)
                .or(() -> assessments.latest(stock.id()).map(AssessmentView::id))
                .orElse(null);
        Proposal proposal = form.toProposal(stock.id(), assessment, advice, settings.zone());
        return desk.store(stock, proposal, draft ? ProposalDesk.Act.DRAFT : ProposalDesk.Act.PROPOSE, flash);
    }
}
