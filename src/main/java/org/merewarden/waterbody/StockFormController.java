package org.merewarden.waterbody;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

@Controller
class StockFormController {
    private static final String FORM = "waterbody/stock-form";

    private final RegisterPages pages;
    private final RegisterDesk desk;

    StockFormController(RegisterPages pages, RegisterDesk desk) {
        this.pages = pages;
        this.desk = desk;
    }

    @GetMapping("/water-bodies/{lake}/stocks/new")
    String empty(@PathVariable String lake, Model model) {
        heading(lake, model);
        model.addAttribute("form", new StockDetails());
        return FORM;
    }

    @PostMapping("/water-bodies/{lake}/stocks/new")
    String add(
            @PathVariable String lake,
            @Valid @ModelAttribute("form") StockDetails form,
            BindingResult errors,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        heading(lake, model);
        desk.addStock(lake, form, errors);
        if (errors.hasErrors()) {
            return FormPages.again(FORM, response);
        }
        flash.addFlashAttribute("done", "Stored: " + form.key());
        return "redirect:/water-bodies/" + lake;
    }

    @GetMapping("/stocks/{lake}/{species}/edit")
    String edit(@PathVariable String lake, @PathVariable String species, Model model) {
        Stock stored = desk.stock(lake, species);
        heading(lake, model);
        model.addAttribute("form", stored.details);
        model.addAttribute("version", stored.version);
        model.addAttribute("speciesKey", species);
        return FORM;
    }

    @PostMapping("/stocks/{lake}/{species}/edit")
    String change(
            @PathVariable String lake,
            @PathVariable String species,
            @RequestParam int version,
            @Valid @ModelAttribute("form") StockDetails form,
            BindingResult errors,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        heading(lake, model);
        model.addAttribute("version", version);
        model.addAttribute("speciesKey", species);
        try {
            desk.changeStock(lake, species, version, form, errors);
        } catch (Conflict conflict) {
            return FormPages.conflict(FORM, conflict, form.cells(), model, response);
        }
        if (errors.hasErrors()) {
            return FormPages.again(FORM, response);
        }
        flash.addFlashAttribute("done", "Stored: " + species);
        return "redirect:/water-bodies/" + lake;
    }

    private void heading(String lake, Model model) {
        model.addAttribute("lake", lake);
        model.addAttribute("lakeName", desk.waterBody(lake).details.name);
        model.addAttribute("speciesChoices", pages.speciesChoices());
    }
}
