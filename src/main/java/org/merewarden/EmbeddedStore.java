package org.merewarden;

import com.zaxxer.hikari.HikariDataSource;
import java.sql.Connection;
import java.sql.DriverManager;
import java.sql.SQLException;
import java.sql.Statement;
import javax.sql.DataSource;
import org.flywaydb.core.Flyway;
import org.springframework.boot.flyway.autoconfigure.FlywayMigrationStrategy;
import org.springframework.context.annotation.Bean;
import org.springframework.context.annotation.Configuration;

/**
 * Closes the embedded store once its schema was changed, so that it opens anew. Until then the store checks new constraints
 * through the connection that made them, and refuses every write that they guard as soon as the pool retires it.
 */
@Configuration
class EmbeddedStore {
    private static final String FILE = "jdbc:h2:file:";

    /** The embedded store's code for: the database is closed. */
    private static final int CLOSED = 90121;

    @Bean
    FlywayMigrationStrategy migration(DataSource store) {
        return flyway -> migrate(flyway, store);
    }

    static void migrate(Flyway flyway, DataSource store) {
        boolean changed = flyway.migrate().migrationsExecuted > 0;
        if (changed
                && store instanceof HikariDataSource pool
                && pool.getJdbcUrl().startsWith(FILE)) {
            shutDown(pool);
            pool.getHikariPoolMXBean().softEvictConnections();
        }
    }

    private static void shutDown(HikariDataSource pool) {
        try (Connection connection =
                        DriverManager.getConnection(pool.getJdbcUrl(), pool.getUsername(), pool.getPassword());
                Statement statement = connection.createStatement()) {
            statement.execute("shutdown");
        } catch (SQLException e) {
            // the statement and its connection cannot be closed any more: that is what was asked for
            if (e.getErrorCode() != CLOSED) {
                throw new IllegalStateException("the store cannot be opened anew after its schema was changed", e);
            }
        }
    }
}
