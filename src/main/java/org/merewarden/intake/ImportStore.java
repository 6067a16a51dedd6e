package org.merewarden.intake;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.Clock;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.NotFound;
import org.merewarden.web.Who;
import org.springframework.dao.OptimisticLockingFailureException;
import org.springframework.jdbc.core.JdbcTemplate;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.jdbc.support.GeneratedKeyHolder;
import org.springframework.stereotype.Component;

/** Imports in the store, written in the caller's transaction. */
@Component
class ImportStore {
    private static final int BATCH = 1000;

    private final JdbcClient jdbc;
    private final JdbcTemplate batches;
    private final Clock clock;

    ImportStore(JdbcClient jdbc, JdbcTemplate batches, Clock clock) {
        this.jdbc = jdbc;
        this.batches = batches;
        this.clock = clock;
    }

    long insert(@Nullable String note) {
        GeneratedKeyHolder key = new GeneratedKeyHolder();
        jdbc.sql(
                        "insert into import_batch (state, uploaded_at, uploaded_by, note) values ('EXAMINED', :at, :by, :note)")
                .param("at", now())
                .param("by", Who.name())
                .param("note", note)
                .update(key, "id");
        return Objects.requireNonNull(key.getKeyAs(Number.class)).longValue();
    }

    void insert(long batch, ImportedFile file, List<String> unknownColumns) {
        GeneratedKeyHolder key = new GeneratedKeyHolder();
        jdbc.sql("""
                insert into import_file (batch_id, file_name, sheet_name, table_name, sha256, reading, decimal_mark, header,
                        unknown_columns, problem)
                values (:batch, :name, :sheet, :table, :sha256, :reading, :mark, :header, :unknown, :problem)""")
                .param("batch", batch)
                .param("name", Excerpt.of(file.fileName(), 300))
                .param("sheet", Excerpt.of(file.sheet(), 100))
                .param("table", file.table())
                .param("sha256", file.sha256())
                .param("reading", Excerpt.of(file.reading(), 400))
                .param("mark", file.decimalMark().name())
                .param("header", Json.write(file.header()))
                .param("unknown", Json.write(unknownColumns))
                .param("problem", file.problem() == null ? null : Excerpt.of(file.problem(), 4000))
                .update(key, "id");
        insertRows(Objects.requireNonNull(key.getKeyAs(Number.class)).longValue(), file.rows());
    }

    private void insertRows(long fileId, List<ImportedFile.Row> rows) {
        String sql = "insert into import_row (file_id, line_number, cells, reading_problem, fate, problems, remark)"
                + " values (?, ?, ?, ?, ?, ?, ?)";
        batches.batchUpdate(sql, rows, BATCH, (statement, row) -> {
            statement.setLong(1, fileId);
            statement.setInt(2, row.line());
            statement.setString(3, Json.write(row.cells()));
            statement.setString(4, row.readingProblem() == null ? null : Json.write(row.readingProblem()));
            statement.setString(5, row.fate().kind().name());
            statement.setString(6, problems(row.fate()));
            statement.setString(7, row.fate().remark());
        });
    }

    /** All files of the import with all their rows. */
    List<ImportedFile> files(long batch) {
        Map<Long, List<ImportedFile.Row>> rows = new HashMap<>();
        jdbc.sql("""
                select r.* from import_row r join import_file f on f.id = r.file_id
                where f.batch_id = ? order by r.file_id, r.line_number""").param(batch).query(result -> {
            rows.computeIfAbsent(result.getLong("file_id"), f -> new ArrayList<>())
                    .add(row(result));
        });
        return jdbc.sql("select * from import_file where batch_id = ? order by id")
                .param(batch)
                .query((result, n) -> file(result, rows.getOrDefault(result.getLong("id"), List.of())))
                .list();
    }

    private static ImportedFile file(ResultSet result, List<ImportedFile.Row> rows) throws SQLException {
        return new ImportedFile(
                result.getLong("id"),
                result.getString("file_name"),
                result.getString("sheet_name"),
                result.getString("table_name"),
                result.getString("sha256"),
                result.getString("reading"),
                DecimalMark.valueOf(result.getString("decimal_mark")),
                Json.texts(result.getString("header")),
                result.getString("problem"),
                result.getObject("left_out_at") != null,
                rows);
    }

    private static ImportedFile.Row row(ResultSet result) throws SQLException {
        return new ImportedFile.Row(
                result.getLong("id"),
                result.getInt("line_number"),
                Json.cells(result.getString("cells")),
                Json.problem(result.getString("reading_problem")),
                result.getObject("left_out_at") != null,
                new Fate(
                        Fate.Kind.valueOf(result.getString("fate")),
                        Json.problems(result.getString("problems")),
                        result.getString("remark")));
    }

