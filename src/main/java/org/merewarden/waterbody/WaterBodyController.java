package org.merewarden.waterbody;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import org.jspecify.annotations.Nullable;
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
class WaterBodyController {
    private static final String FORM = "waterbody/lake-form";

    private final RegisterPages pages;
    private final RegisterDesk desk;

    WaterBodyController(RegisterPages pages, RegisterDesk desk) {
        this.pages = pages;
        this.desk = desk;
    }

    @GetMapping("/water-bodies")
    String list(
            @RequestParam(required = false) @Nullable String name,
            @RequestParam(required = false) @Nullable String district,
            @RequestParam(required = false) @Nullable String kind,
            Model model) {
        RegisterPages.LakeFilter filter = new RegisterPages.LakeFilter(name, district, kind);
        model.addAttribute("filter", filter);
        model.addAttribute("districts", pages.districts());
        model.addAttribute("lakes", pages.lakes(filter));
        return "waterbody/lakes";
    }

    @GetMapping("/water-bodies/{lake}")
    String lake(@PathVariable String lake, Model model) {
        WaterBody stored = desk.waterBody(lake);
        model.addAttribute("code", lake);
        model.addAttribute("name", stored.details.name);
        model.addAttribute("note", stored.details.note);
        model.addAttribute("facts", RegisterPages.facts(stored.details));
        model.addAttribute("stocks", pages.stocksOf(lake));
        model.addAttribute("parts", pages.partsOf(lake));
        return "waterbody/lake";
    }

    @GetMapping("/water-bodies/new")
    String empty(Model model) {
        model.addAttribute("form", new WaterBodyDetails());
        return FORM;
    }

    @PostMapping("/water-bodies/new")
    String add(
            @Valid @ModelAttribute("form") WaterBodyDetails form,
            BindingResult errors,
            HttpServletResponse response,
            RedirectAttributes flash) {
        desk.addWaterBody(form, errors);
        if (errors.hasErrors()) {
            return FormPages.again(FORM, response);
        }
        flash.addFlashAttribute("done", "Stored: " + form.name);
        return "redirect:/water-bodies/" + form.code;
    }

    @GetMapping("/water-bodies/{lake}/edit")
    String edit(@PathVariable String lake, Model model) {
        WaterBody stored = desk.waterBody(lake);
        model.addAttribute("form", stored.details);
        model.addAttribute("version", stored.version);
        model.addAttribute("code", lake);
        return FORM;
    }

    @PostMapping("/water-bodies/{lake}/edit")
    String change(
            @PathVariable String lake,
            @RequestParam int version,
            @Valid @ModelAttribute("form") WaterBodyDetails form,
            BindingResult errors,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        model.addAttribute("code", lake);
        model.addAttribute("version", version);
        form.code = lake;
        try {
            desk.changeWaterBody(lake, version, form, errors);
        } catch (Conflict conflict) {
            return FormPages.conflict(FORM, conflict, form.cells(), model, response);
        }
        if (errors.hasErrors()) {
            return FormPages.again(FORM, response);
        }
        flash.addFlashAttribute("done", "Stored: " + form.name);
        return "redirect:/water-bodies/" + lake;
    }
}
