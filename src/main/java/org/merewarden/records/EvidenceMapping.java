package org.merewarden.records;

import java.util.List;
import java.util.Objects;
import java.util.function.Function;
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
import org.merewarden.intake.TableRow;

/** Rows of the import formats as the core's evidence: the same for rows that are stored and for rows of a folder. */
final class EvidenceMapping {
    /** What is read of a stock and of its water body, by column. */
    static final List<String> SUBJECT_TEXTS = List.of("kind", "species", "recruitment", "productivity");

    static final List<String> SUBJECT_NUMBERS = List.of(
            "area_ha",
            "mean_depth_m",
            "dissolved_solids_mg_l",
            "conductivity_us_cm",
            "mean_air_temperature_c",
            "max_age_years",
            "growth_k_per_year",
            "growth_linf_cm",
            "share_of_lake_yield");

    private EvidenceMapping() {}

    /**
     * @param subject the stock's cells together with its water body's
     * @param stocksInLake number of stocks of the water body, at least 1
     * @param shareOfRecordedCatch {@link RecordedShare}
     * @param rows the rows of each table that are about the stock
     */
    static Evidence evidence(
            TableRow subject,
            int stocksInLake,
            @Nullable Double shareOfRecordedCatch,
            Function<RecordTable, List<TableRow>> rows) {
        return new Evidence(
                habitat(subject, stocksInLake, shareOfRecordedCatch),
                traits(subject),
                mapped(rows.apply(RecordTables.CATCHES), EvidenceMapping::catchRecord),
                mapped(rows.apply(RecordTables.EFFORT), EvidenceMapping::effort),
                mapped(rows.apply(RecordTables.SURVEYS), EvidenceMapping::survey),
                mapped(rows.apply(RecordTables.EVENTS), EvidenceMapping::event),
                mapped(rows.apply(RecordTables.AREAS), EvidenceMapping::area),
                mapped(rows.apply(RecordTables.PRIORS), EvidenceMapping::prior));
    }

    private static <T> List<T> mapped(List<TableRow> rows, Function<TableRow, T> record) {
        return rows.stream().map(record).toList();
    }

    static Habitat habitat(TableRow water, int stocksInLake, @Nullable Double shareOfRecordedCatch) {
        return new Habitat(
                water.need("kind"),
                number(water, "area_ha"),
                water.number("mean_depth_m"),
                water.number("dissolved_solids_mg_l"),
                water.number("conductivity_us_cm"),
                water.number("mean_air_temperature_c"),
                stocksInLake,
                shareOfRecordedCatch);
    }

    static Traits traits(TableRow stock) {
        return new Traits(
                stock.need("species"),
                "stocked only".equals(stock.text("recruitment")),
                stock.text("productivity"),
                stock.number("max_age_years"),
                stock.number("growth_k_per_year"),
                stock.number("growth_linf_cm"),
                stock.number("share_of_lake_yield"));
    }

    static CatchRecord catchRecord(TableRow row) {
        return new CatchRecord(
                year(row),
                row.need("sector"),
                number(row, "catch_t"),
                row.number("cv"),
                Objects.requireNonNullElse(row.number("reported_fraction"), 1.0));
    }

    private static EffortRecord effort(TableRow row) {
        return new EffortRecord(year(row), row.need("series"), number(row, "effort"), row.text("unit"));
    }

    private static SurveyRecord survey(TableRow row) {
        return new SurveyRecord(
                year(row),
                row.need("series"),
                number(row, "time_of_year"),
                "biomass".equals(row.text("kind")),
                number(row, "value"),
                row.number("cv"),
                row.number("nets"));
    }

    private static AreaRecord area(TableRow row) {
        return new AreaRecord(year(row), number(row, "area_ha"));
    }

    private static PriorRecord prior(TableRow row) {
        return new PriorRecord(
                row.need("parameter"),
                row.textOrEmpty("series"),
                number(row, "median"),
                number(row, "log_sd"),
                row.text("reason"));
    }

    /** What a stocking adds is known only where number, survival, weight at recruitment and delay all are. */
    private static EventRecord event(TableRow row) {
        Integer delayYears = row.integer("delay_years");
        return new EventRecord(
                row.need("key"),
                year(row),
                row.need("kind"),
                row.number("low"),
                row.number("likely"),
                row.number("high"),
                recruitedTonnes(row.number("number"), row.number("survival"), row.number("recruit_weight_kg")),
                delayYears == null ? null : year(row) + delayYears);
    }

    /** number × survival × weight at recruitment, t; null where one of them is unknown. */
    static @Nullable Double recruitedTonnes(
            @Nullable Double number, @Nullable Double survival, @Nullable Double recruitWeightKg) {
        return number == null || survival == null || recruitWeightKg == null
                ? null
                : number * survival * recruitWeightKg / 1000;
    }

    static int year(TableRow row) {
        return Objects.requireNonNull(row.integer("year"), "year");
    }

    private static double number(TableRow row, String column) {
        return Objects.requireNonNull(row.number(column), column);
    }
}