    /** Writes the fates that differ from those stored. */
    void update(List<ImportedFile> before, List<ImportedFile> after, Examiner examiner) {
        List<ImportedFile.Row> changed = new ArrayList<>();
        for (int f = 0; f < after.size(); f++) {
            updateFile(after.get(f), examiner.unknownColumns(after.get(f)));
            for (int r = 0; r < after.get(f).rows().size(); r++) {
                ImportedFile.Row row = after.get(f).rows().get(r);
                if (!row.fate().equals(before.get(f).rows().get(r).fate())) {
                    changed.add(row);
                }
            }
        }
        String sql = "update import_row set fate = ?, problems = ?, remark = ? where id = ?";
        batches.batchUpdate(sql, changed, BATCH, (statement, row) -> {
            statement.setString(1, row.fate().kind().name());
            statement.setString(2, problems(row.fate()));
            statement.setString(3, row.fate().remark());
            statement.setLong(4, row.id());
        });
    }

    private void updateFile(ImportedFile file, List<String> unknownColumns) {
        jdbc.sql("update import_file set problem = :problem, unknown_columns = :unknown where id = :id")
                .param("problem", file.problem() == null ? null : Excerpt.of(file.problem(), 4000))
                .param("unknown", Json.write(unknownColumns))
                .param("id", file.id())
                .update();
    }

    /** Takes the import for a change: only while it is open and nobody changed it since it was shown. */
    void claim(long batch, int version) {
        int taken = jdbc.sql("update import_batch set version = version + 1"
                        + " where id = :id and version = :version and state = 'EXAMINED'")
                .param("id", batch)
                .param("version", version)
                .update();
        if (taken == 0) {
            throw new OptimisticLockingFailureException("import " + batch + " is no longer at version " + version);
        }
    }

    void decide(long batch, String state) {
        jdbc.sql("update import_batch set state = :state, decided_at = :at, decided_by = :by where id = :id")
                .param("state", state)
                .param("at", now())
                .param("by", Who.name())
                .param("id", batch)
                .update();
    }

    int version(long batch) {
        return jdbc.sql("select version from import_batch where id = ?")
                .param(batch)
                .query(Integer.class)
                .optional()
                .orElseThrow(() -> new NotFound("import " + batch));
    }

    /** Whether no import was ever stored in the register. */
    boolean isEmpty() {
        String sql = "select count(*) from import_batch where state = 'COMMITTED'";
        return jdbc.sql(sql).query(Long.class).single() == 0;
    }

    void chooseTable(long batch, long file, String table) {
        one(jdbc.sql("update import_file set table_name = :table where id = :id and batch_id = :batch")
                .param("table", table)
                .param("id", file)
                .param("batch", batch)
                .update());
    }

    void leaveFile(long batch, long file, boolean out) {
        one(jdbc.sql("update import_file set left_out_at = :at, left_out_by = :by where id = :id and batch_id = :batch")
                .param("at", out ? now() : null)
                .param("by", out ? Who.name() : null)
                .param("id", file)
                .param("batch", batch)
                .update());
    }

    void leaveRow(long batch, long row, boolean out) {
        one(jdbc.sql("update import_row set left_out_at = :at, left_out_by = :by where id = :id"
                        + " and file_id in (select id from import_file where batch_id = :batch)")
                .param("at", out ? now() : null)
                .param("by", out ? Who.name() : null)
                .param("id", row)
                .param("batch", batch)
                .update());
    }

    Map<String, String> cells(long batch, long row) {
        return jdbc.sql("select r.cells from import_row r join import_file f on f.id = r.file_id"
                        + " where r.id = :id and f.batch_id = :batch")
                .param("id", row)
                .param("batch", batch)
                .query((result, n) -> Json.cells(result.getString(1)))
                .optional()
                .orElseThrow(() -> new NotFound("row " + row + " of import " + batch));
    }

    /** Puts new cells into a row; what the file said is kept beside them. */
    void mend(long batch, long row, Map<String, String> cells) {
        one(jdbc.sql("""
                update import_row set original_cells = coalesce(original_cells, cells), cells = :cells,
                        reading_problem = null, mended_at = :at, mended_by = :by
                where id = :id and file_id in (select id from import_file where batch_id = :batch)""")
                .param("cells", Json.write(cells))
                .param("at", now())
                .param("by", Who.name())
                .param("id", row)
                .param("batch", batch)
                .update());
    }

    private static void one(int rows) {
        if (rows != 1) {
            throw new NotFound("no such row or file in this import");
        }
    }

    private static @Nullable String problems(Fate fate) {
        return fate.problems().isEmpty() ? null : Json.write(fate.problems());
    }

    private OffsetDateTime now() {
        return clock.instant().atOffset(ZoneOffset.UTC);
    }
}
