package org.merewarden.web;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayInputStream;
import java.io.StringReader;
import java.io.StringWriter;
import java.nio.charset.StandardCharsets;
import java.util.Arrays;
import java.util.List;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVRecord;
import org.dhatim.fastexcel.reader.CellType;
import org.dhatim.fastexcel.reader.ReadableWorkbook;
import org.dhatim.fastexcel.reader.Row;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;
import org.springframework.mock.web.MockHttpServletResponse;

class SheetWriterTest {
    private static final List<String> HEADER = List.of("water", "margin");
    private static final List<List<?>> ROWS =
            List.of(Arrays.asList("Øresjø, \"the\" lake", -0.25), Arrays.asList("=HYPERLINK(\"http://x\")", null));

    @ParameterizedTest
    @ValueSource(strings = {"=1+1", "+1", "-cmd", "@SUM(A1)", "\t=1", "\r=1"})
    void textThatASpreadsheetWouldRunIsDefused(String text) {
        assertThat(SheetWriter.cell(text)).isEqualTo("'" + text);
    }

    @Test
    void numbersStayNumbersAndTheUnknownStaysEmpty() {
        assertThat(SheetWriter.cell(-12.5)).isEqualTo(-12.5);
        assertThat(SheetWriter.cell(Double.NaN)).isNull();
        assertThat(SheetWriter.cell(null)).isNull();
        assertThat(SheetWriter.cell("a=b")).isEqualTo("a=b");
    }

    @Test
    void csvReadsBackAsWritten() throws Exception {
        StringWriter out = new StringWriter();
        SheetWriter.csv(out, "preliminary", HEADER, ROWS);
        assertThat(out.toString()).startsWith("\ufeffpreliminary\r\n");
        List<CSVRecord> lines = CSVFormat.RFC4180
                .parse(new StringReader(out.toString().substring(1)))
                .getRecords();
        assertThat(lines.get(1).values()).containsExactly("water", "margin");
        assertThat(lines.get(2).values()).containsExactly("Øresjø, \"the\" lake", "-0.25");
        assertThat(lines.get(3).values()).containsExactly("'=HYPERLINK(\"http://x\")", "");
    }

    @Test
    void csvIsSentAsADatedConfidentialAttachment() throws Exception {
        MockHttpServletResponse response = new MockHttpServletResponse();
        SheetWriter.csv(response, "portfolio.csv", HEADER, ROWS);
        assertThat(response.getHeader("Content-Disposition"))
                .startsWith("attachment")
                .contains("portfolio.csv");
        assertThat(response.getContentType()).startsWith("text/csv");
        assertThat(response.getContentAsString(StandardCharsets.UTF_8))
                .containsPattern("^\ufeff\"?Preliminary and confidential.* 20\\d\\d-\\d\\d-\\d\\d");
    }

    @Test
    void xlsxReadsBackAsWritten() throws Exception {
        MockHttpServletResponse response = new MockHttpServletResponse();
        SheetWriter.xlsx(response, "portfolio.xlsx", HEADER, ROWS);
        try (ReadableWorkbook book = new ReadableWorkbook(new ByteArrayInputStream(response.getContentAsByteArray()))) {
            List<Row> rows = book.getFirstSheet().read();
            assertThat(rows.get(0).getCellText(0)).startsWith("Preliminary and confidential");
            assertThat(rows.get(1).getCellText(1)).isEqualTo("margin");
            assertThat(rows.get(2).getCell(1).getType()).isEqualTo(CellType.NUMBER);
            assertThat(rows.get(2).getCellAsNumber(1).orElseThrow()).isEqualByComparingTo("-0.25");
            assertThat(rows.get(3).getCell(0).getType()).isEqualTo(CellType.STRING);
            assertThat(rows.get(3).getCellText(0)).isEqualTo("'=HYPERLINK(\"http://x\")");
        }
    }
}
