package org.merewarden.intake;

import jakarta.servlet.http.HttpServletResponse;
import java.util.HashMap;
import java.util.Map;
import org.springframework.dao.OptimisticLockingFailureException;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.server.ResponseStatusException;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Mending one row of an import, or leaving it out on purpose. */
@Controller
@RequestMapping("/imports/{id}/rows/{row}")
class ImportRowController {
    private static final String CELL = "cell.";

    private final Importer importer;
    private final RowPages pages;
    private final Words words;

    ImportRowController(Importer importer, RowPages pages, Words words) {
        this.importer = importer;
        this.pages = pages;
        this.words = words;
    }

    @GetMapping
    String show(@PathVariable long id, @PathVariable long row, Model model) {
        model.addAttribute("it", pages.row(id, row));
        return "intake/row";
    }

    @PostMapping
    String mend(
            @PathVariable long id,
            @PathVariable long row,
            @RequestParam int version,
            @RequestParam Map<String, String> posted,
            Model model,
            RedirectAttributes flash,
            HttpServletResponse response) {
        Map<String, String> cells = cells(pages.row(id, row), posted);
        try {
            importer.mend(id, version, row, cells);
        } catch (OptimisticLockingFailureException e) {
            String view = again(id, row, HttpStatus.CONFLICT, "result.STALE", model, response);
            model.addAttribute("it", pages.row(id, row).typed(cells, stored -> words.of("cell.stored", stored)));
            return view;
        }
        if (!pages.row(id, row).problems().isEmpty()) {
            return again(id, row, HttpStatus.UNPROCESSABLE_CONTENT, "row.still", model, response);
        }
        flash.addFlashAttribute("done", words.of("done.mended"));
        return "redirect:/imports/" + id;
    }

    @PostMapping("/left-out")
    String leave(
            @PathVariable long id,
            @PathVariable long row,
            @RequestParam int version,
            @RequestParam boolean out,
            Model model,
            RedirectAttributes flash,
            HttpServletResponse response) {
        try {
            importer.leaveRow(id, version, row, out);
        } catch (OptimisticLockingFailureException e) {
            return again(id, row, HttpStatus.CONFLICT, "result.STALE", model, response);
        }
        flash.addFlashAttribute("done", words.of(out ? "done.out" : "done.back"));
        return "redirect:/imports/" + id;
    }

    /** Only cells of the table's columns; others stay as the file has them. */
    private static Map<String, String> cells(ImportPage.RowPage page, Map<String, String> posted) {
        Map<String, String> cells = new HashMap<>();
        int length = 0;
        for (ImportPage.CellField field : page.fields()) {
            String text = posted.get(CELL + field.name());
            if (text != null) {
                cells.put(field.name(), text);
                length += text.length();
            }
        }
        if (length > TableBuilder.LONGEST_CELL) {
            throw new ResponseStatusException(HttpStatus.CONTENT_TOO_LARGE, "a row of " + length + " characters");
        }
        return cells;
    }

    private String again(
            long id, long row, HttpStatus status, String message, Model model, HttpServletResponse response) {
        response.setStatus(status.value());
        model.addAttribute("refused", words.of(message));
        return show(id, row, model);
    }
}
