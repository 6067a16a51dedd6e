package org.merewarden.intake;

import static org.assertj.core.api.Assertions.assertThat;

import java.nio.charset.StandardCharsets;
import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/** Files as they come, against the reading rules of the formats: what is understood, and what is said of the rest. */
class ReadingTest {
    private static final String HEADER = "gadget_code,gadget_year,gadget_sector,weight_t,share,pieces,seen_on,remark\n";

    /** What a table without any store would store of the file, or the refusals. */
    static Examiner.Outcome examine(String name, byte[] content) {
        Tables tables = new Tables(List.of(new Storeless(TestTables.GADGETS), new Storeless(TestTables.PARTS)));
        return new Examiner(tables).examine(ImportReader.read(tables, new Upload(name, content)));
    }

    private static List<String> refusals(String content) {
        return refusals(content.getBytes(StandardCharsets.UTF_8));
    }

    static List<String> refusals(byte[] content) {
        Examiner.Outcome outcome = examine("test-gadgets.csv", content);
        List<String> messages = RefusedImport.of(outcome.files()).messages();
        assertThat(outcome.refused()).isEqualTo(!messages.isEmpty());
        return messages;
    }

    private static List<TableRow> rows(String content) {
        return rows(content.getBytes(StandardCharsets.UTF_8));
    }

    static List<TableRow> rows(byte[] content) {
        Examiner.Outcome outcome = examine("test-gadgets.csv", content);
        assertThat(RefusedImport.of(outcome.files()).messages()).isEmpty();
        return outcome.toStore().getOrDefault("test-gadgets", List.of());
    }

    record Storeless(TableDefinition definition) implements TableHandler {
        @Override
        public List<Fate> examine(List<TableRow> rows, Batch batch) {
            return Collections.nCopies(rows.size(), Fate.NEW);
        }

        @Override
        public void store(List<TableRow> rows, Provenance provenance) {
            throw new UnsupportedOperationException();
        }
    }

    @Test
    void understandsEveryKindOfCell() {
        TableRow row = rows(HEADER + "g-1,2024,Very_Slow,12.4,.25,-3,2024-02-29,\"a, \"\"b\"\"\"\n")
                .get(0);
        assertThat(row.line()).isEqualTo(2);
        assertThat(row.text("gadget_code")).isEqualTo("g-1");
        assertThat(row.integer("gadget_year")).isEqualTo(2024);
        assertThat(row.text("gadget_sector")).isEqualTo("very slow");
        assertThat(row.number("weight_t")).isEqualTo(12.4);
        assertThat(row.number("share")).isEqualTo(0.25);
        assertThat(row.integer("pieces")).isEqualTo(-3);
        assertThat(row.date("seen_on")).isEqualTo(LocalDate.of(2024, 2, 29));
        assertThat(row.text("remark")).isEqualTo("a, \"b\"");
    }

    @Test
    void emptyMeansUnknownUnlessTheColumnHasADefault() {
        TableRow row = rows(HEADER + "g,2024,, 0 , ,,,\n").get(0);
        assertThat(row.text("gadget_sector")).isEqualTo("commercial");
        assertThat(row.number("weight_t")).isZero();
        assertThat(row.values()).containsOnlyKeys("gadget_code", "gadget_year", "gadget_sector", "weight_t");
    }

    @Test
    void takesByteOrderMarksSeparatorsAndHeadersInAnyCase() {
        String semicolons = "\uFEFF Gadget Code ;GADGET-YEAR;weight_T\r\ng;2024;12,4\r\n";
        assertThat(rows(semicolons).get(0).number("weight_t")).isEqualTo(12.4);
        assertThat(rows("gadget_code\tgadget_year\tweight_t\ng\t2024\t1,5e1\n")
                        .get(0)
                        .number("weight_t"))
                .isEqualTo(15);
        assertThat(examine("test-gadgets.csv", semicolons.getBytes(StandardCharsets.UTF_8))
                        .files()
                        .get(0)
                        .reading())
                .isEqualTo("UTF-8 with byte order mark, separated by semicolons");
    }

    @Test
    void countsLinesOfTheFileNotRecords() {
        String text = "\n" + HEADER + "g,2020,,1,,,,\"two\nlines\"\r\n\r\n\nh,2020,,x,,,,\n";
        assertThat(refusals(text))
                .hasSize(1)
                .first()
                .asString()
                .startsWith("test-gadgets.csv, line 7, column weight_t, “x”: ");
    }

    @Test
    void keepsUnknownColumnsInTheRecord() {
        String text = "gadget_code,colour,gadget_year,weight_t\ng,blue,2024,1\n";
        ImportedFile file =
                examine("x.csv", text.getBytes(StandardCharsets.UTF_8)).files().get(0);
        assertThat(file.table()).isEqualTo("test-gadgets");
        assertThat(file.rows().get(0).cells()).containsEntry("colour", "blue");
        assertThat(file.refused()).isFalse();
    }

