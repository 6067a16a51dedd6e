package org.merewarden.assessment;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.sql.Types;
import java.time.Clock;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.OptionalDouble;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Verdict;
import org.merewarden.web.NotFound;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.jdbc.support.GeneratedKeyHolder;
import org.springframework.stereotype.Repository;
import tools.jackson.core.type.TypeReference;
import tools.jackson.databind.json.JsonMapper;

/** Assessments in the store: written once, never changed. */
@Repository
class AssessmentStore implements Assessments {
    private static final String SUMMARY = """
            a.id, a.stock_id, a.number, a.made_at, a.made_by, a.evidence_hash, a.method, a.first_year, a.last_year,
            a.settled, a.verdict, a.strength, a.msy_low_t, a.msy_t, a.msy_high_t, a.fmsy, a.capacity_t,
            a.biomass_low_t, a.biomass_t, a.biomass_high_t, a.b_over_bmsy_low, a.b_over_bmsy, a.b_over_bmsy_high,
            a.last_removals_t, a.closed_last_season, a.trend""";
    private static final String LATEST =
            "a.number = (select max(b.number) from assessment b where b.stock_id = a.stock_id)";
    private static final TypeReference<Map<String, Double>> ESTIMATES = new TypeReference<>() {};

    private final JdbcClient jdbc;
    private final JsonMapper json;
    private final Clock clock;

    AssessmentStore(JdbcClient jdbc, JsonMapper json, Clock clock) {
        this.jdbc = jdbc;
        this.json = json;
        this.clock = clock;
    }

    /**
     * Stores the next assessment of the stock; returns its id. The stock's row is locked: of two runs over the same
     * stock the second waits for its number, and standings follow in the same order.
     */
    long add(
            long stockId,
            @Nullable Long jobId,
            String by,
            Evidence evidence,
            Posterior posterior,
            Map<String, Double> estimates) {
        jdbc.sql("select id from stock where id = ? for update")
                .param(stockId)
                .query(Long.class)
                .single();
        var summary = new Summary(posterior);
        int number = jdbc.sql("select coalesce(max(number), 0) + 1 from assessment where stock_id = ?")
                .param(stockId)
                .query(Integer.class)
                .single();
        var keys = new GeneratedKeyHolder();
        JdbcClient.StatementSpec insert = jdbc.sql("""
                        insert into assessment (stock_id, number, job_id, made_at, made_by, evidence_hash,
                            evidence_text, method, first_year, last_year, settled, verdict, strength,
                            msy_low_t, msy_t, msy_high_t, fmsy, capacity_t, biomass_low_t, biomass_t, biomass_high_t,
                            b_over_bmsy_low, b_over_bmsy, b_over_bmsy_high, last_removals_t, closed_last_season,
                            trend, estimates, diagnostics, draw_count, draws)
                        values (:stock, :number, :job, :at, :by, :hash, :evidence, :method, :first, :last, :settled,
                            :verdict, :strength, :msyLow, :msy, :msyHigh, :fmsy, :capacity, :biomassLow, :biomass,
                            :biomassHigh, :ratioLow, :ratio, :ratioHigh, :removals, :closed, :trend, :estimates,
                            :diagnostics, :count, :draws)""")
                .param("stock", stockId)
                .param("number", number)
                .param("job", jobId, Types.BIGINT)
                .param("at", clock.instant().atOffset(ZoneOffset.UTC))
                .param("by", by)
                .param("hash", evidence.contentHash())
                .param("evidence", json.writeValueAsString(evidence))
                .param("method", posterior.method())
                .param("first", posterior.firstYear())
                .param("last", posterior.lastYear())
                .param("settled", posterior.verdict().settled())
                .param("verdict", String.join("\n", posterior.verdict().reasons()))
                .param("strength", posterior.strength().name())
                .param("fmsy", summary.fmsy().middle(), Types.DOUBLE)
                .param("capacity", summary.capacity().middle(), Types.DOUBLE)
                .param("removals", lastRemovals(evidence, posterior), Types.DOUBLE)
                .param("closed", closed(evidence, posterior.lastYear()))
                .param("trend", summary.trend())
                .param("estimates", json.writeValueAsString(estimates))
                .param("diagnostics", json.writeValueAsString(posterior.diagnostics()))
                .param("count", posterior.draws())
                .param("draws", DrawsCodec.encode(posterior));
        band(insert, "msy", summary.msy());
        band(insert, "biomass", summary.biomass());
        band(insert, "ratio", summary.biomassOverBmsy());
        insert.update(keys, "id");
        return Objects.requireNonNull(keys.getKey()).longValue();
    }

    private static JdbcClient.StatementSpec band(JdbcClient.StatementSpec statement, String name, Summary.Band band) {
        return statement
                .param(name + "Low", band.low(), Types.DOUBLE)
                .param(name, band.middle(), Types.DOUBLE)
                .param(name + "High", band.high(), Types.DOUBLE);
    }

    /** Estimated where the method does so, else as recorded. */
    private static @Nullable Double lastRemovals(Evidence evidence, Posterior posterior) {
        OptionalDouble estimated = posterior.lastRemovals();
        if (estimated.isPresent()) {
            return estimated.getAsDouble();
        }
        var removals = evidence.removals(posterior.lastYear());
        return removals.isPresent() ? (Double) removals.getAsDouble() : null;
    }

