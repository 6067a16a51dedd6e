package org.merewarden.advice;

import java.io.IOException;
import java.util.List;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;
import org.springframework.ui.Model;
import org.springframework.web.multipart.MultipartFile;

/** The papers of an issued limit in finished strings, and what a signed page must be to be kept. */
@Component
class PapersView {
    private static final int MOST_BYTES = 10 * 1024 * 1024;
    private static final int LONGEST_NAME = 300;
    private static final double KIBIBYTE = 1024;

    private final LimitHistory history;
    private final LimitPapers papers;
    private final Register register;
    private final Texts texts;

    PapersView(LimitHistory history, LimitPapers papers, Register register, Texts texts) {
        this.history = history;
        this.papers = papers;
        this.register = register;
        this.texts = texts;
    }

    record Objection(
            String objector,
            String received,
            String text,
            @Nullable String answer,
            String noted) {}

    record SignedPage(String id, String name, String about) {}

    record Page(
            String id,
            String stock,
            String stockPath,
            String what,
            List<Objection> objections,
            List<SignedPage> pages) {}

    /** A limit that was issued; others have no papers. */
    LimitFile issued(long id) {
        return history.file(id)
                .filter(file -> file.acts().stream().anyMatch(act -> act.act().equals(LimitWriter.ISSUED)))
                .orElseThrow(() -> new NotFound("issued limit " + id));
    }

    String show(long id, Model model) {
        model.addAttribute("papers", page(id));
        return "advice/papers";
    }

    private Page page(long id) {
        NewLimit limit = issued(id).limit();
        StockView stock = register.stock(limit.stockId()).orElseThrow();
        return new Page(
                Long.toString(id),
                stock.title(),
                stock.path(),
                OpenProposals.amount(limit),
                papers.objections(id).stream().map(this::objection).toList(),
                papers.pages(id).stream().map(this::signed).toList());
    }

    private Objection objection(LimitPapers.Objection o) {
        return new Objection(
                o.objector(),
                Figures.date(o.receivedOn()),
                o.objection(),
                o.answer(),
                texts.of("advice.papers.noted", o.notedBy(), Figures.dateTime(o.notedAt())));
    }

    private SignedPage signed(LimitPapers.SignedPage page) {
        return new SignedPage(
                Long.toString(page.id()),
                page.fileName(),
                texts.of(
                        "advice.signed.about",
                        Figures.withUnit(page.bytes() / KIBIBYTE, "KiB"),
                        page.attachedBy(),
                        Figures.dateTime(page.attachedAt()),
                        page.sha256()));
    }

    /** Keeps the page, or says in a sentence why not. */
    void attach(long id, NewLimit limit, @Nullable MultipartFile file) throws IOException {
        if (file == null || file.isEmpty()) {
            throw new NotAllowed(texts.of("advice.signed.none"));
        }
        String name = name(file);
        if (file.getSize() > MOST_BYTES) {
            throw new NotAllowed(texts.of("advice.signed.large", name, Figures.digits((double) file.getSize(), 12)));
        }
        byte[] bytes = file.getBytes();
        PageKind kind = PageKind.of(bytes).orElseThrow(() -> new NotAllowed(texts.of("advice.signed.kind", name)));
        papers.attach(id, limit, name, kind, bytes);
    }

    /** The file's own name without folders and control characters. */
    private static String name(MultipartFile file) {
        String clean = Objects.requireNonNullElse(file.getOriginalFilename(), "")
                .replaceAll(".*[/\\\\]", "")
                .replaceAll("\\p{Cntrl}", "")
                .strip();
        String named = clean.isEmpty() ? "page" : clean;
        return named.length() > LONGEST_NAME ? named.substring(named.length() - LONGEST_NAME) : named;
    }
}
