package org.merewarden.advice;

import java.time.Instant;
import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Problem;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableDefinition;
import org.merewarden.intake.TableHandler;
import org.merewarden.intake.TableRow;
import org.merewarden.records.EvidenceReader;
import org.merewarden.records.PaperLimits;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockReferences;
import org.merewarden.web.Seasons;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;

/**
 * Limits entered from earlier papers. A decision on record is never edited: a row that says something else of a limit
 * issued on the same day is refused.
 */
@Component
class LimitsTable implements TableHandler {
    private final JdbcClient jdbc;
    private final Register register;
    private final EvidenceReader evidence;
    private final LimitWriter writer;
    private final StandingKeeper standings;
    private final Seasons seasons;

    LimitsTable(
            JdbcClient jdbc,
            Register register,
            EvidenceReader evidence,
            LimitWriter writer,
            StandingKeeper standings,
            Seasons seasons) {
        this.jdbc = jdbc;
        this.register = register;
        this.evidence = evidence;
        this.writer = writer;
        this.standings = standings;
        this.seasons = seasons;
    }

    /** A limit on record: when it was issued and what it says. */
    private record Stored(LocalDate issuedOn, String reason, NewLimit limit) {}

    @Override
    public TableDefinition definition() {
        return PaperLimits.DEFINITION;
    }

    @Override
    public List<Fate> examine(List<TableRow> rows, Batch batch) {
        StockReferences references = StockReferences.of(register);
        Map<String, Stored> stored = stored();
        Map<String, Long> decided = decidedInForce();
        return rows.stream()
                .map(row -> fate(row, references, stored, decided, batch))
                .toList();
    }

    private Fate fate(
            TableRow row,
            StockReferences references,
            Map<String, Stored> stored,
            Map<String, Long> decided,
            Batch batch) {
        Problem unknown = references.stockProblem(row, batch);
        if (unknown != null) {
            return Fate.refused(unknown);
        }
        Optional<Problem> problem = PaperLimits.problem(row, from(row), to(row), seasons.today());
        if (problem.isPresent()) {
            return Fate.refused(problem.get());
        }
        Stored earlier = references
                .stock(row)
                .map(stock -> stored.get(key(stock.id(), row)))
                .orElse(null);
        if (earlier == null) {
            return references
                    .stock(row)
                    .map(stock -> decided.get(stock.id() + "|" + PaperLimits.season(row)))
                    .map(notice -> Fate.refused(new Problem(
                            "season",
                            Integer.toString(PaperLimits.season(row)),
                            "notice " + notice + ", decided in this office, is in force; a limit from papers does not"
                                    + " supersede it: propose a revision or withdraw the notice first")))
                    .orElse(Fate.NEW);
        }
        return sameContent(earlier, row)
                ? Fate.SAME
                : Fate.refused(new Problem(
                        "issued_on",
                        Objects.toString(row.date("issued_on")),
                        "a limit issued on this day is on record with other content; a decision is never edited: issue"
                                + " a revision"));
    }

    private LocalDate from(TableRow row) {
        LocalDate given = row.date("valid_from");
        return given != null ? given : seasons.start(PaperLimits.season(row));
    }

    private LocalDate to(TableRow row) {
        LocalDate given = row.date("valid_to");
        return given != null ? given : seasons.end(PaperLimits.season(row));
    }

    private boolean sameContent(Stored earlier, TableRow row) {
        NewLimit told = limit(earlier.limit().stockId(), row, earlier.limit().reportedFraction());
        NewLimit known = earlier.limit();
        return told.kind().equals(known.kind())
                && Objects.equals(told.amount(), known.amount())
                && told.unit().equals(known.unit())
                && told.setAsidesTonnes() == known.setAsidesTonnes()
                && told.validFrom().equals(known.validFrom())
                && told.validTo().equals(known.validTo())
                && Objects.equals(told.measures(), known.measures())
                && Objects.equals(told.legalBasis(), known.legalBasis())
                && reason(row).equals(earlier.reason());
    }

