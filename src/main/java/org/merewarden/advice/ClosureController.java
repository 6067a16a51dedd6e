package org.merewarden.advice;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.time.LocalDate;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.FormBinding;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Seasons;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.WebDataBinder;
import org.springframework.web.bind.annotation.InitBinder;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Closing a stock from a day and hour on: a limit of nothing for the rest of its season. */
@Controller
class ClosureController {
    private final AdvicePages pages;
    private final LimitRules rules;
    private final ProposalDesk desk;
    private final Seasons seasons;
    private final OfficeSettings settings;
    private final Limits limits;

    ClosureController(
            AdvicePages pages,
            LimitRules rules,
            ProposalDesk desk,
            Seasons seasons,
            OfficeSettings settings,
            Limits limits) {
        this.pages = pages;
        this.rules = rules;
        this.desk = desk;
        this.seasons = seasons;
        this.settings = settings;
        this.limits = limits;
    }

    @InitBinder({"form", "closure"})
    void binder(WebDataBinder binder) {
        FormBinding.prepare(binder);
    }

    @PostMapping("/stocks/{lake}/{species}/closures")
    String close(
            @PathVariable String lake,
            @PathVariable String species,
            @Valid @ModelAttribute("closure") ClosureForm closure,
            BindingResult result,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        StockView stock = pages.stock(lake, species);
        LocalDate day = closure.closeOn;
        int season = day == null ? seasons.current() : seasons.of(day);
        closure.closeKey = rules.key(closure.closeKey, result);
        rules.moment(season, "closeOn", day, closure.closeAt, result);
        if (result.hasErrors()) {
            return pages.again(stock, closure, model, response);
        }
        double reported = limits.inForce(stock.id(), season)
                .map(LimitView::reportedFraction)
                .orElse(1.0);
        NewLimit limit = closure.toLimit(stock.id(), season, seasons.end(season), reported, settings.zone());
        String reason = Objects.requireNonNull(closure.closeReason);
        return desk.store(
                stock, new Proposal(limit, reason, Optional.empty(), Map.of(), null), ProposalDesk.Act.CLOSE, flash);
    }
}
