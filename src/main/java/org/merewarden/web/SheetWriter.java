package org.merewarden.web;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import java.io.OutputStreamWriter;
import java.io.Writer;
import java.nio.charset.StandardCharsets;
import java.time.LocalDate;
import java.util.List;
import java.util.Locale;
import java.util.ResourceBundle;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVPrinter;
import org.dhatim.fastexcel.Workbook;
import org.dhatim.fastexcel.Worksheet;
import org.jspecify.annotations.Nullable;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.http.ContentDisposition;
import org.springframework.http.HttpHeaders;

/**
 * A table as a file to take away. The first line says what the file is (preliminary, confidential, of which day), the
 * second is the header, then the rows. Numbers are written as numbers with a decimal point, empty cells for null,
 * everything else as text that no spreadsheet takes for a formula.
 */
public final class SheetWriter {
    private static final String FORMULA_STARTS = "=+-@\t\r";
    /** Without it spreadsheets take UTF-8 for the machine's old code page. */
    private static final char BYTE_ORDER_MARK = '\ufeff';

    private SheetWriter() {}

    /** Sends a CSV file (RFC 4180, UTF-8, comma). */
    public static void csv(
            HttpServletResponse response, String fileName, List<String> header, List<? extends List<?>> rows)
            throws IOException {
        start(response, fileName, "text/csv;charset=UTF-8");
        csv(new OutputStreamWriter(response.getOutputStream(), StandardCharsets.UTF_8), caution(), header, rows);
    }

    static void csv(Writer out, String caution, List<String> header, List<? extends List<?>> rows) throws IOException {
        out.write(BYTE_ORDER_MARK);
        CSVPrinter printer = new CSVPrinter(out, CSVFormat.RFC4180);
        printer.printRecord(caution);
        printer.printRecord(header.stream().map(SheetWriter::cell).toList());
        for (List<?> row : rows) {
            printer.printRecord(row.stream().map(SheetWriter::cell).toList());
        }
        printer.flush();
    }

    /** Sends an XLSX file of one sheet. */
    public static void xlsx(
            HttpServletResponse response, String fileName, List<String> header, List<? extends List<?>> rows)
            throws IOException {
        start(response, fileName, "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet");
        try (Workbook book = new Workbook(response.getOutputStream(), "Merewarden", null)) {
            Worksheet sheet = book.newWorksheet("Merewarden");
            sheet.value(0, 0, caution());
            for (int column = 0; column < header.size(); column++) {
                put(sheet, 1, column, header.get(column));
                sheet.style(1, column).bold().set();
            }
            for (int row = 0; row < rows.size(); row++) {
                for (int column = 0; column < rows.get(row).size(); column++) {
                    put(sheet, row + 2, column, rows.get(row).get(column));
                }
            }
            sheet.freezePane(0, 2);
        }
    }

    private static void put(Worksheet sheet, int row, int column, @Nullable Object value) {
        Object cell = cell(value);
        if (cell instanceof Number number) {
            sheet.value(row, column, number);
        } else if (cell != null) {
            sheet.value(row, column, cell.toString());
        }
    }

    /** The value as it may stand in a cell: finite numbers as they are, unknown as null, texts never a formula. */
    static @Nullable Object cell(@Nullable Object value) {
        if (value == null || value instanceof Number number && !Double.isFinite(number.doubleValue())) {
            return null;
        }
        if (value instanceof Number) {
            return value;
        }
        String text = value.toString();
        return !text.isEmpty() && FORMULA_STARTS.indexOf(text.charAt(0)) >= 0 ? "'" + text : text;
    }

    private static void start(HttpServletResponse response, String fileName, String contentType) {
        response.setContentType(contentType);
        response.setHeader(
                HttpHeaders.CONTENT_DISPOSITION,
                ContentDisposition.attachment()
                        .filename(fileName, StandardCharsets.UTF_8)
                        .build()
                        .toString());
    }

    private static String caution() {
        Locale locale = LocaleContextHolder.getLocale();
        LocalDate today = LocalDate.now(LocaleContextHolder.getTimeZone().toZoneId());
        ResourceBundle.Control noFallback =
                ResourceBundle.Control.getNoFallbackControl(ResourceBundle.Control.FORMAT_PROPERTIES);
        String text =
                ResourceBundle.getBundle("messages.common", locale, noFallback).getString("export.caution");
        return String.format(locale, text, today);
    }
}
