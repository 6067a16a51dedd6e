package org.merewarden.intake;

import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;
import java.util.List;

/** From an uploaded file to the tables in it, each recognised where possible; a file that cannot be read says why. */
final class ImportReader {
    private ImportReader() {}

    static List<ImportedFile> read(Tables tables, Upload upload) {
        String name = Excerpt.of(upload.fileName().replaceFirst("(?s)^.*[/\\\\]", ""), 200);
        String hash = sha256(upload.content());
        try {
            List<SourceTable> found = SourceFiles.read(upload.content());
            // the only sheet of a workbook may be called anything: then the workbook's name counts
            return found.stream()
                    .map(t -> imported(tables, name, hash, t, found.size() == 1))
                    .toList();
        } catch (UnreadableFile e) {
            return List.of(new ImportedFile(
                    0,
                    name,
                    "",
                    null,
                    hash,
                    "not read",
                    DecimalMark.POINT,
                    List.of(),
                    e.problem().at(name, e.line()),
                    false,
                    List.of()));
        }
    }

    private static ImportedFile imported(Tables tables, String name, String hash, SourceTable source, boolean alone) {
        List<ImportedFile.Row> rows = source.rows().stream()
                .map(r -> new ImportedFile.Row(0, r.line(), r.cells(), r.problem(), false, Fate.refused()))
                .toList();
        String table = tables.guess(alone ? name : "", source.sheet(), source.header());
        return new ImportedFile(
                0,
                name,
                source.sheet(),
                table,
                hash,
                source.reading(),
                source.decimalMark(),
                source.header(),
                null,
                false,
                rows);
    }

    private static String sha256(byte[] bytes) {
        try {
            return HexFormat.of().formatHex(MessageDigest.getInstance("SHA-256").digest(bytes));
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException(e);
        }
    }
}
