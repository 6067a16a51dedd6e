package org.merewarden.intake;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.springframework.dao.OptimisticLockingFailureException;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.multipart.MultipartFile;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Uploading, looking at, storing and discarding imports. */
@Controller
@RequestMapping("/imports")
class ImportController {
    private static final int LISTED = 200;

    private final Importer importer;
    private final ImportPages pages;
    private final Tables tables;
    private final Words words;

    ImportController(Importer importer, ImportPages pages, Tables tables, Words words) {
        this.importer = importer;
        this.pages = pages;
        this.tables = tables;
        this.words = words;
    }

    @GetMapping
    String list(Model model) {
        List<ImportPage.Summary> imports = pages.latest(LISTED);
        model.addAttribute("imports", imports);
        model.addAttribute("lede", words.of("list.lede", imports.size()));
        return "intake/imports";
    }

    @PostMapping
    String upload(
            @RequestParam(required = false) @Nullable List<MultipartFile> files,
            Model model,
            HttpServletResponse response)
            throws IOException {
        List<Upload> uploads = new ArrayList<>();
        for (MultipartFile file : files == null ? List.<MultipartFile>of() : files) {
            String name = Objects.requireNonNullElse(file.getOriginalFilename(), "");
            if (!name.isBlank()) {
                uploads.add(new Upload(name, file.getBytes()));
            }
        }
        if (uploads.isEmpty()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            model.addAttribute("error", words.of("upload.none"));
            return list(model);
        }
        return "redirect:/imports/" + importer.upload(uploads, null);
    }

    @GetMapping("/{id}")
    String show(
            @PathVariable long id,
            @RequestParam(required = false) @Nullable String fate,
            @RequestParam(defaultValue = "1") int page,
            Model model) {
        model.addAttribute("it", pages.page(id, fate, page));
        model.addAttribute(
                "tables", tables.all().stream().map(TableDefinition::name).toList());
        return "intake/import";
    }

    @PostMapping("/{id}/commit")
    String commit(
            @PathVariable long id,
            @RequestParam int version,
            Model model,
            RedirectAttributes flash,
            HttpServletResponse response) {
        try {
            Importer.Result result = importer.commit(id, version);
            if (result == Importer.Result.COMMITTED) {
                flash.addFlashAttribute("done", words.of("done.COMMITTED"));
                return "redirect:/imports/" + id;
            }
            return conflict(id, "result." + result, model, response);
        } catch (OptimisticLockingFailureException e) {
            return conflict(id, "result.STALE", model, response);
        }
    }

    @PostMapping("/{id}/discard")
    String discard(
            @PathVariable long id,
            @RequestParam int version,
            Model model,
            RedirectAttributes flash,
            HttpServletResponse response) {
        return change(id, model, flash, response, "done.DISCARDED", () -> importer.discard(id, version));
    }

    @PostMapping("/{id}/files/{file}/table")
    String table(
            @PathVariable long id,
            @PathVariable long file,
            @RequestParam int version,
            @RequestParam String table,
            Model model,
            RedirectAttributes flash,
            HttpServletResponse response) {
        return change(
                id, model, flash, response, "done.examined", () -> importer.chooseTable(id, version, file, table));
    }

    @PostMapping("/{id}/files/{file}/left-out")
    String leave(
            @PathVariable long id,
            @PathVariable long file,
            @RequestParam int version,
            @RequestParam boolean out,
            Model model,
            RedirectAttributes flash,
            HttpServletResponse response) {
        return change(id, model, flash, response, "done.examined", () -> importer.leaveFile(id, version, file, out));
    }

    private String change(
            long id,
            Model model,
            RedirectAttributes flash,
            HttpServletResponse response,
            String done,
            Runnable change) {
        try {
            change.run();
            flash.addFlashAttribute("done", words.of(done));
            return "redirect:/imports/" + id;
        } catch (OptimisticLockingFailureException e) {
            return conflict(id, "result.STALE", model, response);
        }
    }

    private String conflict(long id, String message, Model model, HttpServletResponse response) {
        String page = show(id, null, 1, model);
        response.setStatus(HttpStatus.CONFLICT.value());
        model.addAttribute("refused", words.of(message));
        return page;
    }
}
