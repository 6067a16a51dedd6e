package org.merewarden.store;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import io.zonky.test.db.postgres.embedded.EmbeddedPostgres;
import java.io.IOException;
import java.nio.file.Path;
import java.util.List;
import javax.sql.DataSource;
import org.flywaydb.core.Flyway;
import org.h2.jdbcx.JdbcDataSource;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.merewarden.TestRegion;
import org.springframework.dao.DataIntegrityViolationException;
import org.springframework.jdbc.core.simple.JdbcClient;

/** What was decided before drafts, revisions and closures came survives their migration, in its order. */
class DecisionsMigrationTest {
    private static void migrate(DataSource source, String version) {
        Flyway.configure()
                .dataSource(source)
                .locations("classpath:db/migration")
                .target(version)
                .load()
                .migrate();
    }

    private static void survives(DataSource source) {
        migrate(source, "11");
        JdbcClient jdbc = JdbcClient.create(source);
        var region = new TestRegion(jdbc);
        long stock = region.stock(region.lake("old-lake", "Old Lake"), "FPE");
        long first = region.limit(stock, 2024, 12.5);
        long second = region.limit(stock, 2025, 10);
        decide(jdbc, first, "WITHDRAWN", "Ice.");
        decide(jdbc, second, "SUPERSEDED", "Later.");
        List<String> before = decisions(jdbc);
        // numbers with a gap, as a store in use has them
        jdbc.sql("delete from limit_decision where limit_id = ? and act = 'WITHDRAWN'")
                .param(first)
                .update();
        decide(jdbc, first, "WITHDRAWN", "Ice.");
        List<String> inOrder = decisions(jdbc);
        assertThat(inOrder).hasSameElementsAs(before).isNotEqualTo(before);

        migrate(source, "12");
        assertThat(decisions(jdbc)).isEqualTo(inOrder);
        assertThat(jdbc.sql("select purpose from catch_limit order by id")
                        .query(String.class)
                        .list())
                .containsExactly("season", "season");
        decide(jdbc, first, "DRAFTED", "");
        assertThat(decisions(jdbc)).hasSize(5).last().isEqualTo(first + " DRAFTED  2026");
        assertThatThrownBy(() -> decide(jdbc, second, "FORGOTTEN", ""))
                .isInstanceOf(DataIntegrityViolationException.class);
        assertThatThrownBy(() -> decide(jdbc, second, "ISSUED", "Twice."))
                .isInstanceOf(DataIntegrityViolationException.class);
        assertThatThrownBy(() -> close(jdbc, first, "null")).isInstanceOf(DataIntegrityViolationException.class);
        assertThatThrownBy(() -> close(jdbc, first, "1")).isInstanceOf(DataIntegrityViolationException.class);
        close(jdbc, first, "0");
    }

    private static void close(JdbcClient jdbc, long limit, String amount) {
        jdbc.sql(
                        "update catch_limit set purpose = 'closure', effective_at = created_at, set_aside_other_t = 0, amount = "
                                + amount + " where id = ?")
                .param(limit)
                .update();
    }

    private static void decide(JdbcClient jdbc, long limit, String act, String reason) {
        jdbc.sql("insert into limit_decision (limit_id, act, decided_at, decided_by, effective_at, reason)"
                        + " values (?, ?, timestamp with time zone '2026-03-01 12:00:00+00:00', 'tobias',"
                        + " timestamp with time zone '2026-03-01 12:00:00+00:00', ?)")
                .params(limit, act, reason)
                .update();
    }

    /** In the order of their numbers. */
    private static List<String> decisions(JdbcClient jdbc) {
        return jdbc.sql("select limit_id, act, reason, extract(year from effective_at) from limit_decision order by id")
                .query((row, n) ->
                        row.getLong(1) + " " + row.getString(2) + " " + row.getString(3) + " " + row.getInt(4))
                .list();
    }

    @Test
    void onTheEmbeddedStore(@TempDir Path folder) {
        var source = new JdbcDataSource();
        // a file that is opened anew each time, as after a new version was put in place
        source.setURL("jdbc:h2:file:" + folder.resolve("store").toAbsolutePath());
        source.setUser("sa");
        survives(source);
    }

    @Test
    void onPostgres() throws IOException {
        try (EmbeddedPostgres postgres = EmbeddedPostgres.start()) {
            survives(postgres.getPostgresDatabase());
        }
    }
}