    private static boolean closed(Evidence evidence, int year) {
        return evidence.events().stream().anyMatch(e -> e.kind().equals("closure") && e.year() == year);
    }

    /** Whether the job has stored an assessment of the stock already. */
    boolean madeBy(long jobId, long stockId) {
        return jdbc.sql("select count(*) from assessment where job_id = ? and stock_id = ?")
                        .params(jobId, stockId)
                        .query(Integer.class)
                        .single()
                > 0;
    }

    /** What the job has stored so far. */
    List<AssessmentView> ofJob(long jobId) {
        return jdbc.sql("select " + SUMMARY + " from assessment a where a.job_id = ?")
                .param(jobId)
                .query(AssessmentStore::view)
                .list();
    }

    /** Number of stocks with an assessment. */
    int assessedStocks() {
        return jdbc.sql("select count(distinct stock_id) from assessment")
                .query(Integer.class)
                .single();
    }

    @Override
    public List<AssessmentView> latest() {
        return jdbc.sql("select " + SUMMARY + " from assessment a where " + LATEST)
                .query(AssessmentStore::view)
                .list();
    }

    @Override
    public Optional<AssessmentView> latest(long stockId) {
        return jdbc.sql("select " + SUMMARY + " from assessment a where a.stock_id = ? and " + LATEST)
                .param(stockId)
                .query(AssessmentStore::view)
                .optional();
    }

    @Override
    public List<AssessmentView> ofStock(long stockId) {
        return jdbc.sql("select " + SUMMARY + " from assessment a where a.stock_id = ? order by a.number desc")
                .param(stockId)
                .query(AssessmentStore::view)
                .list();
    }

    @Override
    public Optional<AssessmentView> find(long stockId, int number) {
        return jdbc.sql("select " + SUMMARY + " from assessment a where a.stock_id = ? and a.number = ?")
                .params(stockId, number)
                .query(AssessmentStore::view)
                .optional();
    }

    @Override
    public Posterior posterior(long assessmentId) {
        return jdbc.sql(
                        "select method, first_year, settled, verdict, strength, estimates, diagnostics, draws from assessment where id = ?")
                .param(assessmentId)
                .query((row, n) -> posterior(row))
                .optional()
                .orElseThrow(() -> new NotFound("assessment " + assessmentId));
    }

    private Posterior posterior(ResultSet row) throws SQLException {
        DrawsCodec.Draws draws = DrawsCodec.decode(row.getBytes("draws"));
        return new Posterior(
                row.getString("method"),
                row.getInt("first_year"),
                draws.msy(),
                draws.fmsy(),
                draws.shape(),
                draws.biomass(),
                draws.fishing(),
                draws.removals(),
                draws.parameters(),
                json.readValue(row.getString("estimates"), ESTIMATES),
                EvidenceStrength.valueOf(row.getString("strength")),
                new Verdict(row.getBoolean("settled"), lines(row.getString("verdict"))),
                diagnostics(row.getString("diagnostics")));
    }

    private Diagnostics diagnostics(@Nullable String text) {
        return text == null ? Diagnostics.NONE : json.readValue(text, Diagnostics.class);
    }

    @Override
    public Evidence evidence(long assessmentId) {
        return jdbc.sql("select evidence_text from assessment where id = ?")
                .param(assessmentId)
                .query((row, n) -> json.readValue(row.getString(1), Evidence.class))
                .optional()
                .orElseThrow(() -> new NotFound("assessment " + assessmentId));
    }

    private static List<String> lines(String text) {
        return text.isEmpty() ? List.of() : text.lines().toList();
    }

    private static AssessmentView view(ResultSet row, int n) throws SQLException {
        return new AssessmentView(
                row.getLong("id"),
                row.getLong("stock_id"),
                row.getInt("number"),
                row.getObject("made_at", OffsetDateTime.class).toInstant(),
                row.getString("made_by"),
                row.getString("evidence_hash"),
                row.getString("method"),
                row.getInt("first_year"),
                row.getInt("last_year"),
                row.getBoolean("settled"),
                lines(row.getString("verdict")),
                row.getString("strength"),
                row.getObject("msy_low_t", Double.class),
                row.getObject("msy_t", Double.class),
                row.getObject("msy_high_t", Double.class),
                row.getObject("fmsy", Double.class),
                row.getObject("capacity_t", Double.class),
                row.getObject("biomass_low_t", Double.class),
                row.getObject("biomass_t", Double.class),
                row.getObject("biomass_high_t", Double.class),
                row.getObject("b_over_bmsy_low", Double.class),
                row.getObject("b_over_bmsy", Double.class),
                row.getObject("b_over_bmsy_high", Double.class),
                row.getObject("last_removals_t", Double.class),
                row.getBoolean("closed_last_season"),
                trend(row.getString("trend")));
    }

    private static List<Double> trend(String text) {
        return text.isBlank()
                ? List.of()
                : Arrays.stream(text.trim().split(" ")).map(Double::valueOf).toList();
    }
}
