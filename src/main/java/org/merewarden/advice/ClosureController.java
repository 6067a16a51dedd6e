package org.merewarden.advice;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.time.Instant;
import java.time.LocalDate;
import java.time.LocalTime;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.FormBinding;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Seasons;
import org.merewarden.web.Texts;
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
    private final Texts texts;

    ClosureController(
            AdvicePages pages,
            LimitRules rules,
            ProposalDesk desk,
            Seasons seasons,
            OfficeSettings settings,
            Texts texts) {
        this.pages = pages;
        this.rules = rules;
        this.desk = desk;
        this.seasons = seasons;
        this.settings = settings;
        this.texts = texts;
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
        rules.moment(season, "closeOn", day, closure.closeAt, result);
        if (result.hasErrors()) {
            return pages.again(stock, closure, model, response);
        }
        NewLimit limit = limit(stock.id(), season, Objects.requireNonNull(day), closure);
        String reason = Objects.requireNonNull(closure.closeReason);
        return desk.store(
                stock, new Proposal(limit, reason, Optional.empty(), Map.of(), null), ProposalDesk.Act.CLOSE, flash);
    }

    private NewLimit limit(long stockId, int season, LocalDate day, ClosureForm closure) {
        LocalTime time = Objects.requireNonNull(closure.closeAt);
        Instant from = day.atTime(time).atZone(settings.zone()).toInstant();
        return new NewLimit(
                stockId,
                season,
                "catch",
                0.0,
                "t",
                0,
                0,
                0,
                0,
                1,
                day,
                seasons.end(season),
                texts.of(
                        "advice.closure.measures",
                        Figures.dateTime(from),
                        settings.zone().getId()),
                null,
                null,
                null,
                "decided",
                new Terms(Terms.CLOSURE, from, null, null, null, closure.closeKey));
    }
}
