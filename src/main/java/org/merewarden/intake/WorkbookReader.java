package org.merewarden.intake;

import java.io.ByteArrayInputStream;
import java.io.IOException;
import java.math.BigDecimal;
import java.time.LocalDateTime;
import java.time.LocalTime;
import java.util.ArrayList;
import java.util.Iterator;
import java.util.List;
import java.util.Locale;
import java.util.stream.Stream;
import org.dhatim.fastexcel.reader.Cell;
import org.dhatim.fastexcel.reader.CellType;
import org.dhatim.fastexcel.reader.ReadableWorkbook;
import org.dhatim.fastexcel.reader.ReadingOptions;
import org.dhatim.fastexcel.reader.Row;
import org.dhatim.fastexcel.reader.Sheet;
import org.jspecify.annotations.Nullable;

/**
 * Reads an XLSX workbook, one table a sheet. Dates are cells formatted as dates; of a formula its stored result is
 * read, and the reading says so; a formula without one, and a cell that holds an error, refuse their row.
 */
final class WorkbookReader {
    private WorkbookReader() {}

    static List<SourceTable> read(byte[] bytes) throws UnreadableFile {
        try {
            ZipBounds.check(bytes);
            try (ReadableWorkbook workbook =
                    new ReadableWorkbook(new ByteArrayInputStream(bytes), new ReadingOptions(true, true))) {
                return sheets(workbook);
            }
        } catch (IOException | RuntimeException e) {
            // the libraries answer damaged files with exceptions of every kind
            throw new UnreadableFile("not a readable XLSX workbook; save it anew with a spreadsheet program");
        }
    }

    private static List<SourceTable> sheets(ReadableWorkbook workbook) throws IOException, UnreadableFile {
        List<SourceTable> tables = new ArrayList<>();
        for (Sheet sheet : workbook.getSheets().toList()) {
            try {
                SheetReading reading = new SheetReading();
                reading.fill(sheet);
                if (!reading.table.isEmpty()) {
                    tables.add(reading.build(sheet.getName()));
                }
            } catch (UnreadableFile e) {
                throw new UnreadableFile(
                        e.line(),
                        e.problem().column(),
                        e.problem().value(),
                        "sheet “" + sheet.getName() + "”: " + e.problem().rule());
            }
        }
        if (tables.isEmpty()) {
            throw new UnreadableFile("no sheet of the workbook holds anything");
        }
        return tables;
    }

    private static final class SheetReading {
        private final TableBuilder table = new TableBuilder(false);
        private int formulas;
        private @Nullable Problem problem;

        void fill(Sheet sheet) throws IOException, UnreadableFile {
            try (Stream<Row> rows = sheet.openStream()) {
                for (Iterator<Row> all = rows.iterator(); all.hasNext(); ) {
                    Row row = all.next();
                    problem = null;
                    List<String> cells = texts(row);
                    table.add(row.getRowNum(), cells, problem);
                }
            }
        }

        SourceTable build(String name) throws UnreadableFile {
            String told = "XLSX, sheet “" + Excerpt.of(name, 60) + "”";
            if (formulas > 0) {
                told += ", " + formulas + " formulas read by their stored results";
            }
            return table.build(name, told, false);
        }

        private List<String> texts(Row row) throws UnreadableFile {
            if (row.getCellCount() > TableBuilder.MOST_COLUMNS) {
                throw new UnreadableFile(
                        row.getRowNum(),
                        "",
                        "",
                        "cells beyond column " + TableBuilder.MOST_COLUMNS + "; clear what stands far to the right");
            }
            List<String> texts = new ArrayList<>();
            for (int i = 0; i < row.getCellCount(); i++) {
                Cell cell = row.getCell(i);
                texts.add(cell == null ? "" : text(cell));
            }
            return texts;
        }

        private String text(Cell cell) {
            String raw = cell.getRawValue() == null ? "" : cell.getRawValue();
            CellType type = cell.getType();
            if (type == CellType.FORMULA) {
                formulas++;
                if (raw.isBlank() && cell.getValue() == null) {
                    refuse(cell, "=" + cell.getFormula(), "the formula has no stored result; enter the value itself");
                    return "";
                }
            }
            if (type == CellType.ERROR || raw.startsWith("#") && type == CellType.FORMULA) {
                refuse(cell, raw, "the cell holds an error; enter the value itself");
                return raw;
            }
            return switch (type) {
                case EMPTY -> "";
                case STRING -> cell.asString();
                case NUMBER -> number(cell, raw);
                case FORMULA -> cell.getValue() instanceof Number ? number(cell, raw) : raw;
                default -> raw;
            };
        }

        private void refuse(Cell cell, String value, String rule) {
            problem = new Problem("", value, "cell " + cell.getAddress() + ": " + rule);
        }

        private static String number(Cell cell, String raw) {
            if (isDate(cell.getDataFormatString(), cell.getDataFormatId())) {
                LocalDateTime date = cell.asDate();
                return date.toLocalTime().equals(LocalTime.MIDNIGHT)
                        ? date.toLocalDate().toString()
                        : date.toString();
            }
            // the shortest decimal that is the same number: spreadsheets store 12.4 as 12.4000000000000004
            double value = Double.parseDouble(raw);
            if (value == Math.rint(value) && Math.abs(value) < 1e15) {
                return BigDecimal.valueOf((long) value).toPlainString();
            }
            return Math.abs(value) >= 1e-6 && Math.abs(value) < 1e15
                    ? BigDecimal.valueOf(value).toPlainString()
                    : Double.toString(value);
        }

        private static boolean isDate(@Nullable String format, @Nullable Integer id) {
            if (id != null && id >= 14 && id <= 17 || id != null && id == 22) {
                return true;
            }
            String letters = format == null
                    ? ""
                    : format.replaceAll("\"[^\"]*\"|\\[[^]]*]|\\\\.|General", "")
                            .toLowerCase(Locale.ROOT);
            return letters.contains("y") || letters.contains("d");
        }
    }
}
