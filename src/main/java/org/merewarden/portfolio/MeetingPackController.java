package org.merewarden.portfolio;

import java.util.List;
import java.util.Locale;
import java.util.Map;
import org.merewarden.web.PdfPages;
import org.springframework.stereotype.Controller;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** The chosen stocks as one file to print or send before a meeting. */
@Controller
class MeetingPackController {
    private final MeetingPacks packs;
    private final PdfPages pdf;
    private final Texts texts;

    MeetingPackController(MeetingPacks packs, PdfPages pdf, Texts texts) {
        this.packs = packs;
        this.pdf = pdf;
        this.texts = texts;
    }

    @GetMapping("/portfolio/pack.pdf")
    Object file(
            @RequestParam(name = "stock", defaultValue = "") List<String> stocks,
            RedirectAttributes flash,
            Locale locale) {
        List<String> asked =
                stocks.stream().filter(s -> !s.isBlank()).distinct().toList();
        if (asked.isEmpty() || asked.size() > MeetingPacks.MOST) {
            flash.addFlashAttribute("refused", texts.get("pack.choose", MeetingPacks.MOST, asked.size()));
            return "redirect:/portfolio";
        }
        MeetingPack pack = packs.pack(asked);
        byte[] file = pdf.make("portfolio/pack", Map.of("pack", pack), locale);
        return PdfPages.answer("meeting-pack-" + pack.season() + ".pdf", file);
    }
}
