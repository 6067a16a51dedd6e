package org.merewarden.records;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import java.util.List;
import java.util.Optional;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.NotFound;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;

@Controller
class EvidenceController {
    private final Register register;
    private final EvidenceReader reader;
    private final EvidencePages pages;
    private final RecordHistory history;
    private final EvidenceFile file;

    EvidenceController(
            Register register, EvidenceReader reader, EvidencePages pages, RecordHistory history, EvidenceFile file) {
        this.register = register;
        this.reader = reader;
        this.pages = pages;
        this.history = history;
        this.file = file;
    }

    @GetMapping("/stocks/{lake}/{species}/evidence")
    String evidence(@PathVariable String lake, @PathVariable String species, Model model) {
        StockView stock = find(lake, species);
        Evidence evidence = reader.evidence(stock.id());
        EvidenceStrip strip = EvidenceStrip.of(evidence);
        model.addAttribute("stock", stock);
        model.addAttribute("tables", pages.tables(stock));
        model.addAttribute("findings", pages.sentences(Findings.of(evidence, reported(stock))));
        model.addAttribute("years", strip.rows().isEmpty() ? null : strip.firstYear() + "–" + strip.lastYear());
        model.addAttribute(
                "strip",
                strip.rows().isEmpty()
                        ? null
                        : strip.svg(
                                pages.word("records.strip.title", stock.title()),
                                kind -> pages.word("records.strip." + kind)));
        return "records/evidence";
    }

    private List<Findings.Reported> reported(StockView stock) {
        return history.ofStock(RecordTables.CATCHES, stock).stream()
                .filter(line -> line.inForce() && !line.provisional())
                .map(RecordHistory.Line::cells)
                .map(c -> new Findings.Reported(
                        (Integer) java.util.Objects.requireNonNull(c.get("year")),
                        String.valueOf(c.get("sector")),
                        (Double) c.get("reported_fraction")))
                .toList();
    }

    @GetMapping("/stocks/{lake}/{species}/evidence/{table}.csv")
    void file(
            @PathVariable String lake,
            @PathVariable String species,
            @PathVariable String table,
            HttpServletResponse response)
            throws IOException {
        StockView stock = find(lake, species);
        RecordTable wanted = Optional.ofNullable(EvidencePages.TYPED.get(table))
                .orElseThrow(() -> new NotFound("no table of evidence “" + table + "”"));
        file.send(stock, wanted, response);
    }

    private StockView find(String lake, String species) {
        return register.stock(lake, species)
                .orElseThrow(() -> new NotFound("no stock “" + species + "” in “" + lake + "”"));
    }
}
