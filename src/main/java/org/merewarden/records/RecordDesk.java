package org.merewarden.records;

import java.time.Clock;
import java.time.ZoneOffset;
import java.util.List;
import java.util.Map;
import org.merewarden.activity.ActivityLog;
import org.merewarden.intake.Column;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Problem;
import org.merewarden.intake.TableRow;
import org.merewarden.records.RecordStore.Entry;
import org.merewarden.web.Cells;
import org.merewarden.web.Who;
import org.springframework.beans.factory.ObjectProvider;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;
import org.springframework.validation.Errors;

/** Records typed by people: the rules of the importer, a new entry for each correction, and a line in the activity log. */
@Service
class RecordDesk {
    private final List<RecordHandler> handlers;
    private final ActivityLog log;
    private final Clock clock;

    RecordDesk(ObjectProvider<RecordHandler> handlers, ActivityLog log, Clock clock) {
        this.handlers = handlers.stream().toList();
        this.log = log;
        this.clock = clock;
    }

    /** Stores the record unless errors were found; the handler's problems are added to the fields they are about. */
    @Transactional
    void enter(RecordForm form, Map<String, String> owner, String subject, Errors errors) {
        if (errors.hasErrors()) {
            return;
        }
        TableRow row = form.row(owner);
        RecordHandler handler = handler(form.table());
        checkChoices(form.table(), row, errors);
        checkBounds(form.table(), row, errors);
        if (errors.hasErrors()) {
            return;
        }
        Fate fate = handler.examineOne(row);
        fate.problems().forEach(problem -> reject(form.table(), problem, errors));
        if (errors.hasErrors() || fate.kind() == Fate.Kind.SAME) {
            return;
        }
        handler.store(List.of(row), new Entry(null, Who.name(), clock.instant().atOffset(ZoneOffset.UTC)));
        log.record(
                (fate.kind() == Fate.Kind.NEW ? "recorded " : "corrected ")
                        + form.table().name(),
                subject + ", " + form.year,
                fate.kind() == Fate.Kind.NEW ? null : fate.remark(),
                Cells.describe(form.table().cells(row)));
    }

    private RecordHandler handler(RecordTable table) {
        return handlers.stream()
                .filter(h -> h.definition().name().equals(table.name()))
                .findFirst()
                .orElseThrow();
    }

    private static void checkChoices(RecordTable table, TableRow row, Errors errors) {
        table.fields().stream()
                .map(RecordTable.Field::column)
                .filter(c -> !c.choices().isEmpty() && !c.choices().contains(row.textOrEmpty(c.name())))
                .forEach(c -> errors.rejectValue(
                        RecordForm.property(c.name()),
                        "records.choice",
                        new Object[] {row.textOrEmpty(c.name())},
                        "none of the choices"));
    }

    /** The bounds of the columns hold for typed figures too, also where a form's own rules are silent. */
    private static void checkBounds(RecordTable table, TableRow row, Errors errors) {
        for (RecordTable.Field field : table.fields()) {
            Column column = field.column();
            if (row.values().get(column.name()) instanceof Number number
                    && !(number.doubleValue() >= column.min() && number.doubleValue() <= column.max())) {
                errors.rejectValue(
                        RecordForm.property(column.name()),
                        "records.bounds",
                        new Object[] {Cells.text(number), Cells.plain(column.min()), Cells.plain(column.max())},
                        "out of bounds");
            }
        }
    }

    private static void reject(RecordTable table, Problem problem, Errors errors) {
        String text = problem.value().isEmpty() ? problem.rule() : problem.rule() + ": " + problem.value();
        boolean ofForm = table.fields().stream().anyMatch(f -> f.column().name().equals(problem.column()));
        if (ofForm) {
            errors.rejectValue(RecordForm.property(problem.column()), "records.rule", text);
        } else {
            errors.reject("records.rule", text);
        }
    }
}
