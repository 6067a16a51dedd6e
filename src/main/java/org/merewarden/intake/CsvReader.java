package org.merewarden.intake;

import java.io.IOException;
import java.io.StringReader;
import java.io.UncheckedIOException;
import java.nio.ByteBuffer;
import java.nio.CharBuffer;
import java.nio.charset.CharsetDecoder;
import java.nio.charset.CoderResult;
import java.nio.charset.CodingErrorAction;
import java.nio.charset.StandardCharsets;
import java.util.Iterator;
import java.util.List;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVParser;
import org.apache.commons.csv.CSVRecord;

/** Reads CSV (RFC 4180) in UTF-8, the separator being what the header line uses: comma, semicolon or tab. */
final class CsvReader {
    private static final char BYTE_ORDER_MARK = '\uFEFF';

    private CsvReader() {}

    static SourceTable read(byte[] bytes) throws UnreadableFile {
        String text = decode(bytes);
        boolean marked = !text.isEmpty() && text.charAt(0) == BYTE_ORDER_MARK;
        if (marked) {
            text = text.substring(1);
        }
        char separator = separator(text);
        TableBuilder table = new TableBuilder(true);
        fill(table, text, separator);
        String reading = (marked ? "UTF-8 with byte order mark" : "UTF-8") + ", " + nameOf(separator);
        return table.build("", reading, separator == ',');
    }

    private static void fill(TableBuilder table, String text, char separator) throws UnreadableFile {
        CSVFormat format = CSVFormat.RFC4180.builder().setDelimiter(separator).get();
        int line = 1;
        try (CSVParser parser = CSVParser.parse(new StringReader(text), format)) {
            Iterator<CSVRecord> records = parser.iterator();
            while (true) {
                // the line on which the next record starts: quoted cells may hold line breaks
                line = (int) parser.getCurrentLineNumber() + 1;
                if (!records.hasNext()) {
                    return;
                }
                table.add(line, records.next().toList(), null);
            }
        } catch (IOException | UncheckedIOException | IllegalStateException e) {
            throw new UnreadableFile(
                    line,
                    "",
                    "",
                    "quotation marks do not match: a cell that starts with \" must end with \" before the next"
                            + " separator, and \" inside it is written \"\"");
        }
    }

    private static String decode(byte[] bytes) throws UnreadableFile {
        CharsetDecoder decoder = StandardCharsets.UTF_8
                .newDecoder()
                .onMalformedInput(CodingErrorAction.REPORT)
                .onUnmappableCharacter(CodingErrorAction.REPORT);
        ByteBuffer in = ByteBuffer.wrap(bytes);
        CharBuffer out = CharBuffer.allocate(bytes.length + 1);
        CoderResult result = decoder.decode(in, out, true);
        if (result.isError()) {
            int line = lineAt(bytes, in.position());
            throw new UnreadableFile(
                    line,
                    "",
                    String.format("byte %02X", bytes[in.position()]),
                    "not UTF-8 at byte offset " + in.position() + "; save the file as “CSV UTF-8”");
        }
        return out.flip().toString();
    }

    private static int lineAt(byte[] bytes, int offset) {
        int line = 1;
        for (int i = 0; i < offset; i++) {
            boolean lineFeed = bytes[i] == '\n';
            boolean loneReturn = bytes[i] == '\r' && (i + 1 >= bytes.length || bytes[i + 1] != '\n');
            line += lineFeed || loneReturn ? 1 : 0;
        }
        return line;
    }

    /** The most frequent of the three outside quotation marks in the first line that is not empty. */
    private static char separator(String text) {
        String header = text.lines().filter(l -> !l.isBlank()).findFirst().orElse("");
        char best = ',';
        long most = 0;
        for (char candidate : List.of(',', ';', '\t')) {
            long count = countOutsideQuotes(header, candidate);
            if (count > most) {
                best = candidate;
                most = count;
            }
        }
        return best;
    }

    private static long countOutsideQuotes(String line, char wanted) {
        boolean quoted = false;
        long count = 0;
        for (int i = 0; i < line.length(); i++) {
            quoted ^= line.charAt(i) == '"';
            count += !quoted && line.charAt(i) == wanted ? 1 : 0;
        }
        return count;
    }

    private static String nameOf(char separator) {
        return switch (separator) {
            case ';' -> "separated by semicolons";
            case '\t' -> "separated by tabs";
            default -> "separated by commas";
        };
    }
}
