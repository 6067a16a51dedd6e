package org.merewarden.intake;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import org.merewarden.intake.ImportPage.CellField;
import org.merewarden.intake.ImportPage.RowPage;
import org.merewarden.web.NotFound;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;

/** Reads one row of an import for its form. */
@Component
class RowPages {
    private final JdbcClient jdbc;
    private final Tables tables;
    private final Words words;

    RowPages(JdbcClient jdbc, Tables tables, Words words) {
        this.jdbc = jdbc;
        this.tables = tables;
        this.words = words;
    }

    RowPage row(long importId, long rowId) {
        return jdbc.sql("select r.*, f.file_name, f.sheet_name, f.table_name, b.version, b.state from import_row r"
                        + " join import_file f on f.id = r.file_id join import_batch b on b.id = f.batch_id"
                        + " where b.id = :batch and r.id = :row")
                .param("batch", importId)
                .param("row", rowId)
                .query((r, n) -> page(importId, r))
                .optional()
                .orElseThrow(() -> new NotFound("row " + rowId + " of import " + importId));
    }

    private RowPage page(long importId, ResultSet r) throws SQLException {
        String address = "/imports/" + importId + "/rows/" + r.getLong("id");
        String sheet = r.getString("sheet_name");
        String table = Objects.requireNonNullElse(r.getString("table_name"), "");
        Map<String, String> cells = Json.cells(r.getString("cells"));
        String before = r.getString("original_cells");
        Map<String, String> original = before == null ? cells : Json.cells(before);
        boolean out = r.getObject("left_out_at") != null;
        List<Problem> problems = out ? List.of() : Json.problems(r.getString("problems"));
        List<CellField> fields = new ArrayList<>();
        List<Column> columns = tables.find(table).map(TableDefinition::columns).orElse(List.of());
        columns.forEach(c -> fields.add(field(c, cells, original, problems)));
        List<CellField> others = cells.keySet().stream()
                .filter(name -> columns.stream().noneMatch(c -> c.name().equals(name)))
                .map(name -> new CellField(name, cells.getOrDefault(name, ""), "", "", "", false, ""))
                .toList();
        return new RowPage(
                importId,
                r.getInt("version"),
                address,
                address + "/left-out",
                words.of(
                        "row.where",
                        r.getString("file_name") + (sheet.isEmpty() ? "" : " (" + sheet + ")"),
                        Integer.toString(r.getInt("line_number")),
                        table),
                r.getString("state").equals("EXAMINED") && !table.isEmpty(),
                out,
                words.of("fate." + (out ? "LEFT_OUT" : r.getString("fate"))),
                record(r),
                problems.stream().map(RowPages::sentence).toList(),
                fields,
                others);
    }

    private String record(ResultSet r) throws SQLException {
        String mended = r.getString("mended_by") == null ? "" : words.of("row.mended", r.getString("mended_by"));
        String out = r.getString("left_out_by") == null ? "" : words.of("row.out", r.getString("left_out_by"));
        return (mended + " " + out).strip();
    }

    private CellField field(
            Column column, Map<String, String> cells, Map<String, String> original, List<Problem> problems) {
        String name = column.name();
        String value = cells.getOrDefault(name, "");
        String first = original.getOrDefault(name, "");
        String error = String.join(
                "; ",
                problems.stream()
                        .filter(p -> List.of(p.column().split(", ")).contains(name))
                        .map(Problem::rule)
                        .toList());
        return new CellField(
                name,
                value,
                hint(column),
                first.equals(value) ? "" : words.of("cell.original", first.isEmpty() ? "–" : first),
                error,
                column.required() && column.defaultValue() == null,
                "hint-" + name + (error.isEmpty() ? "" : " error-" + name));
    }

    private String hint(Column column) {
        return column.choices().isEmpty()
                ? column.description()
                : column.description() + " (" + String.join(", ", column.choices()) + ")";
    }

    private static String sentence(Problem problem) {
        String column = problem.column().isEmpty() ? "" : problem.column() + ": ";
        return column + (problem.value().isEmpty() ? "" : "“" + problem.value() + "” ") + problem.rule();
    }
}
