package org.merewarden.season;

import org.merewarden.web.Who;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Component;

/** Where the signed-in person may log: a clerk at the waters assigned to them, the others everywhere. */
@Component
class LoggingRights {
    private final JdbcClient jdbc;

    LoggingRights(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    boolean mayLogAt(String lake) {
        return !Who.has("CLERK")
                || jdbc.sql("select count(*) from account_water_body w join account a on a.id = w.account_id"
                                        + " where a.username = :name and w.water_body_code in (:lake, '*')")
                                .param("name", Who.name())
                                .param("lake", lake)
                                .query(Long.class)
                                .single()
                        > 0;
    }
}
