package org.merewarden.records;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.util.Map;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.WaterBodyView;
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

/** Stocking, fish kills and closures of a water. */
@Controller
@RequestMapping("/water-bodies/{lake}/events")
class EventController {
    private static final String PAGE = "records/events";

    private final Register register;
    private final RecordDesk desk;
    private final EvidencePages pages;

    EventController(Register register, RecordDesk desk, EvidencePages pages) {
        this.register = register;
        this.desk = desk;
        this.pages = pages;
    }

    @InitBinder("form")
    void binder(WebDataBinder binder) {
        FormBinding.prepare(binder);
    }

    @ModelAttribute("lake")
    WaterBodyView lake(@PathVariable String lake) {
        return register.waterBody(lake).orElseThrow(() -> new NotFound("no water body “" + lake + "”"));
    }

    /** The address may fill the form in: that is how a correction starts. */
    @GetMapping
    String list(
            @ModelAttribute("lake") WaterBodyView lake,
            @ModelAttribute("form") RecordForm.Event form,
            BindingResult ignored,
            Model model) {
        return page(lake, model);
    }

    @PostMapping
    String enter(
            @ModelAttribute("lake") WaterBodyView lake,
            @Valid @ModelAttribute("form") RecordForm.Event form,
            BindingResult errors,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        desk.enter(form, Map.of("water_body", lake.code()), form.kind + " in " + lake.name(), errors);
        if (errors.hasErrors()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return page(lake, model);
        }
        flash.addFlashAttribute("done", "Stored: " + form.key);
        return "redirect:" + lake.path() + "/events";
    }

    private String page(WaterBodyView lake, Model model) {
        model.addAttribute("events", pages.events(lake.id(), lake.path() + "/events"));
        model.addAttribute("fields", RecordFields.of(RecordTables.EVENTS));
        return PAGE;
    }
}
