package org.merewarden.portfolio;

import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;

@Controller
class StockPageController {
    private final StockPages pages;

    StockPageController(StockPages pages) {
        this.pages = pages;
    }

    @GetMapping("/stocks/{lake}/{species}")
    String page(@PathVariable String lake, @PathVariable String species, Model model) {
        model.addAttribute("view", pages.page(lake, species));
        return "portfolio/stock";
    }
}
