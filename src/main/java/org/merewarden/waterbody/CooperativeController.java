package org.merewarden.waterbody;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import org.merewarden.web.NotFound;
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
class CooperativeController {
    private static final String FORM = "waterbody/cooperative-form";
    private static final String PAGE = "waterbody/cooperative";

    private final Register register;
    private final RegisterPages pages;
    private final RegisterDesk desk;
    private final RightsDesk rights;

    CooperativeController(Register register, RegisterPages pages, RegisterDesk desk, RightsDesk rights) {
        this.register = register;
        this.pages = pages;
        this.desk = desk;
        this.rights = rights;
    }

    @GetMapping("/cooperatives")
    String list(Model model) {
        model.addAttribute("cooperatives", pages.cooperatives());
        return "waterbody/cooperatives";
    }

    @GetMapping("/cooperatives/{code}")
    String page(@PathVariable String code, Model model) {
        model.addAttribute("form", new RightsDesk.ShareForm());
        return page(find(code), model);
    }

    private String page(CooperativeView cooperative, Model model) {
        model.addAttribute("cooperative", cooperative);
        model.addAttribute("shares", pages.shares(cooperative));
        model.addAttribute("stockChoices", pages.stockChoices());
        return PAGE;
    }

    private CooperativeView find(String code) {
        return register.cooperative(code).orElseThrow(() -> new NotFound("no cooperative “" + code + "”"));
    }

    @PostMapping("/cooperatives/{code}/rights")
    String setShare(
            @PathVariable String code,
            @Valid @ModelAttribute("form") RightsDesk.ShareForm form,
            BindingResult errors,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        CooperativeView cooperative = find(code);
        rights.setShare(cooperative, form, errors);
        if (errors.hasErrors()) {
            return FormPages.again(page(cooperative, model), response);
        }
        flash.addFlashAttribute("done", "Stored: " + form.stock);
        return "redirect:/cooperatives/" + code;
    }

    @GetMapping("/cooperatives/new")
    String empty(Model model) {
        model.addAttribute("form", new CooperativeDetails());
        return FORM;
    }

    @PostMapping("/cooperatives/new")
    String add(
            @Valid @ModelAttribute("form") CooperativeDetails form,
            BindingResult errors,
            HttpServletResponse response) {
        desk.addCooperative(form, errors);
        return errors.hasErrors() ? FormPages.again(FORM, response) : "redirect:/cooperatives/" + form.code;
    }

    @GetMapping("/cooperatives/{code}/edit")
    String edit(@PathVariable String code, Model model) {
        Cooperative stored = desk.cooperative(code);
        model.addAttribute("form", stored.details);
        model.addAttribute("version", stored.version);
        model.addAttribute("code", code);
        return FORM;
    }

    @PostMapping("/cooperatives/{code}/edit")
    String change(
            @PathVariable String code,
            @RequestParam int version,
            @Valid @ModelAttribute("form") CooperativeDetails form,
            BindingResult errors,
            Model model,
            HttpServletResponse response) {
        model.addAttribute("code", code);
        model.addAttribute("version", version);
        form.code = code;
        try {
            desk.changeCooperative(code, version, form, errors);
        } catch (Conflict conflict) {
            return FormPages.conflict(FORM, conflict, form.cells(), model, response);
        }
        return errors.hasErrors() ? FormPages.again(FORM, response) : "redirect:/cooperatives/" + code;
    }
}
