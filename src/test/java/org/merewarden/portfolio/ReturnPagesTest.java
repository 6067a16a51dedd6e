package org.merewarden.portfolio;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.io.ByteArrayInputStream;
import java.io.StringReader;
import java.math.BigDecimal;
import java.nio.charset.StandardCharsets;
import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.util.List;
import java.util.Map;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVRecord;
import org.dhatim.fastexcel.reader.ReadableWorkbook;
import org.dhatim.fastexcel.reader.Row;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.StatementCount;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;

/** Other tests' stocks stand in the same store; this one's districts, seasons 1901 and 2199 and the grayling are its own. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class ReturnPagesTest {
    private static final String WEST = "=West Return";
    private static final int OVER = 1901;
    private static final int RUNNING = 2199;
    private static final int CLOSED = 1903;

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    private TestRegion region;
    private long eastGrayling;
    private long westGrayling;

    @BeforeAll
    void twoDistricts() {
        region = new TestRegion(jdbc);
        eastGrayling = region.stock(lake("ret-east", "East Return"), "TLV");
        long west = lake("ret-west", WEST);
        westGrayling = region.stock(west, "TLV");
        record(eastGrayling, "commercial", 10.0, 0.8, true, false);
        record(eastGrayling, "angling", 2.0, null, true, false);
        record(westGrayling, "commercial", 4.0, 0.5, true, false);
        record(westGrayling, "commercial", 999.0, 1.0, null, false);
        record(westGrayling, "subsistence", 888.0, 1.0, true, true);
        long limit = region.limit(eastGrayling, OVER, 12);
        jdbc.sql("update catch_limit set set_aside_angling_t = 2, reported_fraction = 0.8 where id = ?")
                .param(limit)
                .update();
        // of a stock and sector with a catch on record the log is not added once more
        landing("a", OVER, eastGrayling, "commercial", 700, "kept");
        landing("b", OVER, westGrayling, "research", 250, "discarded");
        landing("c", RUNNING, eastGrayling, "commercial", 1500, "kept");
        landing("d", RUNNING, eastGrayling, "commercial", 40, "released");
        landing("e", RUNNING, eastGrayling, "angling", 60, "seized");
        landing("f", RUNNING, null, "commercial", 33, "kept");
        region.limit(westGrayling, RUNNING, 5);
        region.limit(eastGrayling, CLOSED, 9.125);
        region.closure(eastGrayling, CLOSED, OffsetDateTime.parse("1903-06-05T14:00Z"));
        region.limit(westGrayling, CLOSED, 3);
    }

    private long lake(String code, String district) {
        long lake = region.lake(code, code);
        jdbc.sql("update water_body set district = ? where id = ?")
                .params(district, lake)
                .update();
        return lake;
    }

    private void record(
            long stock, String sector, double tonnes, Double reported, Boolean current, boolean provisional) {
        jdbc.sql("insert into catch_record (stock_id, season_year, sector, catch_t, reported_fraction, provisional,"
                        + " recorded_at, recorded_by, current_mark) values (:stock, :season, :sector, :t, :reported,"
                        + " :provisional, :at, 'test', :current)")
                .param("stock", stock)
                .param("season", OVER)
                .param("sector", sector)
                .param("t", tonnes)
                .param("reported", reported, java.sql.Types.DOUBLE)
                .param("provisional", provisional)
                .param("at", OffsetDateTime.parse("2026-01-01T00:00Z"))
                .param("current", current, java.sql.Types.BOOLEAN)
                .update();
    }

    private void landing(String key, int season, Long stock, String sector, double kilograms, String fate) {
        jdbc.sql("insert into landing (entry_key, entry_kind, landed_on, season_year, water_body_id, stock_id, species,"
                        + " sector, weight_kg, conversion_factor, live_weight_kg, fate, recorded_at, recorded_by) values"
                        + " (:key, 'landing', :on, :season, (select id from water_body where code = 'ret-east'), :stock,"
                        + " :species, :sector, :kg, 1, :kg, :fate, :at, 'test')")
                .param("key", "return-" + key)
                .param("on", LocalDate.of(season, 6, 1))
                .param("season", season)
                .param("stock", stock, java.sql.Types.BIGINT)
                .param("species", stock == null ? "mixed" : "TLV")
                .param("sector", sector)
                .param("kg", kilograms)
                .param("fate", fate)
                .param("at", OffsetDateTime.parse("2026-01-01T00:00Z"))
                .update();
    }

    private byte[] answer(String address) throws Exception {
        return mvc.perform(get(address).with(user("b").roles("BIOLOGIST")))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsByteArray();
    }

    private String page(String address) throws Exception {
        return new String(answer(address), StandardCharsets.UTF_8).replace('\u00a0', ' ');
    }

    /** The rows below the caution and the header, by the header's names. */
    private List<Map<String, String>> csv(int season) throws Exception {
        String file = page("/returns/" + season + ".csv");
        assertThat(file)
                .startsWith("\ufeff\"Preliminary and confidential; model estimates and records as of "
                        + LocalDate.now(java.time.ZoneOffset.UTC));
        String table = file.substring(file.indexOf('\n') + 1);
        return CSVFormat.RFC4180
                .builder()
                .setHeader()
                .setSkipHeaderRecord(true)
                .get()
                .parse(new StringReader(table))
                .stream()
                .map(CSVRecord::toMap)
                .toList();
    }

    private static Map<String, String> row(List<Map<String, String>> rows, String... values) {
        List<Map<String, String>> fitting = rows.stream()
                .filter(r -> r.values().containsAll(List.of(values)))
                .toList();
        assertThat(fitting).as("rows with " + List.of(values)).hasSize(1);
        return fitting.get(0);
    }

    private static final String RECORDED = "removals as recorded, t";
    private static final String CORRECTED = "removals corrected for the reported fraction, t";

    @Test
    void aSeasonThatIsOverShowsWhatIsRecordedAndTheRestOfTheLog() throws Exception {
        List<Map<String, String>> rows = csv(OVER);
        assertThat(row(rows, "removals", "East Return", "commercial", "recorded"))
                .containsEntry(RECORDED, "10.0")
                .containsEntry(CORRECTED, "12.5")
                .containsEntry("species", "grayling");
        assertThat(row(rows, "removals", "East Return", "angling", "recorded")).containsEntry(CORRECTED, "2.0");
        assertThat(row(rows, "removals", "'" + WEST, "commercial", "recorded"))
                .containsEntry(RECORDED, "4.0")
                .containsEntry(CORRECTED, "8.0");
        assertThat(row(rows, "removals", "'" + WEST, "research", "logged so far, preliminary"))
                .containsEntry(RECORDED, "0.25")
                .containsEntry(CORRECTED, "");
        assertThat(rows.stream().filter(r -> r.get("part").equals("removals"))).hasSize(4);
        // 12 t − 2 t, of which 80 % will be logged
        assertThat(row(rows, "limits", "East Return"))
                .containsEntry("limits", "1")
                .containsEntry("stocks without a limit", "0")
                .containsEntry("total removals allowed, t", "12.0")
                .containsEntry("set-asides, t", "2.0")
                .containsEntry("amount to be logged, t", "8.0");
        assertThat(row(rows, "limits", "'" + WEST))
                .containsEntry("limits", "0")
                .containsEntry("stocks without a limit", "1")
                .containsEntry("total removals allowed, t", "");
        assertThat(row(rows, "total of a district", "East Return"))
                .containsEntry(RECORDED, "12.0")
                .containsEntry(CORRECTED, "14.5");
        assertThat(row(rows, "total of a species", "grayling"))
                .containsEntry(RECORDED, "16.25")
                .containsEntry(CORRECTED, "")
                .containsEntry("limits", "1")
                .containsEntry("stocks", "2");
    }

    /** The closure’s 0 t is not what was allowed: 9.125 t + 3 t. */
    @Test
    void aStockClosedEarlyCountsWithTheLimitThatHeldUntilThen() throws Exception {
        List<Map<String, String>> rows = csv(CLOSED);
        String remark = "closed on (the limit is the one until then)";
        assertThat(row(rows, "limits", "East Return"))
                .containsEntry("total removals allowed, t", "9.125")
                .containsEntry("amount to be logged, t", "9.125")
                .containsEntry(remark, "1903-06-05");
        assertThat(row(rows, "limits", "'" + WEST))
                .containsEntry("total removals allowed, t", "3.0")
                .containsEntry(remark, "");
        assertThat(row(rows, "total")).containsEntry("total removals allowed, t", "12.125");
        assertThat(page("/returns/" + CLOSED))
                .contains("2 limits are in force, of 12.125 t of total removals")
                .contains("One stock was closed early; it counts with the limit that held until then.")
                .contains(">closed on 5 Jun 1903<", ">1 of 2 stocks closed on 5 Jun 1903<");
    }

    @Test
    void sumsAreThoseOfTheStore() throws Exception {
        for (int season : new int[] {OVER, 2015, 2020}) {
            double recorded = jdbc.sql("select coalesce(sum(catch_t), 0) from catch_record where season_year = ?"
                            + " and current_mark and not provisional")
                    .param(season)
                    .query(Double.class)
                    .single();
            List<Map<String, String>> rows = csv(season);
            assertThat(sum(rows, "removals", r -> r.get("basis").equals("recorded")))
                    .as("recorded in " + season)
                    .isCloseTo(recorded, within(1e-9 * Math.max(1, recorded)));
            double all = sum(rows, "removals", r -> true);
            for (String part : List.of("total of a species", "total of a district", "total")) {
                assertThat(sum(rows, part, r -> true)).as(part).isCloseTo(all, within(1e-9 * Math.max(1, all)));
            }
            assertThat(row(rows, "total"))
                    .containsEntry("stocks", count("select count(*) from stock"))
                    .containsEntry(
                            "limits", count("select count(*) from limit_in_force where season_year = " + season));
        }
    }

    private static double sum(
            List<Map<String, String>> rows, String part, java.util.function.Predicate<Map<String, String>> which) {
        return rows.stream()
                .filter(r -> r.get("part").equals(part))
                .filter(which)
                .mapToDouble(r -> Double.parseDouble(r.get(RECORDED)))
                .sum();
    }

    private String count(String sql) {
        return jdbc.sql(sql).query(Integer.class).single().toString();
    }

    @Test
    void aSeasonInProgressShowsTheLog() throws Exception {
        List<Map<String, String>> rows = csv(RUNNING);
        assertThat(row(rows, "removals", "commercial", "logged so far, preliminary"))
                .containsEntry(RECORDED, "1.5");
        assertThat(row(rows, "removals", "angling", "logged so far, preliminary"))
                .containsEntry(RECORDED, "0.06");
        assertThat(rows.stream().filter(r -> r.get("part").equals("removals"))).hasSize(2);
        assertThat(page("/returns/" + RUNNING))
                .contains("This season is not over.", "1.56 t of removals are on record or logged so far")
                .contains("up to the last landing of 1 Jun 2199")
                .contains("One limit is in force, of 5 t of total removals")
                .contains("Another 0.033 t are logged but not of any stock here");
    }

    @Test
    void theWorkbookHoldsTheSameNumbers() throws Exception {
        try (ReadableWorkbook book =
                new ReadableWorkbook(new ByteArrayInputStream(answer("/returns/" + OVER + ".xlsx")))) {
            List<Row> rows = book.getFirstSheet().read();
            assertThat(rows.get(0).getCellText(0)).startsWith("Preliminary and confidential");
            Row east = rows.stream()
                    .filter(r -> r.getCellText(2).equals("East Return")
                            && r.getCellText(4).equals("commercial"))
                    .findFirst()
                    .orElseThrow();
            assertThat(east.getCellAsNumber(7)).contains(new BigDecimal("12.5"));
            assertThat(rows).anyMatch(r -> r.getCellText(2).equals("'" + WEST));
        }
    }

    @Test
    void anEmptySeasonIsASentence() throws Exception {
        assertThat(page("/returns/1850"))
                .contains("Nothing is recorded or logged for season 1850, and no limit is in force.")
                .doesNotContain("<table", ".csv");
    }

    @Test
    void isOneClickFromThePortfolioAndTheSeason() throws Exception {
        assertThat(page("/portfolio?season=" + OVER)).contains("href=\"/returns/" + OVER + "\"");
        assertThat(page("/season/" + OVER)).contains("href=\"/returns/" + OVER + "\"");
        mvc.perform(get("/returns/19012").with(user("b").roles("BIOLOGIST"))).andExpect(status().isNotFound());
    }

    @Test
    void moreStocksCostNoMoreStatements() throws Exception {
        page("/returns/1902");
        int before = StatementCount.during(() -> page("/returns/1902"));
        for (int i = 0; i < 4; i++) {
            long stock = region.stock(lake("ret-more-" + i, "More " + i), "FRO");
            region.catches(stock, 1902, List.of(1.0));
            region.limit(stock, 1902, 2);
        }
        assertThat(StatementCount.during(() -> page("/returns/1902"))).isEqualTo(before);
        assertThat(page("/returns/1902")).contains("4 t of removals are on record");
    }
}
