package org.merewarden.sharing;

import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.security.SecureRandom;
import java.time.Clock;
import java.time.Duration;
import java.time.Instant;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.Base64;
import java.util.HexFormat;
import java.util.List;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.waterbody.CooperativeView;
import org.merewarden.web.Who;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/**
 * Share links. A link is a random token of 256 bits that the store knows only by its SHA-256: who reads the store cannot
 * open a view, and a link that was lost is replaced, not looked up.
 */
@Service
class ShareLinks {
    static final int MOST_DAYS = 730;
    private static final int TOKEN_BYTES = 32;
    /** Use is noted once a minute at most: reading a page should not mean writing to the disk each time. */
    private static final Duration USE_NOTED = Duration.ofMinutes(1);

    private final JdbcClient jdbc;
    private final ActivityLog activity;
    private final Clock clock;
    private final SecureRandom random = new SecureRandom();

    ShareLinks(JdbcClient jdbc, ActivityLog activity, Clock clock) {
        this.jdbc = jdbc;
        this.activity = activity;
        this.clock = clock;
    }

    record Link(
            long id,
            long cooperativeId,
            String cooperative,
            @Nullable String label,
            Instant createdAt,
            String createdBy,
            Instant expiresAt,
            @Nullable Instant revokedAt,
            @Nullable String revokedBy,
            @Nullable Instant lastUsedAt) {}

    private static final String SELECT = """
            select s.id, s.cooperative_id, c.name, s.label, s.created_at, s.created_by, s.expires_at, s.revoked_at,
              s.revoked_by, s.last_used_at
            from share_link s join cooperative c on c.id = s.cooperative_id\s""";

    /** All links ever made, newest first. */
    List<Link> all() {
        return jdbc.sql(SELECT + "order by s.id desc")
                .query((row, n) -> new Link(
                        row.getLong(1),
                        row.getLong(2),
                        row.getString(3),
                        row.getString(4),
                        instant(row.getObject(5, OffsetDateTime.class)),
                        row.getString(6),
                        instant(row.getObject(7, OffsetDateTime.class)),
                        maybe(row.getObject(8, OffsetDateTime.class)),
                        row.getString(9),
                        maybe(row.getObject(10, OffsetDateTime.class))))
                .list();
    }

    /**
     * @param days until it expires, 1–{@link #MOST_DAYS}
     * @return the token, which is kept nowhere
     */
    @Transactional
    String make(CooperativeView cooperative, @Nullable String label, int days) {
        if (days < 1 || days > MOST_DAYS) {
            throw new IllegalArgumentException("needs 1 <= days <= " + MOST_DAYS + ", got " + days);
        }
        byte[] bytes = new byte[TOKEN_BYTES];
        random.nextBytes(bytes);
        String token = Base64.getUrlEncoder().withoutPadding().encodeToString(bytes);
        OffsetDateTime now = now();
        jdbc.sql("insert into share_link (token_hash, cooperative_id, label, created_at, created_by, expires_at)"
                        + " values (:hash, :cooperative, :label, :at, :by, :expires)")
                .param("hash", hash(token))
                .param("cooperative", cooperative.id())
                .param("label", label)
                .param("at", now)
                .param("by", Who.name())
                .param("expires", now.plusDays(days))
                .update();
        activity.record(
                "made share link",
                cooperative.name(),
                null,
                (label == null ? "" : label + ", ") + "expires "
                        + now.plusDays(days).toLocalDate());
        return token;
    }

    /** @return whether there was such a link that was not revoked yet */
    @Transactional
    boolean revoke(long id) {
        int changed = jdbc.sql("update share_link set revoked_at = :at, revoked_by = :by"
                        + " where id = :id and revoked_at is null")
                .param("at", now())
                .param("by", Who.name())
                .param("id", id)
                .update();
        if (changed > 0) {
            activity.record("revoked share link", "Share link " + id, "open", "revoked");
        }
        return changed > 0;
    }

    /** The cooperative whose view the token opens; empty alike where it is unknown, expired or revoked. */
    @Transactional
    Optional<Long> open(String token) {
        OffsetDateTime now = now();
        String hash = hash(token);
        Optional<Long> cooperative = jdbc.sql("select cooperative_id from share_link"
                        + " where token_hash = :hash and revoked_at is null and expires_at > :now")
                .param("hash", hash)
                .param("now", now)
                .query(Long.class)
                .optional();
        if (cooperative.isPresent()) {
            jdbc.sql("update share_link set last_used_at = :now"
                            + " where token_hash = :hash and (last_used_at is null or last_used_at < :before)")
                    .param("now", now)
                    .param("hash", hash)
                    .param("before", now.minus(USE_NOTED))
                    .update();
        }
        return cooperative;
    }

    private OffsetDateTime now() {
        return clock.instant().atOffset(ZoneOffset.UTC);
    }

    private static Instant instant(OffsetDateTime time) {
        return time.toInstant();
    }

    private static @Nullable Instant maybe(@Nullable OffsetDateTime time) {
        return time == null ? null : time.toInstant();
    }

    static String hash(String token) {
        try {
            byte[] digest = MessageDigest.getInstance("SHA-256").digest(token.getBytes(StandardCharsets.UTF_8));
            return HexFormat.of().formatHex(digest);
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException("every Java platform has SHA-256", e);
        }
    }
}
