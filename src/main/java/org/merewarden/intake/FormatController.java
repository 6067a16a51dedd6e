package org.merewarden.intake;

import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.Map;
import org.merewarden.web.NotFound;
import org.springframework.http.ContentDisposition;
import org.springframework.http.HttpHeaders;
import org.springframework.http.MediaType;
import org.springframework.http.ResponseEntity;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.bind.annotation.ResponseBody;

/** The formats of the tables, for people and for programs. */
@Controller
@RequestMapping("/formats")
class FormatController {
    private final Tables tables;
    private final Words words;

    FormatController(Tables tables, Words words) {
        this.tables = tables;
        this.words = words;
    }

    /** A table as the page shows it. */
    record TableView(String name, String title, String schema, String template, List<ColumnView> columns) {}

    record ColumnView(String name, String kind, String rule, String description) {}

    @GetMapping
    String show(Model model) {
        List<TableView> views = tables.all().stream().map(this::view).toList();
        model.addAttribute("tables", views);
        model.addAttribute("lede", words.of("formats.lede", views.size()));
        return "intake/formats";
    }

    @GetMapping(value = "/datapackage.json", produces = MediaType.APPLICATION_JSON_VALUE)
    @ResponseBody
    Map<String, Object> dataPackage() {
        return TableSchema.dataPackage(tables.all());
    }

    @GetMapping(value = "/{table}.json", produces = MediaType.APPLICATION_JSON_VALUE)
    @ResponseBody
    Map<String, Object> schema(@PathVariable String table) {
        return TableSchema.of(need(table));
    }

    @GetMapping("/{table}.csv")
    ResponseEntity<byte[]> template(@PathVariable String table) {
        TableDefinition definition = need(table);
        String header =
                String.join(",", definition.columns().stream().map(Column::name).toList()) + "\r\n";
        return ResponseEntity.ok()
                .contentType(new MediaType("text", "csv", StandardCharsets.UTF_8))
                .header(
                        HttpHeaders.CONTENT_DISPOSITION,
                        ContentDisposition.attachment()
                                .filename(definition.name() + ".csv")
                                .build()
                                .toString())
                .body(header.getBytes(StandardCharsets.UTF_8));
    }

    private TableDefinition need(String table) {
        return tables.find(table).orElseThrow(() -> new NotFound("table " + table));
    }

    private TableView view(TableDefinition table) {
        List<ColumnView> columns = table.columns().stream().map(this::view).toList();
        String address = "/formats/" + table.name();
        return new TableView(table.name(), table.title(), address + ".json", address + ".csv", columns);
    }

    private ColumnView view(Column column) {
        String need = column.key() ? "key" : column.required() ? "required" : "optional";
        String rule = words.of("formats." + need);
        if (column.defaultValue() != null && !column.defaultValue().isEmpty()) {
            rule += "; " + words.of("formats.default", column.defaultValue());
        }
        if (!column.choices().isEmpty()) {
            rule += "; " + words.of("formats.choices", String.join(", ", column.choices()));
        } else if (column.kind() != Column.Kind.TEXT && column.kind() != Column.Kind.CODE) {
            rule += Double.isFinite(column.min()) ? "; ≥ " + CellReader.plain(column.min()) : "";
            rule += Double.isFinite(column.max()) ? "; ≤ " + CellReader.plain(column.max()) : "";
        }
        return new ColumnView(column.name(), words.of("kind." + column.kind()), rule, column.description());
    }
}
