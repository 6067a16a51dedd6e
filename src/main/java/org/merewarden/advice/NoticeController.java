package org.merewarden.advice;

import java.util.Locale;
import java.util.Map;
import org.merewarden.web.PdfPages;
import org.springframework.http.ResponseEntity;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;

/** A limit on one printable page, and the same as a file: draft until it is issued. */
@Controller
class NoticeController {
    private final Notices notices;
    private final PdfPages pdf;

    NoticeController(Notices notices, PdfPages pdf) {
        this.notices = notices;
        this.pdf = pdf;
    }

    @GetMapping("/notices/{id}")
    String show(@PathVariable long id, Model model) {
        model.addAttribute("notice", notices.notice(id));
        return "advice/notice";
    }

    @GetMapping("/notices/{id}.pdf")
    ResponseEntity<byte[]> file(@PathVariable long id, Locale locale) {
        byte[] file = pdf.make("advice/notice-paper", Map.of("notice", notices.notice(id)), locale);
        return PdfPages.answer("notice-" + id + ".pdf", file);
    }
}