    @ParameterizedTest
    @CsvSource(
            delimiter = '|',
            value = {
                // line with cells after the header | column | value | the rule's gist
                "g,2024,,NaN,,,, | weight_t | NaN | a number such as 12.4 is needed",
                "g,2024,,Infinity,,,, | weight_t | Infinity | a number such as 12.4 is needed",
                "g,2024,,1e999,,,, | weight_t | 1e999 | the number is too large",
                "g,2024,,-0.5,,,, | weight_t | -0.5 | must be at least 0",
                "g,2024,,12 t,,,, | weight_t | 12 t | without unit",
                "g,2024,,,,,, | weight_t | '' | may not be empty",
                "g,2024,,0x1p3,,,, | weight_t | 0x1p3 | a number such as 12.4 is needed",
                "g,2024,,1d,,,, | weight_t | 1d | a number such as 12.4 is needed",
                "g,2024,,\"1,5\",,,, | weight_t | 1,5 | write decimals with a point",
                "g,2024,,\"1,234.5\",,,, | weight_t | 1,234.5 | without separators between the thousands",
                "g,2024,,1 234,,,, | weight_t | 1 234 | without separators between the thousands",
                "g,2024,,1'234.5,,,, | weight_t | 1'234.5 | without separators between the thousands",
                "g,19999,,1,,,, | gadget_year | 19999 | must lie between 1800 and 2200",
                "g,1799,,1,,,, | gadget_year | 1799 | must lie between 1800 and 2200",
                "g,2024.5,,1,,,, | gadget_year | 2024.5 | a year such as 2024 is needed",
                "g,99999999999,,1,,,, | gadget_year | 99999999999 | a year such as 2024 is needed",
                "g,,,1,,,, | gadget_year | '' | may not be empty",
                "g h,2024,,1,,,, | gadget_code | g h | a code has no spaces",
                "g,2024,unheard,1,,,, | gadget_sector | unheard | must be one of: very slow, commercial, angling",
                "g,2024,,1,1.01,,, | share | 1.01 | must lie between 0 and 1",
                "g,2024,,1,,1.5,, | pieces | 1.5 | a whole number such as 12 is needed",
                "g,2024,,1,,,2023-02-29, | seen_on | 2023-02-29 | a date such as 2024-06-30 is needed",
                "g,2024,,1,,,30.06.2024, | seen_on | 30.06.2024 | a date such as 2024-06-30 is needed",
                "g,2024,,1,,,2024-06-30T10:00, | seen_on | 2024-06-30T10:00 | a date such as 2024-06-30 is needed",
                "g,2024,,1,,,0024-06-30, | seen_on | 0024-06-30 | the year must lie between 1800 and 2200",
                "g,2024,,1,,,,12345678901234567890123456789012345678901 | remark"
                        + " | 12345678901234567890123456789012345678901 | 41 characters; at most 40",
            })
    void refusesCellsNamingLineColumnValueAndRule(String line, String column, String value, String rule) {
        String place = "test-gadgets.csv, line 3, column " + column + (value.isEmpty() ? "" : ", “" + value + "”");
        assertThat(refusals(HEADER + "fine,2024,,1,,,,\n" + line + "\n"))
                .hasSize(1)
                .first()
                .asString()
                .startsWith(place + ": ")
                .contains(rule);
    }

    @Test
    void refusesDecimalCommasThatCouldBeThousands() {
        String header = "gadget_code;gadget_year;weight_t;share\n";
        assertThat(rows(header + "g;2024;1,234;\n").get(0).number("weight_t")).isEqualTo(1.234);
        assertThat(rows(header + "g;2024;12,4;0.5\n").get(0).number("weight_t")).isEqualTo(12.4);
        assertThat(refusals(header + "g;2024;1,234;0.5\n"))
                .hasSize(1)
                .first()
                .asString()
                .startsWith("test-gadgets.csv, line 2, column weight_t, “1,234”: could mean thousands or decimals");
        assertThat(refusals(header + "g;2024;1.234,5;\n").get(0)).contains("without separators between the thousands");
    }

    @Test
    void refusesTheLaterOfTwoRowsWithOneKey() {
        assertThat(refusals(HEADER + "g,2024,,1,,,,\nh,2024,,1,,,,\nG,2024,Commercial,2,,,,\n"))
                .containsExactly("test-gadgets.csv, line 4, column gadget_code, gadget_year, gadget_sector,"
                        + " “G, 2024, commercial”: the same key as line 2 of test-gadgets.csv; a key may occur once"
                        + " in an import");
    }

    @Test
    void refusesRaggedRows() {
        assertThat(refusals(HEADER + "g,2024,,1,,,,\nh,2024,,1\ni,2024,,1,,,,,\n"))
                .satisfiesExactly(
                        m -> assertThat(m).startsWith("test-gadgets.csv, line 3: 4 cells where the header has 8"),
                        m -> assertThat(m).startsWith("test-gadgets.csv, line 4: 9 cells where the header has 8"));
    }

    @Test
    void refusesFilesThatLackColumnsOrNameThemTwice() {
        assertThat(refusals("gadget_code,remark\ng,x\n"))
                .containsExactly("test-gadgets.csv, line 1: the table test-gadgets needs the columns gadget_year,"
                        + " weight_t, which are missing");
        assertThat(refusals("gadget_code,Gadget-Code\ng,x\n"))
                .containsExactly("test-gadgets.csv, line 1, column gadget_code, “Gadget-Code”: the column occurs twice;"
                        + " keep one of them");
        assertThat(refusals("\n \n"))
                .containsExactly(
                        "test-gadgets.csv: there is nothing in it; the first line must" + " hold the columns' names");
    }

