package org.merewarden.portfolio;

import java.util.List;
import org.jspecify.annotations.Nullable;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.RequestParam;

@Controller
class CompareController {
    private final Comparison comparison;

    CompareController(Comparison comparison) {
        this.comparison = comparison;
    }

    @GetMapping("/portfolio/compare")
    String page(
            @RequestParam(name = "stock", defaultValue = "") List<String> stocks,
            @RequestParam(name = "axes", required = false) @Nullable String axes,
            @RequestParam(name = "focus", required = false) @Nullable String focus,
            Model model) {
        List<String> asked = stocks.stream().filter(s -> !s.isBlank()).toList();
        model.addAttribute("view", comparison.view(asked, Axes.of(axes), focus));
        return "portfolio/compare";
    }
}
