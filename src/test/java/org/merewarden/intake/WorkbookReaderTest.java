package org.merewarden.intake;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.time.LocalDate;
import java.util.Collections;
import java.util.List;
import java.util.Map;
import java.util.Random;
import java.util.zip.ZipEntry;
import java.util.zip.ZipOutputStream;
import org.apache.commons.compress.archivers.zip.ZipArchiveEntry;
import org.apache.commons.compress.archivers.zip.ZipFile;
import org.apache.commons.compress.utils.SeekableInMemoryByteChannel;
import org.dhatim.fastexcel.Workbook;
import org.dhatim.fastexcel.Worksheet;
import org.junit.jupiter.api.Test;

/** Workbooks as spreadsheet programs write them, and as nobody should. */
class WorkbookReaderTest {
    private static final String[] HEADER = {"Gadget Code", "gadget_year", "weight_t", "seen_on", "remark"};

    private static byte[] workbook() throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        try (Workbook book = new Workbook(out, "test", "1.0")) {
            Worksheet sheet = book.newWorksheet("Test Gadgets");
            for (int i = 0; i < HEADER.length; i++) {
                sheet.value(0, i, HEADER[i]);
            }
            sheet.value(1, 0, "g");
            sheet.value(1, 1, 2024);
            sheet.value(1, 2, 12.4);
            sheet.value(1, 3, LocalDate.of(2024, 2, 29));
            sheet.style(1, 3).format("yyyy-MM-dd").set();
            sheet.value(3, 0, "h");
            sheet.value(3, 1, 2023);
            sheet.value(3, 2, 1e-7);
            Worksheet parts = book.newWorksheet("test-parts");
            parts.value(0, 0, "part_code");
            parts.value(0, 1, "of_gadget");
            parts.value(0, 2, "of_year");
        }
        return out.toByteArray();
    }

    /** The same workbook with a part's text changed: what the writing library would never write. */
    private static byte[] altered(byte[] workbook, String part, String from, String to) throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        try (ZipFile in = ZipFile.builder()
                        .setSeekableByteChannel(new SeekableInMemoryByteChannel(workbook))
                        .get();
                ZipOutputStream zip = new ZipOutputStream(out)) {
            for (ZipArchiveEntry entry : Collections.list(in.getEntries())) {
                byte[] content = in.getInputStream(entry).readAllBytes();
                if (entry.getName().equals(part)) {
                    String text = new String(content, StandardCharsets.UTF_8);
                    assertThat(text).contains(from);
                    content = text.replace(from, to).getBytes(StandardCharsets.UTF_8);
                }
                zip.putNextEntry(new ZipEntry(entry.getName()));
                zip.write(content);
            }
        }
        return out.toByteArray();
    }

    private static byte[] alteredSheet(String from, String to) throws IOException {
        return altered(workbook(), "xl/worksheets/sheet1.xml", from, to);
    }

    private static List<String> refusals(byte[] workbook) {
        return RefusedImport.of(ReadingTest.examine("book.xlsx", workbook).files())
                .messages();
    }

    @Test
    void readsASheetForEachTableWithDatesAndNumbers() throws IOException {
        Examiner.Outcome outcome = ReadingTest.examine("book.xlsx", workbook());
        assertThat(outcome.files()).extracting(ImportedFile::table).containsExactly("test-gadgets", "test-parts");
        assertThat(refusals(workbook())).isEmpty();
        List<TableRow> rows = outcome.toStore().get("test-gadgets");
        assertThat(rows).extracting(TableRow::line).containsExactly(2, 4);
        assertThat(rows.get(0).values())
                .isEqualTo(Map.of(
                        "gadget_code",
                        "g",
                        "gadget_year",
                        2024,
                        "gadget_sector",
                        "commercial",
                        "weight_t",
                        12.4,
                        "seen_on",
                        LocalDate.of(2024, 2, 29)));
        assertThat(rows.get(1).number("weight_t")).isEqualTo(1e-7);
    }

    @Test
    void readsTheNumberThatASpreadsheetMeans() throws IOException {
        Examiner.Outcome outcome =
                ReadingTest.examine("book.xlsx", alteredSheet("<v>12.4</v>", "<v>12.400000000000000355</v>"));
        assertThat(outcome.files().get(0).rows().get(0).cells()).containsEntry("weight_t", "12.4");
    }

    @Test
    void usesStoredResultsOfFormulasAndSaysSo() throws IOException {
        byte[] book = alteredSheet("<v>12.4</v>", "<f>6.2*2</f><v>12.4</v>");
        Examiner.Outcome outcome = ReadingTest.examine("book.xlsx", book);
        assertThat(outcome.toStore().get("test-gadgets").get(0).number("weight_t"))
                .isEqualTo(12.4);
        assertThat(outcome.files().get(0).reading()).contains("1 formulas read by their stored results");
    }

    @Test
    void refusesFormulasWithoutResultAndErrors() throws IOException {
        assertThat(refusals(alteredSheet("<v>12.4</v>", "<f>6.2*2</f>")))
                .containsExactly("book.xlsx, sheet Test Gadgets, line 2, “=6.2*2”: cell C2: the formula has no stored"
                        + " result; enter the value itself");
        assertThat(refusals(alteredSheet("<v>12.4</v>", "<v>12.4.5</v>")))
                .hasSize(1)
                .first()
                .asString()
                .startsWith("book.xlsx, sheet Test Gadgets, line 2")
                .endsWith("cell C2: the cell holds an error; enter the value itself");
    }

    @Test
    void refusesDatesWithTimesAndNumbersWhereDatesBelong() throws IOException {
        // 45351 is 2024-02-29 in the 1900 date system
        assertThat(refusals(alteredSheet("<v>45351.0</v>", "<v>45351.5</v>")).get(0))
                .startsWith(
                        "book.xlsx, sheet Test Gadgets, line 2, column seen_on, “2024-02-29T12:00”: a date such as");
    }

    @Test
    void refusesBombs() throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        try (ZipOutputStream zip = new ZipOutputStream(out)) {
            zip.putNextEntry(new ZipEntry("xl/sharedStrings.xml"));
            byte[] block = new byte[1_000_000];
            for (int i = 0; i < 400; i++) {
                zip.write(block);
            }
        }
        assertThat(out.size()).isLessThan(1_000_000);
        assertThat(refusals(out.toByteArray()))
                .containsExactly("book.xlsx: a part of the workbook unpacks to more than 100 times its size; save it"
                        + " anew with a spreadsheet program");
        ByteArrayOutputStream many = new ByteArrayOutputStream();
        try (ZipOutputStream zip = new ZipOutputStream(many)) {
            for (int i = 0; i < 1001; i++) {
                zip.putNextEntry(new ZipEntry("part" + i));
            }
        }
        assertThat(refusals(many.toByteArray())).containsExactly("book.xlsx: the workbook has more than 1000 parts");
    }

    @Test
    void refusesEntitiesFromOutside() throws IOException {
        byte[] book = alteredSheet(
                "<worksheet", "<!DOCTYPE worksheet [<!ENTITY x SYSTEM \"file:///etc/hostname\">]><worksheet");
        byte[] used = altered(book, "xl/worksheets/sheet1.xml", "<v>12.4</v>", "<v>&x;</v>");
        assertThat(refusals(used)).isNotEmpty();
    }

    @Test
    void refusesGiantCells() throws IOException {
        byte[] book = alteredSheet("<v>12.4</v>", "<v>" + "9".repeat(40_000) + "</v>");
        assertThat(refusals(book)).hasSize(1).first().asString().hasSizeLessThan(600);
    }

    @Test
    void refusesDamagedWorkbooksOnlyInTheDeclaredWay() throws IOException {
        byte[] good = workbook();
        Random random = new Random(7);
        int unreadable = 0;
        for (int i = 0; i < 300; i++) {
            byte[] bad = good.clone();
            for (int n = 0; n < 3; n++) {
                bad[4 + random.nextInt(bad.length - 4)] = (byte) random.nextInt(256);
            }
            try {
                WorkbookReader.read(bad);
            } catch (UnreadableFile e) {
                unreadable++;
                assertThat(e.problem().rule()).isNotBlank();
            }
        }
        assertThat(unreadable).isGreaterThan(50);
        assertThatThrownBy(() -> WorkbookReader.read(new byte[] {'P', 'K', 3, 4}))
                .isInstanceOf(UnreadableFile.class);
    }
}
