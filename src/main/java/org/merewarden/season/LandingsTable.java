package org.merewarden.season;

import static org.merewarden.intake.Column.code;
import static org.merewarden.intake.Column.date;
import static org.merewarden.intake.Column.integer;
import static org.merewarden.intake.Column.number;
import static org.merewarden.intake.Column.text;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.Limits;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Problem;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableDefinition;
import org.merewarden.intake.TableHandler;
import org.merewarden.intake.TableRow;
import org.merewarden.season.LandingStore.Act;
import org.merewarden.season.LandingStore.Origin;
import org.merewarden.waterbody.Register;
import org.merewarden.web.Seasons;
import org.springframework.stereotype.Component;

/** Landings from files. The same rules as the form's; a key that stands for other content is refused, never replaced. */
@Component
class LandingsTable implements TableHandler {
    static final TableDefinition DEFINITION = new TableDefinition("landings", "Landings, line by line", 130, columns());

    private final LandingStore store;
    private final Register register;
    private final Limits limits;
    private final ClosedLimits closed;
    private final Seasons seasons;

    LandingsTable(LandingStore store, Register register, Limits limits, ClosedLimits closed, Seasons seasons) {
        this.store = store;
        this.register = register;
        this.limits = limits;
        this.closed = closed;
        this.seasons = seasons;
    }

    private static List<org.merewarden.intake.Column> columns() {
        double any = Double.POSITIVE_INFINITY;
        return List.of(
                code("key", "The sender's own name for the line; sending it again changes nothing")
                        .asKey(),
                date("date", "Day of the landing").mandatory(),
                text("slip", "Number of the landing slip").atMost(60),
                code("water_body", "Code of the water body").mandatory(),
                code("species", "FAO three-letter code, or mixed").mandatory(),
                code("population", "Only where a water holds two stocks of one species")
                        .atMost(40),
                code("cooperative", "Code of the cooperative"),
                text("sector", "Who fished")
                        .oneOf(
                                "commercial",
                                "subsistence",
                                "angling",
                                "other party",
                                "unlawful",
                                "research",
                                "discards")
                        .orElse("commercial"),
                text("gear", "Gear used").atMost(60),
                number("nets", "Number of nets, traps or hooks").between(0, EntryRules.MAX_EFFORT),
                number("nights", "Nights they stood").between(0, EntryRules.MAX_EFFORT),
                number("weight_kg", "Weight as landed, kg").mandatory().between(0, EntryRules.MAX_WEIGHT_KG),
                text("presentation", "How it was landed: whole, gutted …")
                        .atMost(60)
                        .orElse("whole"),
                integer("number", "Number of fish").between(0, any),
                text("fate", "What became of it")
                        .oneOf("kept", "discarded", "released", "seized")
                        .orElse("kept"),
                text("place", "Landing place; no person's name").atMost(200),
                text("note", "Remark; no person's name").atMost(2000));
    }

    @Override
    public TableDefinition definition() {
        return DEFINITION;
    }

    @Override
    public List<Fate> examine(List<TableRow> rows, Batch batch) {
        EntryRules rules = rules();
        Map<String, LandingRow> stored = store
                .byKeys(rows.stream().map(row -> row.need("key")).toList())
                .stream()
                .collect(Collectors.toMap(row -> row.entry().key(), row -> row));
        List<Fate> fates = new ArrayList<>(rows.size());
        for (TableRow row : rows) {
            fates.add(fate(row, rules, stored, batch));
        }
        return fates;
    }

    private static Fate fate(TableRow row, EntryRules rules, Map<String, LandingRow> stored, Batch batch) {
        Entry entry = entry(row);
        if (entry.key().startsWith(LandingLog.OWN_KEYS)) {
            return Fate.refused(new Problem("key", entry.key(), "may not begin with " + LandingLog.OWN_KEYS));
        }
        LandingRow before = stored.get(entry.key());
        if (before != null) {
            return before.entry().equals(entry) ? Fate.SAME : Fate.refused(taken(before));
        }
        List<Problem> problems = rules.problems(entry).stream()
                .filter(problem -> !broughtAlong(problem, entry, batch))
                .toList();
        return problems.isEmpty() ? Fate.NEW : Fate.refused(problems.toArray(Problem[]::new));
    }

    /** Whether the same import brings what the register does not hold yet. */
    private static boolean broughtAlong(Problem problem, Entry entry, Batch batch) {
        return switch (problem.column()) {
            case "water_body" -> batch.brings("water-bodies", entry.lake());
            case "cooperative" -> batch.brings("cooperatives", Objects.requireNonNullElse(entry.cooperative(), ""));
            case "presentation" -> batch.rows("conversions").stream().anyMatch(row -> converts(row, entry));
            default -> false;
        };
    }

    private static boolean converts(TableRow conversion, Entry entry) {
        return conversion.need("species").equals(entry.species())
                && conversion.need("presentation").equals(entry.presentation())
                && !Objects.requireNonNull(conversion.date("valid_from")).isAfter(entry.landedOn());
    }

    private static Problem taken(LandingRow before) {
        return new Problem(
                "key",
                before.entry().key(),
                "stands for another landing already (" + before.entry().text()
                        + "); a correction is a new entry: correct it in the log, or send a new key");
    }

    @Override
    public void store(List<TableRow> rows, Provenance provenance) {
        EntryRules rules = rules();
        List<Checked> checked =
                rows.stream().map(row -> rules.check(entry(row))).toList();
        store.insert(checked, Act.LANDING, new Origin(provenance.importId(), provenance.at(), provenance.by()));
    }

    private EntryRules rules() {
        return new EntryRules(register, seasons, new References.Loaded(register, limits, closed, store));
    }

    private static Entry entry(TableRow row) {
        String species = row.need("species");
        return new Entry(
                row.need("key"),
                Objects.requireNonNull(row.date("date")),
                row.text("slip"),
                row.need("water_body"),
                species.equalsIgnoreCase(Entry.MIXED) ? Entry.MIXED : species.toUpperCase(java.util.Locale.ROOT),
                row.textOrEmpty("population"),
                row.text("cooperative"),
                orElse(row.text("sector"), "commercial"),
                row.text("gear"),
                row.number("nets"),
                row.number("nights"),
                Objects.requireNonNull(row.number("weight_kg")),
                orElse(row.text("presentation"), "whole"),
                row.integer("number"),
                orElse(row.text("fate"), "kept"),
                row.text("place"),
                row.text("note"));
    }

    private static String orElse(@Nullable String text, String fallback) {
        return text == null ? fallback : text;
    }
}
