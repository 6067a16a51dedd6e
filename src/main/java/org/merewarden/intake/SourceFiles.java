package org.merewarden.intake;

import java.util.List;

/** Tells workbooks from CSV by their first bytes, not by their names. */
final class SourceFiles {
    static final int MOST_BYTES = 50_000_000;

    private SourceFiles() {}

    static List<SourceTable> read(byte[] bytes) throws UnreadableFile {
        if (bytes.length == 0) {
            throw new UnreadableFile("the file is empty; the first line must hold the columns' names");
        }
        if (bytes.length > MOST_BYTES) {
            throw new UnreadableFile("larger than " + MOST_BYTES / 1_000_000 + " MB; split it into several files");
        }
        if (startsWith(bytes, 'P', 'K', 3, 4)) {
            return WorkbookReader.read(bytes);
        }
        if (startsWith(bytes, 0xD0, 0xCF, 0x11, 0xE0)) {
            throw new UnreadableFile("an old or protected spreadsheet; save it as XLSX without a password, or as CSV");
        }
        if (startsWith(bytes, 0xFF, 0xFE) || startsWith(bytes, 0xFE, 0xFF)) {
            throw new UnreadableFile("written in UTF-16; save the file as “CSV UTF-8”");
        }
        return List.of(CsvReader.read(bytes));
    }

    private static boolean startsWith(byte[] bytes, int... start) {
        if (bytes.length < start.length) {
            return false;
        }
        for (int i = 0; i < start.length; i++) {
            if ((bytes[i] & 0xFF) != start[i]) {
                return false;
            }
        }
        return true;
    }
}
