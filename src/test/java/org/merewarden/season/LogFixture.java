package org.merewarden.season;

import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.util.List;
import java.util.UUID;
import org.merewarden.TestRegion;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.security.authentication.TestingAuthenticationToken;
import org.springframework.security.core.context.SecurityContextHolder;

/** A lake with perch (limit, two cooperatives), whitefish (no limit) and people; a fresh one for each test. */
final class LogFixture {
    final String lake;
    final String first;
    final String second;
    final long perch;
    final long whitefish;
    final JdbcClient jdbc;

    /** @param limitTonnes of perch, of which 1 t is set aside; null for none */
    LogFixture(JdbcClient jdbc, int season, Double limitTonnes) {
        this.jdbc = jdbc;
        String id = UUID.randomUUID().toString().substring(0, 8);
        lake = "log-" + id;
        first = "first-" + id;
        second = "second-" + id;
        TestRegion region = new TestRegion(jdbc);
        long water = region.lake(lake, "Log Water " + id);
        perch = region.stock(water, "FPE");
        whitefish = region.stock(water, "PLN");
        long one = region.cooperative(first, "First " + id);
        long two = region.cooperative(second, "Second " + id);
        region.right(one, perch, 60);
        region.right(two, perch, 40);
        if (limitTonnes != null) {
            long limit = region.limit(perch, season, limitTonnes);
            jdbc.sql("update catch_limit set set_aside_angling_t = 1 where id = ?")
                    .param(limit)
                    .update();
            for (long[] part : new long[][] {{one, 60}, {two, 40}}) {
                jdbc.sql(
                                "insert into allocation (limit_id, cooperative_id, share_percent, amount_kg) values (?, ?, ?, ?)")
                        .params(limit, part[0], part[1], (long) ((limitTonnes - 1) * 10 * part[1]))
                        .update();
            }
        }
    }

    /** An account of the role, signed in on this thread. */
    static void signIn(JdbcClient jdbc, String username, String role, String... waters) {
        account(jdbc, username, role, waters);
        SecurityContextHolder.getContext()
                .setAuthentication(new TestingAuthenticationToken(username, "", "ROLE_" + role));
    }

    static void account(JdbcClient jdbc, String username, String role, String... waters) {
        if (jdbc.sql("select count(*) from account where username = ?")
                        .param(username)
                        .query(Long.class)
                        .single()
                == 0) {
            jdbc.sql("insert into account (username, display_name, role, password_hash, created_at, created_by)"
                            + " values (?, ?, ?, 'none', ?, 'test')")
                    .params(username, username, role, OffsetDateTime.now())
                    .update();
        }
        for (String water : waters) {
            jdbc.sql("insert into account_water_body (account_id, water_body_code)"
                            + " select id, ? from account where username = ?")
                    .params(water, username)
                    .update();
        }
    }

    Entry entry(String formKey, int line, LocalDate date, String species, String cooperative, double kg) {
        return entry(LandingLog.lineKey(formKey, line), date, species, cooperative, kg, "whole", "kept");
    }

    Entry entry(
            String key,
            LocalDate date,
            String species,
            String cooperative,
            double kg,
            String presentation,
            String fate) {
        return new Entry(
                key,
                date,
                "S1",
                lake,
                species,
                "",
                cooperative,
                "commercial",
                "gill net",
                4.0,
                1.0,
                kg,
                presentation,
                null,
                fate,
                null,
                null);
    }

    List<String> rows() {
        return jdbc.sql(
                        "select l.entry_key from landing l join water_body w on w.id = l.water_body_id where w.code = ?")
                .param(lake)
                .query(String.class)
                .list();
    }

    static String key() {
        return UUID.randomUUID().toString();
    }
}
