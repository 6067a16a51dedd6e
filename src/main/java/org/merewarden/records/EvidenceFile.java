package org.merewarden.records;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import java.io.OutputStreamWriter;
import java.io.Writer;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVPrinter;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Column;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Cells;
import org.merewarden.web.Seasons;
import org.springframework.http.ContentDisposition;
import org.springframework.http.HttpHeaders;
import org.springframework.stereotype.Component;

/**
 * A stock's records in force as a file that the importer takes back. A line of caution above the header would spoil that,
 * so the file's name says that it is preliminary, confidential and of which day.
 */
@Component
class EvidenceFile {
    private static final String FORMULA_STARTS = "=+-@\t\r";

    private final RecordHistory history;
    private final Seasons seasons;

    EvidenceFile(RecordHistory history, Seasons seasons) {
        this.history = history;
        this.seasons = seasons;
    }

    void send(StockView stock, RecordTable table, HttpServletResponse response) throws IOException {
        String name = table.name() + "-" + stock.lake() + "-" + stock.speciesKey() + "-preliminary-confidential-"
                + seasons.today() + ".csv";
        response.setContentType("text/csv;charset=UTF-8");
        response.setHeader(
                HttpHeaders.CONTENT_DISPOSITION,
                ContentDisposition.attachment().filename(name).build().toString());
        Writer out = new OutputStreamWriter(response.getOutputStream(), StandardCharsets.UTF_8);
        CSVPrinter printer = new CSVPrinter(out, CSVFormat.RFC4180);
        printer.printRecord(
                table.definition().columns().stream().map(Column::name).toList());
        for (RecordHistory.Line line : history.ofStock(table, stock)) {
            if (line.inForce() && !line.provisional()) {
                printer.printRecord(record(stock, table, line.cells()));
            }
        }
        printer.flush();
    }

    private static List<String> record(StockView stock, RecordTable table, Map<String, @Nullable Object> cells) {
        List<String> record = new ArrayList<>(List.of(stock.lake(), stock.species(), stock.population()));
        table.fields().forEach(f -> record.add(cell(cells.get(f.column().name()))));
        return record;
    }

    /** Empty for unknown; a text that a spreadsheet would take for a formula gets an apostrophe in front. */
    private static String cell(@Nullable Object value) {
        if (value == null) {
            return "";
        }
        String text = Cells.text(value);
        boolean formula = value instanceof String && !text.isEmpty() && FORMULA_STARTS.indexOf(text.charAt(0)) >= 0;
        return formula ? "'" + text : text;
    }
}
