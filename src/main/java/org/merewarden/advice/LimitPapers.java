package org.merewarden.advice;

import java.io.ByteArrayOutputStream;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.sql.ResultSet;
import java.sql.SQLException;
import java.sql.Types;
import java.time.Clock;
import java.time.Instant;
import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.Arrays;
import java.util.HexFormat;
import java.util.List;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.web.Who;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.jdbc.support.GeneratedKeyHolder;
import org.springframework.stereotype.Repository;
import org.springframework.transaction.annotation.Transactional;

/** What comes in on paper about an issued limit: objections, and the page as it was signed. Rows are added only. */
@Repository
class LimitPapers {
    /** A binary column of the embedded store holds one mebibyte. */
    private static final int PART_BYTES = 1_000_000;

    private static final String ATTACHMENTS = "select id, limit_id, file_name, media_type, sha256, byte_count,"
            + " attached_at, attached_by from limit_attachment ";

    private final JdbcClient jdbc;
    private final LimitSubjects subjects;
    private final ActivityLog activity;
    private final Clock clock;

    LimitPapers(JdbcClient jdbc, LimitSubjects subjects, ActivityLog activity, Clock clock) {
        this.jdbc = jdbc;
        this.subjects = subjects;
        this.activity = activity;
        this.clock = clock;
    }

    /** @param objector an organisation or a role, never a private person's name */
    record Objection(
            String objector,
            LocalDate receivedOn,
            String objection,
            @Nullable String answer,
            Instant notedAt,
            String notedBy) {}

    record SignedPage(
            long id,
            long limitId,
            String fileName,
            String mediaType,
            String sha256,
            int bytes,
            Instant attachedAt,
            String attachedBy) {}

    @Transactional
    public void note(long limitId, NewLimit limit, ObjectionForm objection) {
        jdbc.sql("""
                        insert into limit_objection (limit_id, objector, received_on, objection, answer, noted_at,
                            noted_by)
                        values (:limit, :objector, :received, :objection, :answer, :at, :by)""")
                .param("limit", limitId)
                .param("objector", objection.objector)
                .param("received", objection.receivedOn)
                .param("objection", objection.text)
                .param("answer", objection.answer, Types.VARCHAR)
                .param("at", now())
                .param("by", Who.name())
                .update();
        activity.record("noted objection", subjects.subject(limitId, limit), null, objection.objector);
    }

    List<Objection> objections(long limitId) {
        return jdbc.sql("""
                        select objector, received_on, objection, answer, noted_at, noted_by from limit_objection
                        where limit_id = ? order by id""")
                .param(limitId)
                .query((row, n) -> new Objection(
                        row.getString(1),
                        row.getObject(2, LocalDate.class),
                        row.getString(3),
                        row.getString(4),
                        row.getObject(5, OffsetDateTime.class).toInstant(),
                        row.getString(6)))
                .list();
    }

    /** Keeps the page's bytes with their hash; a page that is kept already raises a duplicate key. */
    @Transactional
    public void attach(long limitId, NewLimit limit, String fileName, PageKind kind, byte[] bytes) {
        String hash = sha256(bytes);
        var keys = new GeneratedKeyHolder();
        jdbc.sql("""
                        insert into limit_attachment (limit_id, file_name, media_type, sha256, byte_count, attached_at,
                            attached_by)
                        values (?, ?, ?, ?, ?, ?, ?)""")
                .params(limitId, fileName, kind.mediaType, hash, bytes.length, now(), Who.name())
                .update(keys, "id");
        long id = Objects.requireNonNull(keys.getKey()).longValue();
        for (int from = 0; from < bytes.length; from += PART_BYTES) {
            jdbc.sql("insert into limit_attachment_part (attachment_id, place, content) values (?, ?, ?)")
                    .params(
                            id,
                            from / PART_BYTES,
                            Arrays.copyOfRange(bytes, from, Math.min(bytes.length, from + PART_BYTES)))
                    .update();
        }
        activity.record("attached signed page", subjects.subject(limitId, limit), null, fileName + ", SHA-256 " + hash);
    }

    List<SignedPage> pages(long limitId) {
        return jdbc.sql(ATTACHMENTS + "where limit_id = ? order by id")
                .param(limitId)
                .query(LimitPapers::page)
                .list();
    }

    Optional<SignedPage> page(long limitId, long id) {
        return jdbc.sql(ATTACHMENTS + "where limit_id = ? and id = ?")
                .params(limitId, id)
                .query(LimitPapers::page)
                .optional();
    }

    byte[] content(long id) {
        var bytes = new ByteArrayOutputStream();
        jdbc.sql("select content from limit_attachment_part where attachment_id = ? order by place")
                .param(id)
                .query((row, n) -> row.getBytes(1))
                .list()
                .forEach(bytes::writeBytes);
        return bytes.toByteArray();
    }

    private static SignedPage page(ResultSet row, int n) throws SQLException {
        return new SignedPage(
                row.getLong(1),
                row.getLong(2),
                row.getString(3),
                row.getString(4),
                row.getString(5),
                row.getInt(6),
                row.getObject(7, OffsetDateTime.class).toInstant(),
                row.getString(8));
    }

    private OffsetDateTime now() {
        return clock.instant().atOffset(ZoneOffset.UTC);
    }

    private static String sha256(byte[] bytes) {
        try {
            return HexFormat.of().formatHex(MessageDigest.getInstance("SHA-256").digest(bytes));
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException(e);
        }
    }
}
