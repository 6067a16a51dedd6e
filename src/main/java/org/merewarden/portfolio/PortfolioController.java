package org.merewarden.portfolio;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.SheetWriter;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;

@Controller
class PortfolioController {
    private final Portfolio portfolio;
    private final PortfolioViews views;
    private final PortfolioSheet sheet;
    private final WaitingRows waiting;

    PortfolioController(Portfolio portfolio, PortfolioViews views, PortfolioSheet sheet, WaitingRows waiting) {
        this.portfolio = portfolio;
        this.views = views;
        this.sheet = sheet;
        this.waiting = waiting;
    }

    @GetMapping("/portfolio")
    String page(@ModelAttribute PortfolioQuery query, Model model) {
        int season = season(query);
        model.addAttribute("season", Integer.toString(season));
        List<Entry> entries = portfolio.entries(season);
        model.addAttribute("view", views.view(entries, query));
        model.addAttribute("waiting", waiting.of(entries));
        return "portfolio/portfolio";
    }

    @GetMapping("/portfolio.csv")
    void csv(@ModelAttribute PortfolioQuery query, HttpServletResponse response) throws IOException {
        SheetWriter.csv(response, "portfolio-" + season(query) + ".csv", sheet.header(), shown(query));
    }

    @GetMapping("/portfolio.xlsx")
    void xlsx(@ModelAttribute PortfolioQuery query, HttpServletResponse response) throws IOException {
        SheetWriter.xlsx(response, "portfolio-" + season(query) + ".xlsx", sheet.header(), shown(query));
    }

    private List<List<@Nullable Object>> shown(PortfolioQuery query) {
        return sheet.rows(query.apply(portfolio.entries(season(query))));
    }

    private int season(PortfolioQuery query) {
        Integer asked = query.season();
        return asked == null ? portfolio.presentSeason() : asked;
    }
}
