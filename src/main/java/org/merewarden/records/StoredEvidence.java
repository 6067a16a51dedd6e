package org.merewarden.records;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.util.List;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.AreaRecord;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.evidence.Traits;
import org.merewarden.web.NotFound;
import org.springframework.jdbc.core.RowMapper;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Maps the rows in force of one stock to the core's evidence, in seven statements. */
@Service
class StoredEvidence implements EvidenceReader {
    private record Subject(long waterBodyId, String species, String population, Habitat habitat, Traits traits) {}

    private final JdbcClient jdbc;

    StoredEvidence(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    @Override
    @Transactional(readOnly = true)
    public Evidence evidence(long stockId) {
        Subject subject = subject(stockId);
        return new Evidence(
                subject.habitat(),
                subject.traits(),
                catches(stockId),
                ofStock("effort_record", stockId, StoredEvidence::readEffort),
                ofStock("survey_record", stockId, StoredEvidence::readSurvey),
                events(subject),
                areas(subject),
                ofStock("prior_record", stockId, StoredEvidence::readPrior));
    }

    private Subject subject(long stockId) {
        return jdbc.sql("""
                select w.*, s.species, s.population, s.recruitment, s.productivity, s.max_age_years,
                    s.growth_k_per_year, s.growth_linf_cm, s.share_of_lake_yield,
                    (select count(*) from stock other where other.water_body_id = w.id) as stocks_in_lake
                from stock s join water_body w on w.id = s.water_body_id
                where s.id = :stock""")
                .param("stock", stockId)
                .query(StoredEvidence::readSubject)
                .optional()
                .orElseThrow(() -> new NotFound("no stock with the number " + stockId));
    }

    /** A provisional catch is a forecast of the season in progress, not evidence. */
    private List<CatchRecord> catches(long stockId) {
        return jdbc.sql("select * from catch_record where stock_id = :stock and current_mark = true"
                        + " and provisional = false")
                .param("stock", stockId)
                .query(StoredEvidence::readCatch)
                .list();
    }

    private <T> List<T> ofStock(String table, long stockId, RowMapper<T> mapper) {
        return jdbc.sql("select * from " + table + " where stock_id = :stock and current_mark = true")
                .param("stock", stockId)
                .query(mapper)
                .list();
    }

    private List<EventRecord> events(Subject subject) {
        return jdbc.sql("""
                select * from event_record where water_body_id = :water and current_mark = true
                    and (species = '' or (species = :species and population = :population))""")
                .param("water", subject.waterBodyId())
                .param("species", subject.species())
                .param("population", subject.population())
                .query(StoredEvidence::readEvent)
                .list();
    }

    private List<AreaRecord> areas(Subject subject) {
        return jdbc.sql("select * from area_record where water_body_id = :water and current_mark = true")
                .param("water", subject.waterBodyId())
                .query((row, n) -> new AreaRecord(row.getInt("season_year"), row.getDouble("area_ha")))
                .list();
    }

    private static Subject readSubject(ResultSet row, int number) throws SQLException {
        Habitat habitat = new Habitat(
                row.getString("kind"),
                row.getDouble("area_ha"),
                number(row, "mean_depth_m"),
                number(row, "dissolved_solids_mg_l"),
                number(row, "conductivity_us_cm"),
                number(row, "mean_air_temperature_c"),
                row.getInt("stocks_in_lake"));
        Traits traits = new Traits(
                row.getString("species"),
                "stocked only".equals(row.getString("recruitment")),
                row.getString("productivity"),
                number(row, "max_age_years"),
                number(row, "growth_k_per_year"),
                number(row, "growth_linf_cm"),
                number(row, "share_of_lake_yield"));
        return new Subject(row.getLong("id"), row.getString("species"), row.getString("population"), habitat, traits);
    }

    private static CatchRecord readCatch(ResultSet row, int number) throws SQLException {
        return new CatchRecord(
                row.getInt("season_year"),
                row.getString("sector"),
                row.getDouble("catch_t"),
                number(row, "cv"),
                Objects.requireNonNullElse(number(row, "reported_fraction"), 1.0));
    }

    private static EffortRecord readEffort(ResultSet row, int number) throws SQLException {
        return new EffortRecord(
                row.getInt("season_year"), row.getString("series"), row.getDouble("effort"), row.getString("unit"));
    }

    private static SurveyRecord readSurvey(ResultSet row, int number) throws SQLException {
        return new SurveyRecord(
                row.getInt("season_year"),
                row.getString("series"),
                row.getDouble("time_of_year"),
                "biomass".equals(row.getString("kind")),
                row.getDouble("amount"),
                number(row, "cv"),
                number(row, "nets"));
    }

    private static PriorRecord readPrior(ResultSet row, int number) throws SQLException {
        return new PriorRecord(
                row.getString("parameter"),
                row.getString("series"),
                row.getDouble("median"),
                row.getDouble("log_sd"),
                row.getString("reason"));
    }

    /** What a stocking adds is known only where number, survival, weight at recruitment and delay all are. */
    private static EventRecord readEvent(ResultSet row, int number) throws SQLException {
        int year = row.getInt("season_year");
        Integer delayYears = row.getObject("delay_years", Integer.class);
        return new EventRecord(
                row.getString("event_key"),
                year,
                row.getString("kind"),
                number(row, "low_value"),
                number(row, "likely_value"),
                number(row, "high_value"),
                recruitedTonnes(
                        number(row, "number_stocked"), number(row, "survival"), number(row, "recruit_weight_kg")),
                delayYears == null ? null : year + delayYears);
    }

    /** number × survival × weight at recruitment, t; null where one of them is unknown. */
    static @Nullable Double recruitedTonnes(
            @Nullable Double number, @Nullable Double survival, @Nullable Double recruitWeightKg) {
        return number == null || survival == null || recruitWeightKg == null
                ? null
                : number * survival * recruitWeightKg / 1000;
    }

    private static @Nullable Double number(ResultSet row, String column) throws SQLException {
        return row.getObject(column, Double.class);
    }
}
