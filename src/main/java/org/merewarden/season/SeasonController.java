package org.merewarden.season;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import java.time.LocalDate;
import java.util.List;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.Limits;
import org.merewarden.waterbody.Register;
import org.merewarden.web.Choice;
import org.merewarden.web.SheetWriter;
import org.springframework.format.annotation.DateTimeFormat;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Uptake of every limit, one stock's season, and the log beneath. */
@Controller
class SeasonController {
    private final SeasonPage page;
    private final StockSeasonPage stockPage;
    private final LogPage logPage;
    private final CompletenessStatements statements;
    private final Limits limits;
    private final Register register;

    SeasonController(
            SeasonPage page,
            StockSeasonPage stockPage,
            LogPage logPage,
            CompletenessStatements statements,
            Limits limits,
            Register register) {
        this.page = page;
        this.stockPage = stockPage;
        this.logPage = logPage;
        this.statements = statements;
        this.limits = limits;
        this.register = register;
    }

    @GetMapping("/season")
    String present() {
        return "redirect:/season/" + limits.presentSeason();
    }

    @GetMapping("/season/{year:\\d{4}}")
    String season(@PathVariable int year, Model model) {
        model.addAttribute("content", page.of(year));
        model.addAttribute("cooperatives", cooperatives());
        return "season/season";
    }

    @GetMapping("/season/{year:\\d{4}}/stocks/{lake}/{species}")
    String stock(@PathVariable int year, @PathVariable String lake, @PathVariable String species, Model model) {
        model.addAttribute("content", stockPage.of(year, lake, species));
        return "season/stock";
    }

    @PostMapping("/season/{year:\\d{4}}/complete")
    String complete(
            @PathVariable int year,
            @RequestParam(defaultValue = "") String cooperative,
            @RequestParam @DateTimeFormat(iso = DateTimeFormat.ISO.DATE) @Nullable LocalDate date,
            RedirectAttributes flash) {
        CompletenessStatements.Answer answer = statements.state(cooperative, date);
        flash.addFlashAttribute(answer.stored() ? "done" : "refused", answer.text());
        return "redirect:/season/" + year;
    }

    @GetMapping("/season/{year:\\d{4}}/landings")
    String log(@PathVariable int year, LogFilter filter, Model model) {
        model.addAttribute("content", logPage.of(year, filter));
        model.addAttribute("filter", filter);
        model.addAttribute("waters", all(register.waterBodies().stream().map(w -> new Choice(w.code(), w.name()))));
        model.addAttribute("cooperatives", all(cooperatives().stream()));
        model.addAttribute("speciesChoices", all(logPage.species()));
        return "season/log";
    }

    @GetMapping("/season/{year:\\d{4}}/landings.csv")
    void export(@PathVariable int year, LogFilter filter, HttpServletResponse response) throws IOException {
        SheetWriter.csv(response, "landings-" + year + ".csv", LogPage.EXPORT_HEADER, logPage.export(year, filter));
    }

    private List<Choice> cooperatives() {
        return register.cooperatives().stream()
                .map(c -> new Choice(c.code(), c.name()))
                .toList();
    }

    private List<Choice> all(Stream<Choice> choices) {
        return Stream.concat(Stream.of(new Choice("", logPage.all())), choices).toList();
    }
}
