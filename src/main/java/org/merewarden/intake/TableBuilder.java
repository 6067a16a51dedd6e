package org.merewarden.intake;

import java.util.ArrayList;
import java.util.HashSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Set;
import java.util.regex.Pattern;
import org.jspecify.annotations.Nullable;

/** Collects the lines of one table: the first that is not empty is its header. Holds the limits on size. */
final class TableBuilder {
    static final int MOST_ROWS = 200_000;
    static final int MOST_COLUMNS = 200;
    static final int LONGEST_CELL = 32_767;
    static final int LONGEST_ROW = 100_000;

    private static final Pattern BETWEEN_WORDS = Pattern.compile("[\\s\\u00a0-]+");
    private static final Pattern DECIMAL_POINT = Pattern.compile("[+-]?\\d*\\.\\d+");

    private final boolean everyRowFull;
    private final List<String> header = new ArrayList<>();
    private final List<SourceTable.Row> rows = new ArrayList<>();
    private int lastLine;
    private int emptyLines;
    private boolean decimalPoints;

    /** @param everyRowFull a row with another number of cells than the header is refused (CSV) */
    TableBuilder(boolean everyRowFull) {
        this.everyRowFull = everyRowFull;
    }

    void add(int line, List<String> cells, @Nullable Problem problem) throws UnreadableFile {
        if (line <= lastLine) {
            throw new UnreadableFile(line, "", "", "the sheet is damaged: its rows are not in order");
        }
        lastLine = line;
        checkSizes(line, cells);
        if (problem == null && cells.stream().allMatch(String::isBlank)) {
            emptyLines += header.isEmpty() ? 0 : 1;
        } else if (header.isEmpty()) {
            takeHeader(line, cells);
        } else {
            takeRow(line, cells, problem);
        }
    }

    boolean isEmpty() {
        return header.isEmpty();
    }

    SourceTable build(String sheet, String reading, boolean commaIsSeparator) throws UnreadableFile {
        if (header.isEmpty()) {
            throw new UnreadableFile("there is nothing in it; the first line must hold the columns' names");
        }
        DecimalMark mark =
                commaIsSeparator ? DecimalMark.POINT : decimalPoints ? DecimalMark.MIXED : DecimalMark.EITHER;
        String told = reading + (emptyLines == 0 ? "" : ", " + emptyLines + " empty lines passed over");
        return new SourceTable(sheet, told, mark, List.copyOf(header), rows);
    }

    static String normalised(String name) {
        return BETWEEN_WORDS.matcher(name.strip()).replaceAll("_").toLowerCase(Locale.ROOT);
    }

    private void checkSizes(int line, List<String> cells) throws UnreadableFile {
        if (rows.size() >= MOST_ROWS) {
            throw new UnreadableFile(
                    line, "", "", "more than " + MOST_ROWS + " rows; split the table into several files");
        }
        if (cells.size() > MOST_COLUMNS) {
            throw new UnreadableFile(
                    line, "", "", cells.size() + " cells in a line; at most " + MOST_COLUMNS + " are read");
        }
        int total = 0;
        for (int i = 0; i < cells.size(); i++) {
            int length = cells.get(i).length();
            total += length;
            if (length > LONGEST_CELL || total > LONGEST_ROW) {
                String rule = length > LONGEST_CELL
                        ? "a cell of " + length + " characters; at most " + LONGEST_CELL + " are read"
                        : "a line of more than " + LONGEST_ROW + " characters";
                throw new UnreadableFile(line, columnName(i), cells.get(i), rule);
            }
        }
    }

    private void takeHeader(int line, List<String> cells) throws UnreadableFile {
        Set<String> seen = new HashSet<>();
        for (String cell : cells) {
            String name = normalised(cell);
            if (name.length() > 200) {
                throw new UnreadableFile(line, "", cell, "a column's name has at most 200 characters");
            }
            if (!name.isEmpty() && !seen.add(name)) {
                throw new UnreadableFile(line, name, cell, "the column occurs twice; keep one of them");
            }
            header.add(name);
        }
    }

    private void takeRow(int line, List<String> cells, @Nullable Problem problem) {
        Map<String, String> named = new LinkedHashMap<>();
        Problem found = problem;
        for (int i = 0; i < cells.size(); i++) {
            if (!cells.get(i).isBlank()) {
                named.put(columnName(i), cells.get(i));
                decimalPoints |= DECIMAL_POINT.matcher(cells.get(i).strip()).matches();
                if (found == null && (i >= header.size() || header.get(i).isEmpty())) {
                    found = new Problem(columnName(i), cells.get(i), "the header has no name for this cell's column");
                }
            }
        }
        if (everyRowFull && cells.size() != header.size()) {
            found = new Problem(
                    "",
                    "",
                    cells.size() + " cells where the header has " + header.size()
                            + " columns; every line needs as many (put cells with separators in quotation marks)");
        }
        rows.add(new SourceTable.Row(line, named, found));
    }

    /** A cell without a named column is kept under its number; the blank keeps it apart from every normalised name. */
    private String columnName(int index) {
        boolean named = index < header.size() && !header.get(index).isEmpty();
        return named ? header.get(index) : "column " + (index + 1);
    }
}
