package org.merewarden.advice;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.FormBinding;
import org.merewarden.web.NotFound;
import org.merewarden.web.Seasons;
import org.merewarden.web.Texts;
import org.springframework.dao.DuplicateKeyException;
import org.springframework.http.ContentDisposition;
import org.springframework.http.HttpHeaders;
import org.springframework.http.HttpStatus;
import org.springframework.http.MediaType;
import org.springframework.http.ResponseEntity;
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
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.multipart.MultipartFile;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Objections noted against an issued limit, and its page as it was signed. */
@Controller
@RequestMapping("/limits/{id}")
class PapersController {
    private final PapersView view;
    private final LimitPapers papers;
    private final Seasons seasons;
    private final Texts texts;

    PapersController(PapersView view, LimitPapers papers, Seasons seasons, Texts texts) {
        this.view = view;
        this.papers = papers;
        this.seasons = seasons;
        this.texts = texts;
    }

    @InitBinder("form")
    void binder(WebDataBinder binder) {
        FormBinding.prepare(binder);
    }

    @GetMapping("/papers")
    String show(@PathVariable long id, Model model) {
        ObjectionForm form = new ObjectionForm();
        form.receivedOn = seasons.today();
        model.addAttribute("form", form);
        return view.show(id, model);
    }

    @PostMapping("/objections")
    String note(
            @PathVariable long id,
            @Valid @ModelAttribute("form") ObjectionForm form,
            BindingResult result,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash) {
        NewLimit limit = view.issued(id).limit();
        if (form.receivedOn != null && form.receivedOn.isAfter(seasons.today())) {
            result.rejectValue("receivedOn", "advice.objection.future", new Object[] {form.receivedOn}, null);
        }
        if (result.hasErrors()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return view.show(id, model);
        }
        papers.note(id, limit, form);
        flash.addFlashAttribute("done", texts.of("advice.objection.noted", Long.toString(id)));
        return "redirect:/limits/" + id + "/papers";
    }

    @PostMapping("/signed-pages")
    String attach(
            @PathVariable long id,
            @RequestParam(required = false) @Nullable MultipartFile file,
            Model model,
            HttpServletResponse response,
            RedirectAttributes flash)
            throws IOException {
        NewLimit limit = view.issued(id).limit();
        try {
            view.attach(id, limit, file);
        } catch (NotAllowed e) {
            return refused(id, String.valueOf(e.getMessage()), model, response);
        } catch (DuplicateKeyException e) {
            return refused(id, texts.of("advice.signed.same"), model, response);
        }
        flash.addFlashAttribute("done", texts.of("advice.signed.kept", Long.toString(id)));
        return "redirect:/limits/" + id + "/papers";
    }

    private String refused(long id, String sentence, Model model, HttpServletResponse response) {
        response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
        model.addAttribute("fileError", sentence);
        return show(id, model);
    }

    @GetMapping("/signed-pages/{page}")
    ResponseEntity<byte[]> download(@PathVariable long id, @PathVariable long page) {
        LimitPapers.SignedPage kept =
                papers.page(id, page).orElseThrow(() -> new NotFound("signed page " + page + " of limit " + id));
        String disposition = ContentDisposition.attachment()
                .filename(kept.fileName(), StandardCharsets.UTF_8)
                .build()
                .toString();
        return ResponseEntity.ok()
                .header(HttpHeaders.CONTENT_DISPOSITION, disposition)
                .header("X-Content-Type-Options", "nosniff")
                .contentType(MediaType.parseMediaType(kept.mediaType()))
                .body(papers.content(page));
    }
}
