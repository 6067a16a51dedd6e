package org.merewarden.records;

import static org.merewarden.intake.Column.code;
import static org.merewarden.intake.Column.date;
import static org.merewarden.intake.Column.integer;
import static org.merewarden.intake.Column.number;
import static org.merewarden.intake.Column.text;
import static org.merewarden.intake.Column.year;
import static org.merewarden.records.RecordTable.field;

import java.util.List;
import org.merewarden.intake.Column;
import org.merewarden.waterbody.StockReferences;

/** The six tables of evidence. */
final class RecordTables {
    static final List<String> SECTORS =
            List.of("commercial", "subsistence", "angling", "other party", "unlawful", "research", "discards");
    static final List<String> EVENT_KINDS = List.of("stocking", "fish kill", "closure");

    private static final Column YEAR = year("year", "season, named by the year in which it starts");
    private static final Column SERIES =
            text("series", "name of the series; a new design is a new series").between(0, 60);
    private static final Column CV = number("cv", "coefficient of variation").between(0.001, 5);
    private static final Column SOURCE =
            text("source", "where the figure comes from").between(0, 500);
    private static final Column WATER =
            code("water_body", "code of the water body").between(0, 60);

    static final RecordTable CATCHES = new RecordTable(
            "catches",
            "Catches by season and sector",
            60,
            "catch_record",
            "stock_id",
            StockReferences.columns(),
            List.of(
                    field(YEAR.asKey(), "season_year"),
                    field(text("sector", "who caught it")
                            .asKey()
                            .oneOf(SECTORS.toArray(String[]::new))
                            .orElse("commercial")),
                    field(number("catch_t", "live weight in tonnes, as reported")
                            .mandatory()
                            .between(0, 1e8)),
                    field(CV),
                    field(number("reported_fraction", "part of the true catch that was reported, 0 to 1; empty: all")
                            .between(0.001, 1)),
                    field(SOURCE)),
            RecordRules.NONE);

    static final RecordTable EFFORT = new RecordTable(
            "effort",
            "Fishing effort by season and series",
            70,
            "effort_record",
            "stock_id",
            StockReferences.columns(),
            List.of(
                    field(YEAR.asKey(), "season_year"),
                    field(SERIES.asKey()),
                    field(number("effort", "effort in the series' own unit")
                            .mandatory()
                            .between(0, 1e12)),
                    field(text("unit", "unit of the effort").between(0, 60)),
                    field(SOURCE)),
            RecordRules.NONE);

    static final RecordTable SURVEYS = new RecordTable(
            "surveys",
            "Survey indices and absolute biomass",
            80,
            "survey_record",
            "stock_id",
            StockReferences.columns(),
            List.of(
                    field(YEAR.asKey(), "season_year"),
                    field(SERIES.asKey()),
                    field(number("time_of_year", "0 the season's start to 1 its end")
                            .asKey()
                            .between(0, 1)
                            .orElse("0.5")),
                    field(text("kind", "index or biomass").mandatory().oneOf("index", "biomass")),
                    field(
                            number("value", "0: nothing caught; a biomass in tonnes")
                                    .mandatory()
                                    .between(0, 1e9),
                            "amount"),
                    field(CV),
                    field(number("nets", "units of effort behind the value").between(0.001, 1e7)),
                    field(text("design", "gear and mesh set").between(0, 200)),
                    field(text("unit", "unit of the value").between(0, 60)),
                    field(SOURCE)),
            RecordRules::survey);

    static final RecordTable EVENTS = new RecordTable(
            "events",
            "Stocking, fish kills and closures",
            90,
            "event_record",
            "water_body_id",
            List.of(WATER.mandatory()),
            List.of(
                    field(
                            text("key", "the event's own name; the same key corrects it")
                                    .between(0, 100)
                                    .asKey(),
                            "event_key"),
                    field(code("species", "FAO three-letter code; empty: all stocks of the water")
                            .between(0, 3)
                            .orElse("")),
                    field(code("population", "empty unless the water holds two stocks of the species")
                            .between(0, 40)
                            .orElse("")),
                    field(YEAR.mandatory(), "season_year"),
                    field(date("date", "day on which it happened"), "happened_on"),
                    field(text("kind", "stocking, fish kill or closure")
                            .mandatory()
                            .oneOf(EVENT_KINDS.toArray(String[]::new))),
                    field(number("low", "fish kill: least fraction of the biomass lost"), "low_value"),
                    field(number("likely", "fish kill: likely fraction; closure: residual catch in t"), "likely_value"),
                    field(number("high", "fish kill: greatest fraction"), "high_value"),
                    field(text("stage", "stocking: fry, fingerling, yearling …").between(0, 60)),
                    field(number("number", "stocking: number of fish").between(0, 1e12), "number_stocked"),
                    field(number("mean_weight_g", "stocking: mean weight in g").between(0.001, 1e6)),
                    field(number("survival", "stocking: fraction alive at recruitment")
                            .between(0, 1)),
                    field(integer("delay_years", "stocking: seasons until recruitment")
                            .between(0, 50)),
                    field(number("recruit_weight_kg", "stocking: mean weight at recruitment in kg")
                            .between(0.00001, 1000)),
                    field(SOURCE)),
            RecordRules::event);

    static final RecordTable AREAS = new RecordTable(
            "areas",
            "Area of the water by season",
            100,
            "area_record",
            "water_body_id",
            List.of(WATER.asKey()),
            List.of(
                    field(YEAR.asKey(), "season_year"),
                    field(number("area_ha", "surface in hectares").mandatory().between(0.001, 1e8))),
            RecordRules.NONE);

    static final RecordTable PRIORS = new RecordTable(
            "priors",
            "The office's own priors",
            110,
            "prior_record",
            "stock_id",
            StockReferences.columns(),
            List.of(
                    field(text("parameter", "what is known beforehand")
                            .asKey()
                            .oneOf(
                                    "msy_t",
                                    "fmsy",
                                    "biomass_fraction_at_start",
                                    "process_sd",
                                    "observation_sd",
                                    "harvest_sd",
                                    "first_harvest_rate",
                                    "shape",
                                    "catchability")),
                    field(text("series", "for observation_sd and catchability; empty: all")
                            .between(0, 60)
                            .asKey()
                            .orElse("")),
                    field(number(
                                    "median",
                                    "median in the parameter's unit; a shape fixed under 0.001 is Gompertz growth")
                            .mandatory()
                            .between(1e-9, 1e9)),
                    field(number("log_sd", "standard deviation of the logarithm; 0 fixes the parameter")
                            .mandatory()
                            .between(0, 10)),
                    field(text("reason", "why the office knows this").between(0, 2000))),
            RecordRules.NONE);

    static final List<RecordTable> ALL = List.of(CATCHES, EFFORT, SURVEYS, EVENTS, AREAS, PRIORS);

    private RecordTables() {}
}
