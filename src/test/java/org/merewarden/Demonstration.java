package org.merewarden;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.Duration;
import java.time.Instant;
import org.springframework.jdbc.core.simple.JdbcClient;

/** Waits for what the demonstration does by itself after its start. */
public final class Demonstration {
    private Demonstration() {}

    /** Until every stock that was loaded has an assessment; fails after two minutes. */
    public static void assessed(JdbcClient jdbc) throws InterruptedException {
        Instant end = Instant.now().plus(Duration.ofMinutes(2));
        String open = "select count(*) from job where kind = 'assess' and state = 'DONE'";
        while (jdbc.sql(open).query(Integer.class).single() == 0
                && Instant.now().isBefore(end)) {
            Thread.sleep(200);
        }
        assertThat(jdbc.sql("select count(*) from stock s where not exists"
                                + " (select 1 from assessment a where a.stock_id = s.id)")
                        .query(Integer.class)
                        .single())
                .as("stocks without an assessment")
                .isZero();
    }
}
