package org.merewarden.records;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.util.Map;
import java.util.Optional;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.FormBinding;
import org.merewarden.web.NotFound;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.WebDataBinder;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.InitBinder;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Adds or corrects a catch, an effort or a survey. A correction is an entry of the same key. */
@Controller
@RequestMapping("/stocks/{lake}/{species}/evidence/{table}/new")
class RecordFormController {
    private static final String FORM = "records/record-form";

    private final Register register;
    private final RecordDesk desk;

    RecordFormController(Register register, RecordDesk desk) {
        this.register = register;
        this.desk = desk;
    }

    @InitBinder("form")
    void binder(WebDataBinder binder) {
        FormBinding.prepare(binder);
    }

    @ModelAttribute("stock")
    StockView stock(@PathVariable String lake, @PathVariable String species) {
        return register.stock(lake, species)
                .orElseThrow(() -> new NotFound("no stock “" + species + "” in “" + lake + "”"));
    }

    @ModelAttribute("form")
    RecordForm form(@PathVariable String table) {
        return Optional.ofNullable(EvidencePages.TYPED.get(table))
                .map(RecordForm::of)
                .orElseThrow(() -> new NotFound("no form for “" + table + "”"));
    }

    /** The address may fill the form in: that is how a correction starts. */
    @GetMapping
    String empty(@ModelAttribute("form") RecordForm form, BindingResult ignored, Model model) {
        return page(form, model);
    }

    @PostMapping
    String enter(
            @ModelAttribute("stock") StockView stock,
            @Valid @ModelAttribute("form") RecordForm form,
            BindingResult errors,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        Map<String, String> owner =
                Map.of("water_body", stock.lake(), "species", stock.species(), "population", stock.population());
        desk.enter(form, owner, stock.title(), errors);
        if (errors.hasErrors()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return page(form, model);
        }
        flash.addFlashAttribute("done", "Stored: " + stock.title() + ", " + form.year);
        return "redirect:" + stock.path() + "/evidence";
    }

    private static String page(RecordForm form, Model model) {
        model.addAttribute("table", form.table().name());
        model.addAttribute("fields", RecordFields.of(form.table()));
        return FORM;
    }
}
