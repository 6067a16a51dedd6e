package org.merewarden.intake;

import java.io.IOException;
import java.io.InputStream;
import java.util.Iterator;
import org.apache.commons.compress.archivers.zip.ZipArchiveEntry;
import org.apache.commons.compress.archivers.zip.ZipFile;
import org.apache.commons.compress.utils.SeekableInMemoryByteChannel;

/**
 * Unpacks every part of a workbook once without keeping it, and stops where it grows beyond all measure. It uses the
 * same zip reader as the workbook reader, so that both see the same parts; sizes that the file states are not trusted.
 */
final class ZipBounds {
    static final int MOST_PARTS = 1000;
    static final long MOST_BYTES = 150_000_000;
    static final long MOST_RATIO = 100;
    private static final long RATIO_FROM_BYTES = 1_000_000;

    private ZipBounds() {}

    static void check(byte[] bytes) throws IOException, UnreadableFile {
        try (ZipFile zip = ZipFile.builder()
                .setSeekableByteChannel(new SeekableInMemoryByteChannel(bytes))
                .get()) {
            Iterator<ZipArchiveEntry> parts = zip.getEntries().asIterator();
            long total = 0;
            for (int n = 1; parts.hasNext(); n++) {
                if (n > MOST_PARTS) {
                    throw new UnreadableFile("the workbook has more than " + MOST_PARTS + " parts");
                }
                ZipArchiveEntry part = parts.next();
                total += unpackedSize(zip, part, MOST_BYTES - total);
            }
        }
    }

    private static long unpackedSize(ZipFile zip, ZipArchiveEntry part, long allowed)
            throws IOException, UnreadableFile {
        long packed = Math.max(1, part.getCompressedSize());
        byte[] buffer = new byte[65536];
        long size = 0;
        try (InputStream in = zip.getInputStream(part)) {
            for (int n = in.read(buffer); n >= 0; n = in.read(buffer)) {
                size += n;
                if (size > allowed) {
                    throw new UnreadableFile(
                            "the workbook unpacks to more than " + MOST_BYTES / 1_000_000 + " MB; split it");
                }
                if (size > RATIO_FROM_BYTES && size / packed > MOST_RATIO) {
                    throw new UnreadableFile("a part of the workbook unpacks to more than " + MOST_RATIO
                            + " times its size; save it anew with a spreadsheet program");
                }
            }
        }
        return size;
    }
}
