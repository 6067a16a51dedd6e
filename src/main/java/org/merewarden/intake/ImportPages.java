package org.merewarden.intake;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.Instant;
import java.time.OffsetDateTime;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.ImportPage.FileLine;
import org.merewarden.intake.ImportPage.FilterLink;
import org.merewarden.intake.ImportPage.Refusal;
import org.merewarden.intake.ImportPage.RowLine;
import org.merewarden.intake.ImportPage.Summary;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;

/** Reads imports for their pages, with a fixed number of statements whatever their size. */
@Component
class ImportPages {
    static final int PAGE = 100;
    private static final List<String> FATES = List.of("REFUSED", "CHANGED", "NEW", "SAME", "LEFT_OUT");
    private static final String FATE = "case when r.left_out_at is not null then 'LEFT_OUT' else r.fate end";
    /** Rows of files that are left out, unreadable or of an unknown table have no fate of their own. */
    private static final String COUNTED =
            "f.batch_id = :batch and f.left_out_at is null and f.problem is null and f.table_name is not null";

    private final JdbcClient jdbc;
    private final Tables tables;
    private final Words words;

    ImportPages(JdbcClient jdbc, Tables tables, Words words) {
        this.jdbc = jdbc;
        this.tables = tables;
        this.words = words;
    }

    /** The latest imports first. */
    List<Summary> latest(int most) {
        Map<Long, String> files = new HashMap<>();
        jdbc.sql(
                        "select batch_id, file_name, sheet_name from import_file where batch_id in (select id from import_batch"
                                + " order by id desc limit :most) order by id")
                .param("most", most)
                .query(f -> {
                    String sheet = f.getString(3).isEmpty() ? "" : " (" + f.getString(3) + ")";
                    files.merge(f.getLong(1), f.getString(2) + sheet, (a, b) -> a + ", " + b);
                });
        return jdbc
                .sql("select * from import_batch order by id desc limit :most")
                .param("most", most)
                .query((b, n) -> Decided.of(b))
                .list()
                .stream()
                .map(b -> new Summary(
                        "/imports/" + b.id(),
                        Long.toString(b.id()),
                        Figures.dateTime(b.uploadedAt()),
                        b.uploadedBy(),
                        Excerpt.of(files.getOrDefault(b.id(), ""), 300),
                        words.of("state." + b.state()),
                        b.note()))
                .toList();
    }

    private record Decided(
            long id,
            int version,
            String state,
            Instant uploadedAt,
            String uploadedBy,
            @Nullable Instant decidedAt,
            String decidedBy,
            String note) {
        static Decided of(ResultSet b) throws SQLException {
            OffsetDateTime decided = b.getObject("decided_at", OffsetDateTime.class);
            return new Decided(
                    b.getLong("id"),
                    b.getInt("version"),
                    b.getString("state"),
                    b.getObject("uploaded_at", OffsetDateTime.class).toInstant(),
                    b.getString("uploaded_by"),
                    decided == null ? null : decided.toInstant(),
                    Objects.requireNonNullElse(b.getString("decided_by"), ""),
                    Objects.requireNonNullElse(b.getString("note"), ""));
        }
    }

    /** @param fate one of refused, changed, new, same, left-out; anything else: all, refused first */
    ImportPage page(long id, @Nullable String fate, int page) {
        String wanted = fate == null ? "" : fate.toUpperCase(Locale.ROOT).replace('-', '_');
        String kind = FATES.contains(wanted) ? wanted : "";
        Decided batch = jdbc.sql("select * from import_batch where id = :id")
                .param("id", id)
                .query((b, n) -> Decided.of(b))
                .optional()
                .orElseThrow(() -> new NotFound("import " + id));
        return page(id, batch, kind, Math.max(1, page));
    }

    private ImportPage page(long id, Decided batch, String kind, int page) {
        boolean open = batch.state().equals("EXAMINED");
        Map<Long, Map<String, Integer>> counts = counts(id);
        List<FileLine> files = new ArrayList<>();
        boolean hindered = readFiles(id, counts, files);
        Map<String, Integer> total = new HashMap<>();
        counts.values().forEach(c -> c.forEach((k, v) -> total.merge(k, v, Integer::sum)));
        List<Refusal> refusals = new ArrayList<>();
        List<RowLine> rows = new ArrayList<>();
        boolean more = readRows(id, kind, page, open, refusals, rows);
        return new ImportPage(
                id,
                batch.version(),
                open,
                open && !hindered && !total.containsKey("REFUSED"),
                words.of("lede." + batch.state(), counted(total), files.size()),
                record(batch),
                files,
                filters(id, kind, total),
                refusals,
                rows,
                page > 1 ? address(id, kind, page - 1) : null,
                more ? address(id, kind, page + 1) : null);
    }

    private String counted(Map<String, Integer> total) {
        if (total.isEmpty()) {
            return words.of("count.none");
        }
        return String.join(
                ", ",
                FATES.stream()
                        .filter(total::containsKey)
                        .map(f -> words.of("count." + f, total.getOrDefault(f, 0)))
                        .toList());
    }

    private String record(Decided batch) {
        String uploaded = words.of("record.uploaded", batch.uploadedBy(), Figures.dateTime(batch.uploadedAt()));
        return batch.decidedAt() == null
                ? uploaded
                : uploaded + " "
                        + words.of("record." + batch.state(), batch.decidedBy(), Figures.dateTime(batch.decidedAt()));
    }

