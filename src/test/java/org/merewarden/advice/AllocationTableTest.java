package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.merewarden.advice.LimitDesk.APPROVER;
import static org.merewarden.advice.LimitDesk.BIOLOGIST;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

/** 8.5 t to be logged, to two cooperatives with 60 and 40 %. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class AllocationTableTest {
    private static final String STOCK = "/stocks/all-lake/FPE";

    @Autowired
    private LimitDesk desk;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private Limits limits;

    private long lake;
    private long stock;
    private long north;
    private long south;

    @BeforeAll
    void register() {
        var region = new TestRegion(jdbc);
        lake = region.lake("all-lake", "Allocated Lake");
        stock = region.stock(lake, "FPE");
        north = region.cooperative("all-north", "Allocated North");
        south = region.cooperative("all-south", "Allocated South");
        region.right(north, stock, 60);
        region.right(south, stock, 40);
        desk.recommendNothing();
    }

    @AfterAll
    void restore() {
        desk.restore();
    }

    private Map<String, String> byHand(int season, String northKg, String southKg) {
        Map<String, String> fields = desk.fields(season);
        fields.put("hand[" + north + "]", northKg);
        fields.put("hand[" + south + "]", southKg);
        return fields;
    }

    private List<Long> inForce(int season) {
        return limits.allocations(season).stream().map(AllocationView::amountKg).toList();
    }

    @Test
    void handAmountsAreKeptAsTheyWereProposed() throws Exception {
        long id = desk.propose(STOCK, byHand(2141, "8499", "1"), BIOLOGIST);
        assertThat(inForce(2141)).isEmpty();
        desk.act(id, "issue", "Agreed.", APPROVER);
        assertThat(inForce(2141)).containsExactly(8499L, 1L);
    }

    @Test
    void withoutHandAmountsTheRightsAllocateToTheKilogram() throws Exception {
        long id = desk.propose(STOCK, byHand(2142, "", ""), BIOLOGIST);
        desk.act(id, "issue", "Agreed.", APPROVER);
        // 60 and 40 % of 8,500 kg
        assertThat(inForce(2142)).containsExactly(5100L, 3400L);
    }

    @Test
    void badHandAmountsAreNamedAtTheirFields() throws Exception {
        for (String[] bad : new String[][] {
            {"8500", "1", "The allocations add up to 8,501 kg; the amount to be logged is 8,500 kg."},
            {"100.5", "1", "Allocated North: 100.5 is no whole number of kilograms from 0 up."},
            {"-1", "1", "Allocated North: -1 is no whole number of kilograms from 0 up."},
            {"100", "", "Allocated South: enter kilograms for each cooperative, 0 where it gets nothing."},
            {"much", "1", "is no number such as 1250"}
        }) {
            var answer = desk.send(STOCK + "/limits", byHand(2143, bad[0], bad[1]), BIOLOGIST)
                    .andExpect(status().is(422));
            assertThat(LimitDesk.body(answer)).contains(bad[2]);
        }
        Map<String, String> foreign = byHand(2143, "1", "1");
        foreign.put("hand[999999]", "1");
        assertThat(LimitDesk.body(
                        desk.send(STOCK + "/limits", foreign, BIOLOGIST).andExpect(status().is(422))))
                .contains("Cooperative 999999 has no right to this stock.");
        Map<String, String> unreadable = desk.fields(2143);
        unreadable.put("hand[north]", "1");
        desk.send(STOCK + "/limits", unreadable, BIOLOGIST).andExpect(status().is(422));
        assertThat(jdbc.sql("select count(*) from catch_limit where season_year = 2143")
                        .query(Integer.class)
                        .single())
                .isZero();
    }

    @Test
    void aProposalShowsWhatIsLoggedAndWhoIsOverdrawn() throws Exception {
        landing(north, 2144, 5200);
        landing(south, 2144, 3400);
        landing(south, 2145, 9999);
        desk.propose(STOCK, desk.fields(2144), BIOLOGIST);
        String page = desk.page(STOCK + "/advice", BIOLOGIST);
        String rows = page.substring(page.indexOf("for season 2144")).replaceAll("\\s+", " ");
        rows = rows.substring(0, rows.indexOf("</table>"));
        assertThat(rows)
                .contains("<td class=\"number\">5,100 kg</td> <td class=\"number\"><span>5,200 kg</span>"
                        + " <strong>overdrawn by 100 kg</strong>")
                .contains("<td class=\"number\">3,400 kg</td> <td class=\"number\"><span>3,400 kg</span> </td>");
    }

    private void landing(long cooperative, int season, double kilograms) {
        jdbc.sql("""
                        insert into landing (entry_key, entry_kind, landed_on, season_year, water_body_id, stock_id,
                            species, cooperative_id, weight_kg, conversion_factor, live_weight_kg, recorded_at,
                            recorded_by)
                        values (?, 'landing', ?, ?, ?, ?, 'FPE', ?, ?, 1, ?, ?, 'test')""")
                .params(
                        "all-" + cooperative + "-" + season,
                        LocalDate.of(season, 5, 1),
                        season,
                        lake,
                        stock,
                        cooperative,
                        kilograms,
                        kilograms,
                        OffsetDateTime.now(ZoneOffset.UTC))
                .update();
    }

    @Test
    void measuresAloneAreNotJudged() throws Exception {
        Map<String, String> fields = desk.fields(2146);
        fields.put("kind", "measures only");
        fields.put("measures", "Nothing under 20 cm.");
        long id = desk.propose(STOCK, fields, BIOLOGIST);
        String page = desk.page(STOCK + "/advice", BIOLOGIST);
        assertThat(page.substring(page.indexOf("Notice " + id)))
                .contains("The model has no ages and sizes and cannot judge these measures.");
    }
}
