package org.merewarden.intake;

import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import org.springframework.context.annotation.Bean;
import org.springframework.context.annotation.Configuration;
import org.springframework.jdbc.core.JdbcTemplate;

/** Two tables that exist in tests only: gadgets, and parts that name a gadget. */
@Configuration
class TestTables {
    static final TableDefinition GADGETS = new TableDefinition(
            "test-gadgets",
            "Gadgets for tests",
            1000,
            List.of(
                    Column.code("gadget_code", "The gadget's code.").asKey(),
                    Column.year("gadget_year", "The season.").asKey(),
                    Column.text("gadget_sector", "Who uses it.")
                            .oneOf("very slow", "commercial", "angling")
                            .asKey()
                            .orElse("commercial"),
                    Column.number("weight_t", "Its weight in tonnes.")
                            .mandatory()
                            .between(0, Double.POSITIVE_INFINITY),
                    Column.number("share", "A fraction.").between(0, 1),
                    Column.integer("pieces", "How many."),
                    Column.date("seen_on", "When it was seen."),
                    Column.text("remark", "Whatever else.").atMost(40)));

    static final TableDefinition PARTS = new TableDefinition(
            "test-parts",
            "Parts of gadgets",
            1001,
            List.of(
                    Column.code("part_code", "The part's code.").asKey(),
                    Column.code("of_gadget", "The gadget.").mandatory(),
                    Column.year("of_year", "Its season.").mandatory()));

    @Bean
    TableHandler testGadgets(JdbcTemplate jdbc) {
        return new Gadgets(jdbc);
    }

    @Bean
    TableHandler testParts(JdbcTemplate jdbc) {
        return new Parts(jdbc);
    }

    record Gadgets(JdbcTemplate jdbc) implements TableHandler {
        Gadgets {
            jdbc.execute("create table if not exists test_gadget (code varchar(60), yr int, sector varchar(20),"
                    + " weight double precision, import_id bigint, primary key (code, yr, sector))");
        }

        @Override
        public TableDefinition definition() {
            return GADGETS;
        }

        @Override
        public List<Fate> examine(List<TableRow> rows, Batch batch) {
            List<Fate> fates = new ArrayList<>();
            for (TableRow row : rows) {
                List<Double> stored = jdbc.queryForList(
                        "select weight from test_gadget where code = ? and yr = ? and sector = ?",
                        Double.class,
                        row.need("gadget_code"),
                        row.integer("gadget_year"),
                        row.need("gadget_sector"));
                Double weight = row.number("weight_t");
                fates.add(
                        stored.isEmpty()
                                ? Fate.NEW
                                : Objects.equals(stored.get(0), weight)
                                        ? Fate.SAME
                                        : Fate.changed("weight_t " + stored.get(0) + " → " + weight));
            }
            return fates;
        }

        @Override
        public void store(List<TableRow> rows, Provenance provenance) {
            for (TableRow row : rows) {
                jdbc.update(
                        "delete from test_gadget where code = ? and yr = ? and sector = ?",
                        row.need("gadget_code"),
                        row.integer("gadget_year"),
                        row.need("gadget_sector"));
                jdbc.update(
                        "insert into test_gadget values (?, ?, ?, ?, ?)",
                        row.need("gadget_code"),
                        row.integer("gadget_year"),
                        row.need("gadget_sector"),
                        row.number("weight_t"),
                        provenance.importId());
            }
        }
    }

    record Parts(JdbcTemplate jdbc) implements TableHandler {
        Parts {
            jdbc.execute(
                    "create table if not exists test_part (code varchar(60) primary key, gadget varchar(60) not null,"
                            + " import_id bigint)");
        }

        @Override
        public TableDefinition definition() {
            return PARTS;
        }

        @Override
        public List<Fate> examine(List<TableRow> rows, Batch batch) {
            return rows.stream().map(r -> fate(r, batch)).toList();
        }

        private Fate fate(TableRow row, Batch batch) {
            String gadget = row.need("of_gadget");
            boolean known =
                    batch.brings("test-gadgets", gadget, row.integer("of_year").toString(), "commercial")
                            || jdbc.queryForObject(
                                            "select count(*) from test_gadget where code = ? and yr = ?",
                                            Integer.class,
                                            gadget,
                                            row.integer("of_year"))
                                    > 0;
            if (!known) {
                return Fate.refused(new Problem("of_gadget", gadget, "no such gadget in that year"));
            }
            int stored = jdbc.queryForObject(
                    "select count(*) from test_part where code = ?", Integer.class, row.need("part_code"));
            return stored == 0 ? Fate.NEW : Fate.SAME;
        }

        @Override
        public void store(List<TableRow> rows, Provenance provenance) {
            for (TableRow row : rows) {
                if (row.need("part_code").equals("explode")) {
                    throw new org.springframework.dao.DataIntegrityViolationException("as if stored meanwhile");
                }
                jdbc.update(
                        "insert into test_part values (?, ?, ?)",
                        row.need("part_code"),
                        row.need("of_gadget"),
                        provenance.importId());
            }
        }
    }
}
