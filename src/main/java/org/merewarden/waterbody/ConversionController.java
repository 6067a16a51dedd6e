package org.merewarden.waterbody;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PostMapping;

@Controller
class ConversionController {
    private final RegisterPages pages;
    private final RightsDesk desk;

    ConversionController(RegisterPages pages, RightsDesk desk) {
        this.pages = pages;
        this.desk = desk;
    }

    @GetMapping("/species-weights")
    String list(Model model) {
        model.addAttribute("form", new ConversionDetails());
        return page(model);
    }

    @PostMapping("/species-weights")
    String add(
            @Valid @ModelAttribute("form") ConversionDetails form,
            BindingResult errors,
            Model model,
            HttpServletResponse response) {
        desk.addConversion(form, errors);
        return errors.hasErrors() ? FormPages.again(page(model), response) : "redirect:/species-weights";
    }

    private String page(Model model) {
        model.addAttribute("conversions", pages.conversions());
        model.addAttribute("speciesChoices", pages.speciesChoices());
        return "waterbody/conversions";
    }
}