    @Test
    void refusesWhatIsNotUtf8NamingLineAndOffset() {
        byte[] latin = "gadget_code,gadget_year,weight_t\ng\u00e9,2024,1\n".getBytes(StandardCharsets.ISO_8859_1);
        // 32 characters and a line break make the header line; the code's second byte follows
        assertThat(refusals(latin))
                .containsExactly("test-gadgets.csv, line 2, “byte E9”: not UTF-8 at byte offset 34; save the file as"
                        + " “CSV UTF-8”");
        assertThat(refusals("gadget_code".getBytes(StandardCharsets.UTF_16)).get(0))
                .contains("UTF-16");
        assertThat(refusals(new byte[0]).get(0)).contains("the file is empty");
    }

    @Test
    void refusesQuotationMarksThatDoNotMatch() {
        assertThat(refusals(HEADER + "g,2024,,1,,,,\nh,2024,,1,,,,\"open\n\n").get(0))
                .startsWith("test-gadgets.csv, line 3: quotation marks do not match");
        assertThat(refusals(HEADER + "\"g\"x,2024,,1,,,,\n").get(0))
                .startsWith("test-gadgets.csv, line 2: quotation marks do not match");
    }

    @Test
    void refusesGiantCellsRowsAndTables() {
        assertThat(refusals(HEADER + "g,2024,,1,,,," + "x".repeat(32_768) + "\n")
                        .get(0))
                .startsWith("test-gadgets.csv, line 2, column remark, “xxx")
                .contains("a cell of 32768 characters; at most 32767");
        assertThat(refusals(HEADER + "g,2024,,1,,,," + "x".repeat(10_500_000) + "\n")
                        .get(0))
                .contains("at most 32767")
                .hasSizeLessThan(500);
        assertThat(refusals("g" + ",a".repeat(300)).get(0)).contains("at most 200");
        assertThat(refusals(HEADER + "g,2024,,1,,,,\n".repeat(200_001)).get(0))
                .startsWith("test-gadgets.csv, line 200002: more than 200000 rows");
    }

    @Test
    void refusesControlCharacters() {
        assertThat(refusals(HEADER + "g,2024,,1,,,,a\u0000b\n"))
                .containsExactly("test-gadgets.csv, line 2, column remark, “a\uFFFDb”: holds a control character;"
                        + " type the text anew");
    }

    /** Laws for any bytes: an answer comes, every refusal says where, and what is not refused has all its cells. */
    @Test
    void answersAnyBytesWithRowsOrWithReasons() {
        Random random = new Random(20261201);
        byte[] good = (HEADER + "g,2024,,12.5,0.5,3,2024-05-06,\"a \"\"b\"\"\"\nh,2023,angling,0,,,,ü\n")
                .getBytes(StandardCharsets.UTF_8);
        int refused = 0;
        for (int i = 0; i < 3000; i++) {
            byte[] bytes = i % 3 == 0 ? noise(random) : mutated(good, random);
            Examiner.Outcome outcome = examine("test-gadgets.csv", bytes);
            List<String> messages = RefusedImport.of(outcome.files()).messages();
            refused += outcome.refused() ? 1 : 0;
            assertThat(outcome.refused()).isEqualTo(!messages.isEmpty());
            assertThat(messages).allMatch(m -> m.startsWith("test-gadgets.csv") && m.contains(": "));
            for (TableRow row : outcome.toStore().getOrDefault("test-gadgets", List.of())) {
                assertThat(row.values()).containsKeys("gadget_code", "gadget_year", "gadget_sector", "weight_t");
                assertThat(row.integer("gadget_year")).isBetween(1800, 2200);
                assertThat(row.number("weight_t")).isFinite().isNotNegative();
            }
        }
        assertThat(refused).as("mutations that were noticed").isBetween(1000, 2999);
    }

    private static byte[] noise(Random random) {
        byte[] bytes = new byte[random.nextInt(400)];
        random.nextBytes(bytes);
        return bytes;
    }

    static byte[] mutated(byte[] good, Random random) {
        List<Byte> bytes = new ArrayList<>();
        for (byte b : good) {
            bytes.add(b);
        }
        String likely = ",;\t\"\n\r.-e0x\u0000";
        for (int n = 1 + random.nextInt(3); n > 0; n--) {
            int at = random.nextInt(bytes.size());
            byte other = random.nextBoolean()
                    ? (byte) likely.charAt(random.nextInt(likely.length()))
                    : (byte) random.nextInt(256);
            switch (random.nextInt(3)) {
                case 0 -> bytes.set(at, other);
                case 1 -> bytes.add(at, other);
                default -> bytes.remove(at);
            }
        }
        byte[] result = new byte[bytes.size()];
        for (int i = 0; i < result.length; i++) {
            result[i] = bytes.get(i);
        }
        return result;
    }
}
