package org.merewarden.core.evidence;

import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;

/** SHA-256 of the evidence's canonical text; records print their components in declaration order. */
final class ContentHash {
    private ContentHash() {}

    static String of(Evidence evidence) {
        try {
            byte[] digest = MessageDigest.getInstance("SHA-256")
                    .digest(evidence.toString().getBytes(StandardCharsets.UTF_8));
            return HexFormat.of().formatHex(digest);
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException("every Java platform has SHA-256", e);
        }
    }
}
