package org.merewarden.account;

import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.security.SecureRandom;
import java.time.Clock;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.Base64;
import java.util.HexFormat;
import java.util.Set;
import org.merewarden.web.NotFound;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/**
 * The one-time key to an office without accounts. Only its hash is stored; it holds until it is used, a newer one is made
 * or the first account exists. Unknown, used and outdated ones are the same: not found.
 */
@Service
@Transactional
class SetupTokens {
    private static final int BYTES = 24;

    private final JdbcClient jdbc;
    private final Accounts accounts;
    private final Clock clock;
    private final SecureRandom random = new SecureRandom();

    SetupTokens(JdbcClient jdbc, Accounts accounts, Clock clock) {
        this.jdbc = jdbc;
        this.accounts = accounts;
        this.clock = clock;
    }

    /** A new token of 192 bits; earlier ones hold no longer. */
    public String make() {
        byte[] bytes = new byte[BYTES];
        random.nextBytes(bytes);
        String token = Base64.getUrlEncoder().withoutPadding().encodeToString(bytes);
        jdbc.sql("delete from setup_token where used_at is null").update();
        jdbc.sql("insert into setup_token (token_hash, created_at) values (?, ?)")
                .params(hash(token), now())
                .update();
        return token;
    }

    @Transactional(readOnly = true)
    public void check(String token) {
        int found = jdbc.sql("select count(*) from setup_token where token_hash = ? and used_at is null")
                .param(hash(token))
                .query(Integer.class)
                .single();
        if (found == 0 || !accounts.none()) {
            throw new NotFound("set-up link");
        }
    }

    /** Makes the first administrator; of two at the same moment one finds the token used. */
    public void use(String token, String username, String displayName, String password) {
        check(token);
        int used = jdbc.sql("update setup_token set used_at = ? where token_hash = ? and used_at is null")
                .params(now(), hash(token))
                .update();
        if (used == 0) {
            throw new NotFound("set-up link");
        }
        accounts.create(username, displayName, Role.ADMINISTRATOR, Set.of(), password);
    }

    private OffsetDateTime now() {
        return clock.instant().atOffset(ZoneOffset.UTC);
    }

    static String hash(String token) {
        try {
            MessageDigest digest = MessageDigest.getInstance("SHA-256");
            return HexFormat.of().formatHex(digest.digest(token.getBytes(StandardCharsets.UTF_8)));
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException("every Java platform has SHA-256", e);
        }
    }
}
