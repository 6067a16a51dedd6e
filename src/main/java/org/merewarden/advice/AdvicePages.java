package org.merewarden.advice;

import jakarta.servlet.http.HttpServletResponse;
import java.util.List;
import java.util.Objects;
import java.util.Optional;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.NotFound;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Component;
import org.springframework.ui.Model;

/** Puts the advice page together: what is known of the stock, the forms, and what was decided. */
@Component
class AdvicePages {
    private final Register register;
    private final AdviceView advice;
    private final OutlookPages outlook;
    private final DecisionsView decisions;
    private final ProposalView proposals;
    private final LimitPrefill prefill;
    private final LimitHistory history;
    private final Recommendations recommendations;

    AdvicePages(
            Register register,
            AdviceView advice,
            OutlookPages outlook,
            DecisionsView decisions,
            ProposalView proposals,
            LimitPrefill prefill,
            LimitHistory history,
            Recommendations recommendations) {
        this.register = register;
        this.advice = advice;
        this.outlook = outlook;
        this.decisions = decisions;
        this.proposals = proposals;
        this.prefill = prefill;
        this.history = history;
        this.recommendations = recommendations;
    }

    StockView stock(String lake, String species) {
        return register.stock(lake, species).orElseThrow(() -> new NotFound("stock " + lake + "/" + species));
    }

    /** The page with a form as it should be for the season, a revision, or a draft that is gone on with. */
    String fresh(StockView stock, int season, boolean revision, Optional<Long> draft, WhatIf ask, Model model) {
        List<LimitFile> files = history.files(stock.id());
        Optional<LimitFile> begun = draft.map(id -> files.stream()
                .filter(file -> file.id() == id && file.draft())
                .findFirst()
                .orElseThrow(() -> new NotFound("draft " + id)));
        int of = begun.map(file -> file.limit().season()).orElse(season);
        LimitPrefill.Sources sources = sources(stock, of, files);
        LimitForm form = begun.map(prefill::draft)
                .orElseGet(() -> revision ? prefill.revision(sources) : prefill.season(sources));
        return page(stock, form, prefill.closure(), sources, files, ask, model);
    }

    /** The page once more with the limit as it was sent. */
    String again(StockView stock, LimitForm form, Model model, HttpServletResponse response) {
        return again(stock, form, prefill.closure(), model, response);
    }

    private String again(
            StockView stock, LimitForm form, ClosureForm closure, Model model, HttpServletResponse response) {
        response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
        List<LimitFile> files = history.files(stock.id());
        int season = Objects.requireNonNullElseGet(form.season, () -> recommendations.season(stock.id()));
        return page(stock, form, closure, sources(stock, season, files), files, WhatIf.NOTHING, model);
    }

    /** The page once more with the closure as it was sent. */
    String again(StockView stock, ClosureForm closure, Model model, HttpServletResponse response) {
        int season = recommendations.season(stock.id());
        LimitForm form = prefill.season(sources(stock, season, history.files(stock.id())));
        return again(stock, form, closure, model, response);
    }

    private LimitPrefill.Sources sources(StockView stock, int season, List<LimitFile> files) {
        return prefill.sources(season, recommendations.current(stock.id(), season), files);
    }

    private String page(
            StockView stock,
            LimitForm form,
            ClosureForm closure,
            LimitPrefill.Sources sources,
            List<LimitFile> files,
            WhatIf ask,
            Model model) {
        model.addAttribute("stock", stock);
        model.addAttribute("inForce", advice.lede(stock));
        int looked =
                recommendations.advisable(sources.season()) ? sources.season() : recommendations.season(stock.id());
        model.addAttribute("outlook", outlook.page(stock, looked, ask, prefill.season(sources)));
        model.addAttribute("deciding", decisions.page(stock.id(), files));
        model.addAttribute("proposing", proposals.page(stock.id(), form, sources));
        model.addAttribute("form", form);
        model.addAttribute("closure", closure);
        if (!model.containsAttribute("ask")) {
            model.addAttribute("ask", new AskForm());
        }
        return "advice/advice";
    }
}
