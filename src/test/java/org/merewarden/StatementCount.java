package org.merewarden;

import java.lang.reflect.InvocationTargetException;
import java.lang.reflect.Proxy;
import java.sql.Connection;
import java.sql.SQLException;
import java.util.Set;
import javax.sql.DataSource;
import org.springframework.beans.factory.config.BeanPostProcessor;
import org.springframework.jdbc.datasource.DelegatingDataSource;
import org.springframework.stereotype.Component;

/**
 * Counts the statements that the calling thread prepares, Hibernate's and plain ones alike, because both go through the
 * data source. Other threads (jobs, sessions being cleaned) do not count.
 */
@Component
public class StatementCount implements BeanPostProcessor {
    private static final Set<String> PREPARES = Set.of("prepareStatement", "prepareCall", "createStatement");
    private static final ThreadLocal<int[]> PREPARED = ThreadLocal.withInitial(() -> new int[1]);

    /** What a test does, such as a request through MockMvc. */
    public interface Work {
        void run() throws Exception;
    }

    /** Statements that the work prepares in this thread. */
    public static int during(Work work) throws Exception {
        int before = PREPARED.get()[0];
        work.run();
        return PREPARED.get()[0] - before;
    }

    @Override
    public Object postProcessAfterInitialization(Object bean, String name) {
        return bean instanceof DataSource source && !(bean instanceof DelegatingDataSource)
                ? new Counting(source)
                : bean;
    }

    private static final class Counting extends DelegatingDataSource {
        private Counting(DataSource source) {
            super(source);
        }

        @Override
        public Connection getConnection() throws SQLException {
            return counting(super.getConnection());
        }

        @Override
        public Connection getConnection(String user, String password) throws SQLException {
            return counting(super.getConnection(user, password));
        }

        private static Connection counting(Connection connection) {
            return (Connection) Proxy.newProxyInstance(
                    Connection.class.getClassLoader(),
                    new Class<?>[] {Connection.class},
                    (proxy, method, arguments) -> {
                        if (PREPARES.contains(method.getName())) {
                            PREPARED.get()[0]++;
                        }
                        try {
                            return method.invoke(connection, arguments);
                        } catch (InvocationTargetException e) {
                            throw e.getCause();
                        }
                    });
        }
    }
}
