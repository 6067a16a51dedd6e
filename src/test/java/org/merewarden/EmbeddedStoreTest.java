package org.merewarden;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatCode;

import com.zaxxer.hikari.HikariConfig;
import com.zaxxer.hikari.HikariDataSource;
import java.nio.file.Path;
import java.sql.Connection;
import java.sql.SQLException;
import java.sql.Statement;
import org.flywaydb.core.Flyway;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** A store that was just made goes on taking writes after the connections that made it are gone. */
class EmbeddedStoreTest {
    private static final String WRITE = "insert into policy_act (policy_number, act, decided_at, decided_by, reason)"
            + " values (1, 'PROPOSED', current_timestamp, 'test', 'why')";

    @TempDir
    Path folder;

    private HikariDataSource pool() {
        HikariConfig config = new HikariConfig();
        config.setJdbcUrl("jdbc:h2:file:" + folder.resolve("store") + ";WRITE_DELAY=0");
        config.setUsername("sa");
        config.setPassword("");
        config.setMaximumPoolSize(2);
        return new HikariDataSource(config);
    }

    @Test
    void constraintsOutliveTheConnectionsThatMadeThem() throws Exception {
        try (HikariDataSource pool = pool()) {
            Flyway flyway = Flyway.configure()
                    .dataSource(pool)
                    .locations("classpath:db/migration")
                    .load();
            EmbeddedStore.migrate(flyway, pool);
            // a connection of now stays, so that the store stays open while the others are retired
            try (Connection kept = pool.getConnection()) {
                pool.getHikariPoolMXBean().softEvictConnections();
                Thread.sleep(200);
                assertThatCode(() -> write(pool)).doesNotThrowAnyException();
                assertThat(kept.isValid(1)).isTrue();
            }
        }
    }

    private static void write(HikariDataSource pool) throws SQLException {
        try (Connection connection = pool.getConnection();
                Statement statement = connection.createStatement()) {
            statement.executeUpdate(WRITE);
        }
    }
}