    private Map<Long, Map<String, Integer>> counts(long id) {
        Map<Long, Map<String, Integer>> counts = new HashMap<>();
        jdbc.sql("select f.id, " + FATE + " as what, count(*) from import_row r join import_file f on f.id = r.file_id"
                        + " where " + COUNTED + " group by f.id, " + FATE)
                .param("batch", id)
                .query(r -> {
                    counts.computeIfAbsent(r.getLong(1), f -> new HashMap<>()).put(r.getString(2), r.getInt(3));
                });
        return counts;
    }

    /** @return whether a file stands in the way of storing the import */
    private boolean readFiles(long id, Map<Long, Map<String, Integer>> counts, List<FileLine> lines) {
        List<Boolean> hindrances = jdbc.sql("select * from import_file where batch_id = :batch order by id")
                .param("batch", id)
                .query((f, n) -> {
                    boolean out = f.getObject("left_out_at") != null;
                    lines.add(fileLine(id, f, out, counts.getOrDefault(f.getLong("id"), Map.of())));
                    return !out && (f.getString("problem") != null || f.getString("table_name") == null);
                })
                .list();
        return hindrances.contains(true);
    }

    private FileLine fileLine(long id, ResultSet f, boolean out, Map<String, Integer> count) throws SQLException {
        String sheet = f.getString("sheet_name");
        String table = f.getString("table_name");
        String problem = f.getString("problem");
        String address = "/imports/" + id + "/files/" + f.getLong("id");
        boolean readable = !f.getString("header").equals("[]");
        return new FileLine(
                readable ? address + "/table" : "",
                address + "/left-out",
                f.getString("file_name") + (sheet.isEmpty() ? "" : " (" + sheet + ")"),
                table == null ? "" : table,
                f.getString("reading"),
                String.join(", ", Json.texts(f.getString("unknown_columns"))),
                problem != null ? problem : table == null ? words.of("table.unknown") : "",
                number(count, "NEW"),
                number(count, "CHANGED"),
                number(count, "SAME"),
                number(count, "REFUSED"),
                out ? words.of("file.out", f.getString("left_out_by")) : number(count, "LEFT_OUT"),
                out);
    }

    private static String number(Map<String, Integer> count, String fate) {
        return Integer.toString(count.getOrDefault(fate, 0));
    }

    private List<FilterLink> filters(long id, String kind, Map<String, Integer> total) {
        List<FilterLink> links = new ArrayList<>();
        links.add(new FilterLink("/imports/" + id, words.of("filter.all"), kind.isEmpty()));
        for (String fate : FATES) {
            if (total.containsKey(fate)) {
                links.add(new FilterLink(
                        address(id, fate, 1),
                        words.of("count." + fate, total.getOrDefault(fate, 0)),
                        kind.equals(fate)));
            }
        }
        return links;
    }

    private static String address(long id, String kind, int page) {
        String fate =
                kind.isEmpty() ? "" : "fate=" + kind.toLowerCase(Locale.ROOT).replace('_', '-') + "&";
        return "/imports/" + id + "?" + fate + "page=" + page;
    }

    /** @return whether there are more rows than one page */
    private boolean readRows(long id, String kind, int page, boolean open, List<Refusal> refusals, List<RowLine> rows) {
        List<Long> found = jdbc.sql("select r.*, f.file_name, f.sheet_name, f.table_name, " + FATE + " as what"
                        + " from import_row r join import_file f on f.id = r.file_id where " + COUNTED
                        + " and (:kind = '' or " + FATE + " = :kind) order by case " + FATE
                        + " when 'REFUSED' then 0 when 'CHANGED' then 1 when 'NEW' then 2 when 'SAME' then 3 else 4 end,"
                        + " r.file_id, r.line_number limit :most offset :from")
                .param("batch", id)
                .param("kind", kind)
                .param("most", PAGE + 1)
                .param("from", (long) (page - 1) * PAGE)
                .query((r, n) -> {
                    if (n < PAGE) {
                        addRow(id, r, open, refusals, rows);
                    }
                    return r.getLong("id");
                })
                .list();
        return found.size() > PAGE;
    }

    private void addRow(long id, ResultSet r, boolean open, List<Refusal> refusals, List<RowLine> rows)
            throws SQLException {
        String sheet = r.getString("sheet_name");
        String file = r.getString("file_name") + (sheet.isEmpty() ? "" : " (" + sheet + ")");
        String address = "/imports/" + id + "/rows/" + r.getLong("id");
        String line = Integer.toString(r.getInt("line_number"));
        String what = r.getString("what");
        if (what.equals("REFUSED")) {
            for (Problem p : Json.problems(r.getString("problems"))) {
                refusals.add(new Refusal(open ? address : "", file, line, p.column(), p.value(), p.rule()));
            }
        } else {
            String remark =
                    what.equals("LEFT_OUT") ? words.of("row.out", r.getString("left_out_by")) : r.getString("remark");
            String mender = r.getString("mended_by");
            String mended = mender == null ? "" : " " + words.of("row.mended", mender);
            String key = key(r.getString("table_name"), Json.cells(r.getString("cells")));
            rows.add(new RowLine(address, file, line, key, words.of("fate." + what), (remark + mended).strip()));
        }
    }

    private String key(String table, Map<String, String> cells) {
        List<String> names = tables.find(table).map(TableDefinition::keys).orElse(List.of()).stream()
                .map(Column::name)
                .filter(cells::containsKey)
                .toList();
        return Excerpt.of(String.join(" · ", names.stream().map(cells::get).toList()), 200);
    }
}
