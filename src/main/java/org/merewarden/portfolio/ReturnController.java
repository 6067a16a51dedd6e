package org.merewarden.portfolio;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import org.merewarden.web.SheetWriter;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;

/** What the office reports of a season: removals and limits by district, species and sector. */
@Controller
class ReturnController {
    private final SeasonReturns returns;
    private final ReturnViews views;
    private final ReturnSheet sheet;

    ReturnController(SeasonReturns returns, ReturnViews views, ReturnSheet sheet) {
        this.returns = returns;
        this.views = views;
        this.sheet = sheet;
    }

    @GetMapping("/returns")
    String present() {
        return "redirect:/returns/" + returns.presentSeason();
    }

    @GetMapping("/returns/{season:\\d{4}}")
    String page(@PathVariable int season, Model model) {
        model.addAttribute("view", views.view(returns.of(season)));
        return "portfolio/return";
    }

    @GetMapping("/returns/{season:\\d{4}}.csv")
    void csv(@PathVariable int season, HttpServletResponse response) throws IOException {
        SheetWriter.csv(response, "return-" + season + ".csv", sheet.header(), sheet.rows(returns.of(season)));
    }

    @GetMapping("/returns/{season:\\d{4}}.xlsx")
    void xlsx(@PathVariable int season, HttpServletResponse response) throws IOException {
        SheetWriter.xlsx(response, "return-" + season + ".xlsx", sheet.header(), sheet.rows(returns.of(season)));
    }
}
