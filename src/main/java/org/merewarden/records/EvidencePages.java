package org.merewarden.records;

import java.text.NumberFormat;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.records.RecordHistory.Line;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Cells;
import org.merewarden.web.Figures;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;
import org.springframework.web.util.UriComponentsBuilder;

/** Finished strings for the evidence and events pages. Figures are shown in full: a record is never rounded. */
@Component
class EvidencePages {
    /** Tables that have a form on the evidence page. */
    static final Map<String, RecordTable> TYPED = Map.of(
            "catches", RecordTables.CATCHES,
            "effort", RecordTables.EFFORT,
            "surveys", RecordTables.SURVEYS);

    /** @param number whether the column holds numbers */
    record Head(String label, boolean number) {}

    record Cell(String label, String text, boolean number) {}

    record Row(
            List<Cell> cells,
            String recorded,
            @Nullable String importPath,
            @Nullable String correctPath) {}

    /** @param addPath form and file of the table, null where it has none */
    record Table(
            String name,
            String title,
            List<Head> heads,
            List<Row> rows,
            List<String> history,
            @Nullable String addPath,
            @Nullable String filePath) {}

    private final RecordHistory history;
    private final MessageSource messages;

    EvidencePages(RecordHistory history, MessageSource messages) {
        this.history = history;
        this.messages = messages;
    }

    List<Table> tables(StockView stock) {
        return Stream.of(
                        RecordTables.CATCHES,
                        RecordTables.EFFORT,
                        RecordTables.SURVEYS,
                        RecordTables.EVENTS,
                        RecordTables.AREAS,
                        RecordTables.PRIORS)
                .map(table -> {
                    String form = TYPED.containsKey(table.name()) ? stock.path() + "/evidence/" + table.name() : null;
                    return table(table, history.ofStock(table, stock), form == null ? null : form + "/new", form);
                })
                .toList();
    }

    Table events(long waterBodyId, String formPath) {
        return table(RecordTables.EVENTS, history.eventsOf(waterBodyId), formPath, null);
    }

    private Table table(RecordTable table, List<Line> lines, @Nullable String form, @Nullable String file) {
        List<Row> rows = lines.stream()
                .filter(Line::inForce)
                .sorted(Comparator.comparing((Line line) -> year(line)).reversed())
                .map(line -> row(table, line, form))
                .toList();
        return new Table(
                table.name(),
                word("records.table." + table.name()),
                table.fields().stream().map(f -> new Head(label(f), number(f))).toList(),
                rows,
                edits(lines),
                form,
                file == null ? null : file + ".csv");
    }

    private static int year(Line line) {
        return line.cells().get("year") instanceof Integer year ? year : 0;
    }

    private Row row(RecordTable table, Line line, @Nullable String form) {
        List<Cell> cells = table.fields().stream()
                .map(f -> new Cell(label(f), shown(line.cells().get(f.column().name())), number(f)))
                .toList();
        String state = line.provisional() ? ", " + word("records.provisional") : "";
        return new Row(
                cells,
                Figures.dateTime(line.recordedAt()) + ", " + line.recordedBy() + state,
                line.importId() == null ? null : "/imports/" + line.importId(),
                form == null ? null : correctPath(table, line, form));
    }

    private static String correctPath(RecordTable table, Line line, String form) {
        UriComponentsBuilder address = UriComponentsBuilder.fromPath(form);
        table.fields().forEach(f -> {
            Object value = line.cells().get(f.column().name());
            if (value != null && !f.column().name().equals("source")) {
                address.queryParam(RecordForm.property(f.column().name()), "{" + f.sqlName() + "}");
            }
        });
        Map<String, Object> values = new HashMap<>();
        table.fields()
                .forEach(f -> values.put(
                        f.sqlName(), Cells.text(line.cells().get(f.column().name()))));
        return address.encode().buildAndExpand(values).toUriString();
    }

    /** Each replaced row as a sentence: old → new, by whom and when; latest first. */
    private List<String> edits(List<Line> lines) {
        Map<String, Line> earlier = new HashMap<>();
        List<String> edits = new ArrayList<>();
        for (Line line : lines) {
            Line before = earlier.put(line.key(), line);
            if (before != null) {
                String change = Cells.changes(before.cells(), line.cells());
                edits.add(
                        0,
                        word(
                                "records.edit",
                                line.key()
                                        .substring(line.key().indexOf('|') + 1)
                                        .replace("|", ", "),
                                change.isEmpty() ? word("records.edit.none") : change,
                                line.recordedBy(),
                                Figures.dateTime(line.recordedAt())));
            }
        }
        return edits;
    }

    List<String> sentences(List<Finding> findings) {
        return findings.stream()
                .map(f -> word("records.finding." + f.rule(), f.details().toArray()))
                .toList();
    }

    private String label(RecordTable.Field field) {
        return word("records.column." + field.column().name());
    }

    private static boolean number(RecordTable.Field field) {
        return field.column().kind() == org.merewarden.intake.Column.Kind.NUMBER;
    }

    private static String shown(@Nullable Object value) {
        if (value instanceof Double number) {
            NumberFormat format = NumberFormat.getNumberInstance(LocaleContextHolder.getLocale());
            format.setMaximumFractionDigits(15);
            return format.format(number);
        }
        if (value instanceof LocalDate date) {
            return Figures.date(date);
        }
        return value == null || value.equals("") ? Figures.UNKNOWN : Objects.toString(value);
    }

    String word(String key, Object... details) {
        return messages.getMessage(key, details, LocaleContextHolder.getLocale());
    }
}
