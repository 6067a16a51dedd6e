package org.merewarden;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.multipart;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.io.IOException;
import java.io.InputStream;
import java.nio.charset.StandardCharsets;
import java.time.Duration;
import java.time.Instant;
import java.util.List;
import java.util.Objects;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import java.util.stream.Collectors;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.mock.web.MockMultipartFile;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.request.RequestPostProcessor;

/**
 * The published series of reference/SOURCES.md, under stand-in lakes and species codes, in through the importer and out
 * on the stock page.
 */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class PublishedSeriesTest {
    private static final RequestPostProcessor BIOLOGIST = user("biologist").roles("BIOLOGIST");

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @BeforeAll
    void importAndAssess() throws Exception {
        send(
                file(
                        "water-bodies",
                        "code,name,area_ha",
                        "series-a,Stand-in A,1000",
                        "series-b,Stand-in B,1000",
                        "series-c,Stand-in C,1000"),
                file("stocks", "water_body,species", "series-a,CRD", "series-b,FPE", "series-c,WHF"),
                file(
                        "catches",
                        "water_body,species,year,catch_t",
                        rows("series_arabian_sea_shrimp.csv", r -> "series-a,CRD," + r[0] + "," + r[1]),
                        rows("series_java_trawl.csv", r -> "series-b,FPE," + r[0] + "," + thousands(r[1])),
                        rows(
                                "series_south_atlantic_albacore.csv",
                                r -> "series-c,WHF," + r[0] + "," + thousands(r[1]))),
                file(
                        "effort",
                        "water_body,species,year,series,effort,unit",
                        rows(
                                "series_arabian_sea_shrimp.csv",
                                r -> "series-a,CRD," + r[0] + ",trawl," + r[2] + ",1000 days"),
                        rows("series_java_trawl.csv", r -> "series-b,FPE," + r[0] + ",trawl," + r[2] + ",vessels")),
                file(
                        "surveys",
                        "water_body,species,year,series,time_of_year,kind,value,unit",
                        rows(
                                "series_south_atlantic_albacore.csv",
                                r -> "series-c,WHF," + r[0] + ",longline,0,index," + r[2] + ",kg/100 hooks")));
        for (String stock : List.of("series-a/CRD", "series-b/FPE", "series-c/WHF")) {
            mvc.perform(post("/stocks/" + stock + "/assessments")
                            .with(BIOLOGIST)
                            .with(csrf()))
                    .andExpect(status().is3xxRedirection());
        }
        Instant end = Instant.now().plus(Duration.ofSeconds(90));
        while (assessed() < 3 && Instant.now().isBefore(end)) {
            Thread.sleep(200);
        }
        assertThat(assessed()).isEqualTo(3);
    }

    private int assessed() {
        return jdbc.sql("select count(*) from assessment a join stock s on s.id = a.stock_id"
                        + " join water_body w on w.id = s.water_body_id where w.code like 'series-%'")
                .query(Integer.class)
                .single();
    }

    /** Cadima 2003, FAO Fisheries Technical Paper 393, sec. 8.19: a, b, r² published; MSY and its effort computed. */
    @Test
    void arabianSeaShrimp() throws Exception {
        String page = page("series-a/CRD");
        assertThat(value(page, "Schaefer: intercept a of catch per effort")).isCloseTo(444.454, within(0.0005));
        assertThat(value(page, "Schaefer: slope b")).isCloseTo(-8.055, within(0.0005));
        assertThat(value(page, "Schaefer: r²")).isCloseTo(0.77, within(0.005));
        assertThat(value(page, "Schaefer: MSY, t a year")).isCloseTo(6130.92, within(0.05));
        assertThat(value(page, "Schaefer: effort at MSY")).isCloseTo(27.5886, within(0.00005));
        assertThat(value(page, "Fox: intercept a of the logarithm of catch per effort"))
                .isCloseTo(6.150, within(0.0005));
        assertThat(value(page, "Fox: slope b")).isCloseTo(-0.028, within(0.0005));
        assertThat(value(page, "Fox: r²")).isCloseTo(0.78, within(0.005));
        assertThat(value(page, "Fox: MSY, t a year")).isCloseTo(6159.16, within(0.05));
        assertThat(value(page, "Fox: effort at MSY")).isCloseTo(35.7210, within(0.00005));
    }

    /** Sparre and Venema 1998, FAO Fisheries Technical Paper 306/1, ch. 9: data recalled, 1 % against the book. */
    @Test
    void javaTrawl() throws Exception {
        String page = page("series-b/FPE");
        assertThat(value(page, "Schaefer: MSY, t a year")).isCloseTo(66_020, within(660.0));
        assertThat(value(page, "Schaefer: effort at MSY")).isCloseTo(1241.2, within(12.4));
        assertThat(value(page, "Fox: MSY, t a year")).isCloseTo(60_940, within(609.0));
        assertThat(value(page, "Fox: effort at MSY")).isCloseTo(1273.7, within(12.7));
    }

    /** Polacheck, Hilborn and Punt 1993, Can. J. Fish. Aquat. Sci. 50: 2597–2607: results recalled; MSY 2 %, r, K 5 %. */
    @Test
    void southAtlanticAlbacore() throws Exception {
        String page = page("series-c/WHF");
        assertThat(value(page, "Difference equation: MSY, t a year")).isCloseTo(19_650, within(0.02 * 19_650));
        assertThat(value(page, "Difference equation: r, 1/year")).isCloseTo(0.328, within(0.05 * 0.328));
        assertThat(value(page, "Difference equation: K, t")).isCloseTo(239_600, within(0.05 * 239_600));
        assertThat(page).doesNotContain("not settled");
    }

    /** The refits' middle 80 % holds the best fit; the same page says the same twice. */
    @Test
    void theRefitsStandBesideTheDifferenceEquation() throws Exception {
        String page = page("series-c/WHF/assessments/1/older-estimators");
        assertThat(value(page, "Difference equation: MSY, t a year")).isCloseTo(19_650, within(0.02 * 19_650));
        Matcher range = Pattern.compile(
                        "MSY, t a year</span></th>\\s*<td[^>]*>[^<]*</td>\\s*<td[^>]*>([0-9,]+)–([0-9,]+)<")
                .matcher(page);
        assertThat(range.find()).isTrue();
        assertThat(Double.parseDouble(range.group(1).replace(",", ""))).isBetween(10_000.0, 19_500.0);
        assertThat(Double.parseDouble(range.group(2).replace(",", ""))).isBetween(19_700.0, 30_000.0);
        assertThat(page("series-c/WHF/assessments/1/older-estimators").replaceAll("_csrf[^>]*>", ""))
                .isEqualTo(page.replaceAll("_csrf[^>]*>", ""));
        assertThat(page("series-a/CRD/assessments/1/older-estimators")).contains("Effort–yield regressions");
    }

    private String page(String stock) throws Exception {
        return mvc.perform(get("/stocks/" + stock).with(BIOLOGIST))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString();
    }

    /** The number in the table row with exactly that heading. */
    private static double value(String page, String heading) {
        Matcher row = Pattern.compile(
                        ">" + Pattern.quote(heading) + "(?:</span>)?</th>\\s*<td[^>]*>\\s*([^<]+?)\\s*</td>")
                .matcher(page);
        assertThat(row.find()).as("a row “" + heading + "”").isTrue();
        return Double.parseDouble(row.group(1).replace(",", "").replace("−", "-"));
    }

    private void send(MockMultipartFile... files) throws Exception {
        var upload = multipart("/imports");
        for (MockMultipartFile file : files) {
            upload.file(file);
        }
        String address =
                Objects.requireNonNull(mvc.perform(upload.with(BIOLOGIST).with(csrf()))
                        .andExpect(status().is3xxRedirection())
                        .andReturn()
                        .getResponse()
                        .getRedirectedUrl());
        String preview = mvc.perform(get(address).with(BIOLOGIST))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString();
        Matcher version = Pattern.compile("name=\"version\" value=\"(\\d+)\"").matcher(preview);
        assertThat(version.find()).isTrue();
        mvc.perform(post(address + "/commit")
                        .param("version", version.group(1))
                        .with(BIOLOGIST)
                        .with(csrf()))
                .andExpect(status().is3xxRedirection());
    }

    private static MockMultipartFile file(String table, String header, String... rows) {
        String text = header + "\n" + String.join("\n", rows) + "\n";
        return new MockMultipartFile("files", table + ".csv", "text/csv", text.getBytes(StandardCharsets.UTF_8));
    }

    private interface ToRow {
        String of(String[] cells);
    }

    private static String rows(String resource, ToRow toRow) throws IOException {
        try (InputStream in =
                Objects.requireNonNull(PublishedSeriesTest.class.getResourceAsStream("/reference/" + resource))) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8)
                    .lines()
                    .skip(1)
                    .map(line -> toRow.of(line.split(",")))
                    .collect(Collectors.joining("\n"));
        }
    }

    /** The sources count in thousand tonnes; decimal, so that nothing is lost. */
    private static String thousands(String text) {
        return new java.math.BigDecimal(text).movePointRight(3).toPlainString();
    }
}
