package org.merewarden.waterbody;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.LocalDate;
import java.util.List;
import java.util.Objects;
import java.util.Optional;
import java.util.stream.Stream;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;

/** Reads the register by projections: one statement for each call, no entity is loaded. */
@Service
class StoredRegister implements Register {
    private static final String WHOLE = "whole";

    private static final String WATER_BODIES = """
            select id, code, name, district, kind, area_ha, mean_depth_m, max_depth_m, dissolved_solids_mg_l,
                conductivity_us_cm, mean_air_temperature_c
            from water_body
            """;
    private static final String STOCKS = """
            select s.id, s.water_body_id, w.code, w.name, w.district, w.area_ha, s.species, s.population, s.local_name,
                s.recruitment, s.productivity, s.max_age_years, s.growth_k_per_year, s.growth_linf_cm,
                s.share_of_lake_yield
            from stock s join water_body w on w.id = s.water_body_id
            """;
    private static final String STOCK_ORDER = " order by w.name, s.species, s.population";
    private static final String RIGHTS = """
            select r.cooperative_id, c.code, c.name, r.stock_id, r.share_percent
            from fishing_right r join cooperative c on c.id = r.cooperative_id
            """;

    private final JdbcClient jdbc;
    private final SpeciesList speciesList;

    StoredRegister(JdbcClient jdbc, SpeciesList speciesList) {
        this.jdbc = jdbc;
        this.speciesList = speciesList;
    }

    @Override
    public List<WaterBodyView> waterBodies() {
        return jdbc.sql(WATER_BODIES + " order by name, code")
                .query(StoredRegister::readWaterBody)
                .list();
    }

    @Override
    public Optional<WaterBodyView> waterBody(String code) {
        return jdbc.sql(WATER_BODIES + " where code = :code")
                .param("code", code)
                .query(StoredRegister::readWaterBody)
                .optional();
    }

    @Override
    public List<StockView> stocks() {
        return jdbc.sql(STOCKS + STOCK_ORDER).query(this::readStock).list();
    }

    @Override
    public Optional<StockView> stock(long id) {
        return jdbc.sql(STOCKS + " where s.id = :id")
                .param("id", id)
                .query(this::readStock)
                .optional();
    }

    @Override
    public Optional<StockView> stock(String lake, String speciesKey) {
        int dot = speciesKey.indexOf('.');
        return jdbc.sql(STOCKS + " where w.code = :lake and s.species = :species and s.population = :population")
                .param("lake", lake)
                .param("species", dot < 0 ? speciesKey : speciesKey.substring(0, dot))
                .param("population", dot < 0 ? "" : speciesKey.substring(dot + 1))
                .query(this::readStock)
                .optional();
    }

    @Override
    public List<CooperativeView> cooperatives() {
        return jdbc.sql("select id, code, name from cooperative order by name, code")
                .query(StoredRegister::readCooperative)
                .list();
    }

    @Override
    public Optional<CooperativeView> cooperative(String code) {
        return jdbc.sql("select id, code, name from cooperative where code = :code")
                .param("code", code)
                .query(StoredRegister::readCooperative)
                .optional();
    }

    @Override
    public List<RightView> rights() {
        return jdbc.sql(RIGHTS + " order by r.stock_id, c.name, c.code")
                .query(StoredRegister::readRight)
                .list();
    }

    @Override
    public List<RightView> rightsOfStock(long stockId) {
        return jdbc.sql(RIGHTS + " where r.stock_id = :stock order by c.name, c.code")
                .param("stock", stockId)
                .query(StoredRegister::readRight)
                .list();
    }

    @Override
    public List<RightView> rightsOfCooperative(long cooperativeId) {
        return jdbc.sql(RIGHTS + " where r.cooperative_id = :cooperative order by r.stock_id")
                .param("cooperative", cooperativeId)
                .query(StoredRegister::readRight)
                .list();
    }

    @Override
    public Optional<Double> conversionFactor(String species, String presentation, LocalDate date) {
        if (presentation.equals(WHOLE)) {
            return Optional.of(1.0);
        }
        return jdbc.sql("""
                select factor from weight_conversion
                where species = :species and presentation = :presentation and valid_from <= :date
                order by valid_from desc limit 1""")
                .param("species", species)
                .param("presentation", presentation)
                .param("date", date)
                .query(Double.class)
                .optional();
    }

    @Override
    public List<String> presentations() {
        Stream<String> converted = jdbc
                .sql("select distinct presentation from weight_conversion order by presentation")
                .query(String.class)
                .list()
                .stream()
                .filter(p -> !p.equals(WHOLE));
        return Stream.concat(Stream.of(WHOLE), converted).toList();
    }

    @Override
    public List<Species> species() {
        return speciesList.all();
    }

    @Override
    public Optional<Species> species(String code) {
        return speciesList.find(code);
    }

    private static WaterBodyView readWaterBody(ResultSet row, int number) throws SQLException {
        return new WaterBodyView(
                row.getLong("id"),
                row.getString("code"),
                row.getString("name"),
                row.getString("district"),
                row.getString("kind"),
                row.getDouble("area_ha"),
                row.getObject("mean_depth_m", Double.class),
                row.getObject("max_depth_m", Double.class),
                row.getObject("dissolved_solids_mg_l", Double.class),
                row.getObject("conductivity_us_cm", Double.class),
                row.getObject("mean_air_temperature_c", Double.class));
    }

    private StockView readStock(ResultSet row, int number) throws SQLException {
        String species = row.getString("species");
        return new StockView(
                row.getLong("id"),
                row.getLong("water_body_id"),
                row.getString("code"),
                row.getString("name"),
                row.getString("district"),
                row.getDouble("area_ha"),
                species,
                row.getString("population"),
                Objects.requireNonNullElseGet(row.getString("local_name"), () -> speciesList.name(species)),
                row.getString("recruitment"),
                row.getString("productivity"),
                row.getObject("max_age_years", Double.class),
                row.getObject("growth_k_per_year", Double.class),
                row.getObject("growth_linf_cm", Double.class),
                row.getObject("share_of_lake_yield", Double.class));
    }

    private static CooperativeView readCooperative(ResultSet row, int number) throws SQLException {
        return new CooperativeView(row.getLong("id"), row.getString("code"), row.getString("name"));
    }

    private static RightView readRight(ResultSet row, int number) throws SQLException {
        return new RightView(
                row.getLong("cooperative_id"),
                row.getString("code"),
                row.getString("name"),
                row.getLong("stock_id"),
                row.getDouble("share_percent"));
    }
}