    @Override
    public void store(List<TableRow> rows, Provenance provenance) {
        StockReferences references = StockReferences.of(register);
        Map<Long, Double> reported = new HashMap<>();
        // in the order of their numbers, so that two imports of several stocks do not wait for each other
        rows.stream()
                .map(row -> references.stock(row).orElseThrow().id())
                .distinct()
                .sorted()
                .forEach(writer::lockStock);
        rows.stream()
                .sorted(Comparator.comparing(row -> Objects.requireNonNull(row.date("issued_on"))))
                .forEach(row -> {
                    long stock = references.stock(row).orElseThrow().id();
                    store(row, stock, reported.computeIfAbsent(stock, this::reportedFraction), provenance);
                });
        reported.keySet().forEach(standings::refresh);
    }

    private void store(TableRow row, long stock, double reported, Provenance provenance) {
        NewLimit limit = limit(stock, row, reported);
        long id = writer.add(limit, provenance.by());
        LocalDate issuedOn = Objects.requireNonNull(row.date("issued_on"));
        Instant issued = issuedOn.atStartOfDay(ZoneOffset.UTC).toInstant();
        writer.decide(id, LimitWriter.ISSUED, provenance.by(), issued, reason(row));
        writer.enterInForce(id, limit, issued, provenance.by());
    }

    private NewLimit limit(long stock, TableRow row, double reportedFraction) {
        String unit = row.text("unit");
        return new NewLimit(
                stock,
                PaperLimits.season(row),
                row.need("kind"),
                row.number("amount"),
                unit == null ? "t" : unit,
                0,
                0,
                0,
                Objects.requireNonNullElse(row.number("set_aside_t"), 0.0),
                reportedFraction,
                from(row),
                to(row),
                row.text("measures"),
                row.text("legal_basis"),
                null,
                null,
                "entered",
                Terms.OF_PAPER);
    }

    private static String reason(TableRow row) {
        return Objects.requireNonNullElse(row.text("reason"), "entered from earlier papers");
    }

    /** The commercial sector's reported fraction in its latest season on record; 1 where none is. */
    private double reportedFraction(long stockId) {
        return evidence.evidence(stockId).catches().stream()
                .filter(c -> c.sector().equals("commercial"))
                .max(Comparator.comparingInt(CatchRecord::year))
                .map(CatchRecord::reportedFraction)
                .orElse(1.0);
    }

    private Map<String, Stored> stored() {
        return jdbc
                .sql("""
                        select l.*, d.effective_at as issued_at, d.reason as decided_reason from catch_limit l
                        join limit_decision d on d.limit_id = l.id and d.act = 'ISSUED'
                        where l.origin = 'entered'""")
                .query((row, n) -> new Stored(
                        row.getObject("issued_at", OffsetDateTime.class)
                                .atZoneSameInstant(ZoneOffset.UTC)
                                .toLocalDate(),
                        row.getString("decided_reason"),
                        LimitHistory.limit(row, n)))
                .list()
                .stream()
                .collect(Collectors.toMap(
                        s -> key(s.limit().stockId(), s.limit().season(), s.issuedOn()), Function.identity()));
    }

    /** Numbers of the notices in force that were decided in this office, by stock and season. */
    private Map<String, Long> decidedInForce() {
        Map<String, Long> decided = new HashMap<>();
        jdbc.sql("""
                        select f.stock_id, f.season_year, f.limit_id from limit_in_force f
                        join catch_limit l on l.id = f.limit_id where l.origin = 'decided'""").query(row -> {
            decided.put(row.getLong(1) + "|" + row.getInt(2), row.getLong(3));
        });
        return decided;
    }

    private static String key(long stock, TableRow row) {
        return key(stock, PaperLimits.season(row), row.date("issued_on"));
    }

    private static String key(long stock, int season, @Nullable LocalDate issuedOn) {
        return stock + "|" + season + "|" + issuedOn;
    }
}
