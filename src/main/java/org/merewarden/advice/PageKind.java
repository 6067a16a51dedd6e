package org.merewarden.advice;

import java.util.Arrays;
import java.util.Optional;

/** What a signed page may be, told by its first bytes and never by its name. */
enum PageKind {
    PDF("application/pdf", '%', 'P', 'D', 'F', '-'),
    JPEG("image/jpeg", 0xFF, 0xD8, 0xFF),
    PNG("image/png", 0x89, 'P', 'N', 'G', '\r', '\n', 0x1A, '\n');

    final String mediaType;
    private final int[] first;

    PageKind(String mediaType, int... first) {
        this.mediaType = mediaType;
        this.first = first;
    }

    static Optional<PageKind> of(byte[] bytes) {
        return Arrays.stream(values()).filter(kind -> kind.starts(bytes)).findFirst();
    }

    private boolean starts(byte[] bytes) {
        if (bytes.length < first.length) {
            return false;
        }
        for (int i = 0; i < first.length; i++) {
            if ((bytes[i] & 0xFF) != first[i]) {
                return false;
            }
        }
        return true;
    }
}
