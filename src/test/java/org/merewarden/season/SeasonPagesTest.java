package org.merewarden.season;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.containsString;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.time.format.DateTimeFormatter;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.merewarden.intake.Fate;
import org.merewarden.intake.Provenance;
import org.merewarden.intake.TableRow;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.request.MockHttpServletRequestBuilder;

@WholeApplication
class SeasonPagesTest {
    @Autowired
    MockMvc mvc;

    @Autowired
    LandingsTable table;

    @Autowired
    Seasons seasons;

    @Autowired
    JdbcClient jdbc;

    LogFixture at;
    LocalDate today;
    int season;

    @BeforeEach
    void region() {
        LogFixture.account(jdbc, "page-biologist", "BIOLOGIST");
        today = seasons.today();
        season = seasons.current();
        at = new LogFixture(jdbc, season, 3.0);
    }

    private String page(String address) throws Exception {
        return mvc.perform(get(address).with(user("page-biologist").roles("BIOLOGIST")))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString();
    }

    private MockHttpServletRequestBuilder slip(String key, String weight) {
        return post("/landings")
                .with(user("page-biologist").roles("BIOLOGIST"))
                .with(csrf())
                .param("key", key)
                .param("date", today.toString())
                .param("lake", at.lake)
                .param("cooperative", at.first)
                .param("gear", "gill net")
                .param("lines[0].species", "FPE")
                .param("lines[0].weight", weight)
                .param("lines[1].species", "")
                .param("lines[1].weight", "");
    }

    @Test
    void aSlipIsStoredAndItsReplySaysWhatIsLeft() throws Exception {
        String key = LogFixture.key();
        String next = mvc.perform(slip(key, "500,5"))
                .andExpect(status().is3xxRedirection())
                .andReturn()
                .getResponse()
                .getRedirectedUrl();
        // 2,000 kg to be logged, 1,499.5 left: three digits
        assertThat(page(next))
                .contains("500.5\u00a0kg")
                .contains("1.5\u00a0t are left of 2\u00a0t")
                .contains("Undo")
                .contains("value=\"" + at.first + "\" selected");
        mvc.perform(slip(key, "500,5")).andExpect(status().is3xxRedirection());
        assertThat(at.rows()).hasSize(1);
        mvc.perform(slip(key, "600"))
                .andExpect(status().isConflict())
                .andExpect(content().string(containsString("500.5")))
                .andExpect(content().string(containsString("600.0 kg")));

        mvc.perform(post("/landings/undo")
                        .with(user("page-biologist").roles("BIOLOGIST"))
                        .with(csrf())
                        .param("key", key))
                .andExpect(status().is3xxRedirection());
        assertThat(page(next)).contains("withdrawn").doesNotContain("Undo: withdraw");
    }

    @Test
    void aBadLineStoresNothingAndTiesTheErrorToItsField() throws Exception {
        mvc.perform(slip(LogFixture.key(), "12.5")
                        .param("lines[2].species", "FPE")
                        .param("lines[2].weight", "a lot"))
                .andExpect(status().isUnprocessableContent())
                .andExpect(content().string(containsString("id=\"lines[2].weight-error\"")))
                .andExpect(content().string(containsString("aria-describedby=\"lines[2].weight-error\"")))
                .andExpect(content().string(containsString("“a lot” is not understood")));
        assertThat(at.rows()).isEmpty();
    }

    @Test
    void whatNoPageOffersIsTheSendersFault() throws Exception {
        for (String line : List.of("-1", "300", "99999999999", "x")) {
            mvc.perform(slip(LogFixture.key(), "12.5").param("lines[" + line + "].weight", "3"))
                    .andExpect(status().isBadRequest());
        }
        mvc.perform(slip(LogFixture.key(), "12.5")
                        .param("lines[2].otherSpecies", "FPE." + "x".repeat(41))
                        .param("lines[2].weight", "3"))
                .andExpect(status().isUnprocessableContent())
                .andExpect(content().string(containsString("At most 44 characters")));
        assertThat(at.rows()).isEmpty();
    }

    @Test
    void pagesShowUptakeLogHistoryAndExport() throws Exception {
        mvc.perform(slip(LogFixture.key(), "2500")).andExpect(status().is3xxRedirection());
        long id = jdbc.sql("select max(id) from landing").query(Long.class).single();
        mvc.perform(post("/landings/" + id + "/correct")
                        .with(user("page-biologist").roles("BIOLOGIST"))
                        .with(csrf())
                        .param("key", LogFixture.key())
                        .param("date", today.toString())
                        .param("lake", at.lake)
                        .param("cooperative", at.first)
                        .param("lines[0].species", "FPE")
                        .param("lines[0].weight", "2400")
                        .param("reason", "scale read wrong"))
                .andExpect(status().is3xxRedirection());

        assertThat(page("/season/" + season))
                .contains("Log Water")
                .contains("over by 0.4\u00a0t")
                .contains("over by 1.2\u00a0t");
        assertThat(page("/season/" + season + "/stocks/" + at.lake + "/FPE"))
                .contains("2.4\u00a0t are logged, more than the 2\u00a0t")
                .contains("<svg class=\"cumulative\"");
        assertThat(page("/season/" + season + "/landings?lake=" + at.lake))
                .contains("One landing counts here: 2,400\u00a0kg")
                .contains("scale read wrong")
                .contains("over the limit");
        assertThat(page("/season/" + season + "/landings.csv?lake=" + at.lake))
                .contains("key,date,slip,water_body,species,population")
                .contains(",2400.0,")
                .doesNotContain(",2500.0,");
        assertThat(page("/landings/" + id + "/correct")).contains("corrected or withdrawn already");
    }

    /** Of 2 t that could be logged 1.5 t were, then the stock was closed: nobody ran over anything. */
    @Test
    void aClosedStockIsCalledClosedAndNotOver() throws Exception {
        String lede = page("/season/" + season);
        String next = mvc.perform(slip(LogFixture.key(), "1500"))
                .andReturn()
                .getResponse()
                .getRedirectedUrl();
        new org.merewarden.TestRegion(jdbc)
                .closure(at.perch, season, OffsetDateTime.parse(today.minusDays(1) + "T14:00Z"));
        String day = today.minusDays(1).format(DateTimeFormatter.ofPattern("d MMM yyyy", Locale.UK));
        String closed = "closed from " + day + ", 14:00";
        assertThat(page(next)).contains(at.lake.replace("log-", "Log Water ") + ": " + closed + ".");
        String row = row(page("/season/" + season));
        assertThat(row)
                .contains(
                        ">3\u00a0t<", ">1\u00a0t<", ">2\u00a0t<", ">1.5\u00a0t<", "75%", ">" + closed + "<", ">closed<")
                .doesNotContain("over by", "used up", "∞");
        assertThat(page("/season/" + season)).contains("closed early; ");
        assertThat(allowed(page("/season/" + season))).isEqualTo(allowed(lede));
        assertThat(page("/season/" + season + "/stocks/" + at.lake + "/FPE"))
                .contains(
                        "1.5\u00a0t are logged of the 2\u00a0t that could be logged until the stock was closed; it is "
                                + closed + ".");
    }

    /** 13.345 t, 1 t of it set aside, the rest split 60 : 40. */
    @Test
    void whatIsDecidedIsShownToTheKilogram() throws Exception {
        at = new LogFixture(jdbc, season, 13.345);
        assertThat(row(page("/season/" + season))).contains(">13.345\u00a0t<", ">1\u00a0t<", ">12.345\u00a0t<");
        assertThat(page("/season/" + season)).contains(">7.407\u00a0t<", ">4.938\u00a0t<");
        String reply = mvc.perform(slip(LogFixture.key(), "345"))
                .andReturn()
                .getResponse()
                .getRedirectedUrl();
        assertThat(page(reply)).contains("12\u00a0t are left of 12.345\u00a0t");
        assertThat(page("/season/" + season + "/stocks/" + at.lake + "/FPE"))
                .contains("0.345\u00a0t are logged of 12.345\u00a0t; 12\u00a0t are left");
    }

    private String row(String page) {
        int at = page.indexOf("/stocks/" + this.at.lake + "/FPE");
        return page.substring(at, page.indexOf("</tr>", at));
    }

    private static String allowed(String page) {
        var found = java.util.regex.Pattern.compile("are logged of the ([0-9.,]+)\u00a0t to be logged")
                .matcher(page);
        assertThat(found.find()).isTrue();
        return found.group(1);
    }

    @Test
    void whoeverIsNobodyReadsNothing() throws Exception {
        mvc.perform(get("/season/" + season)).andExpect(status().is3xxRedirection());
        mvc.perform(slip(LogFixture.key(), "1").with(user("page-admin").roles("ADMINISTRATOR")))
                .andExpect(status().isForbidden());
        assertThat(at.rows()).isEmpty();
    }

    private TableRow row(int line, String key, Object... more) {
        Map<String, Object> values = new HashMap<>(
                Map.of("key", key, "date", today, "water_body", at.lake, "species", "FPE", "weight_kg", 12.5));
        for (int i = 0; i < more.length; i += 2) {
            values.put((String) more[i], more[i + 1]);
        }
        return new TableRow(line, values);
    }

    @Test
    void aTableIsNewThenTheSameAndAKeyForSomethingElseIsRefused() {
        String key = "sender-" + at.lake;
        List<TableRow> rows = List.of(row(2, key), row(3, key + "b", "cooperative", at.second, "weight_kg", 2500.0));
        assertThat(table.examine(rows, (name, keys) -> false))
                .extracting(Fate::kind)
                .containsOnly(Fate.Kind.NEW);
        jdbc.sql(
                        "insert into import_batch (state, uploaded_at, uploaded_by) values ('COMMITTED', current_timestamp, 't')")
                .update();
        long batch =
                jdbc.sql("select max(id) from import_batch").query(Long.class).single();
        table.store(rows, new Provenance(batch, "sender", java.time.Instant.now()));

        assertThat(table.examine(rows, (name, keys) -> false))
                .extracting(Fate::kind)
                .containsOnly(Fate.Kind.SAME);
        Fate other = table.examine(List.of(row(2, key, "weight_kg", 13.0)), (name, keys) -> false)
                .get(0);
        assertThat(other.kind()).isEqualTo(Fate.Kind.REFUSED);
        assertThat(other.problems().get(0).rule()).contains("12.5 kg").contains("correction is a new entry");
        assertThat(jdbc.sql("select flags from landing where entry_key = ?")
                        .param(key + "b")
                        .query(String.class)
                        .single())
                .isEqualTo("over limit");
    }

    @Test
    void aTableNamesTheUnknown() {
        List<Fate> fates = table.examine(
                List.of(
                        row(2, "u1", "water_body", "nowhere"),
                        row(3, "u2", "species", "XXQ"),
                        row(4, "u3", "cooperative", "nobody"),
                        row(5, "u4", "presentation", "minced"),
                        row(6, "u5", "date", today.plusDays(1)),
                        row(7, "~u6"),
                        row(8, "u7", "water_body", "coming")),
                (name, keys) -> name.equals("water-bodies") && keys[0].equals("coming"));
        assertThat(fates.stream().limit(6).map(f -> f.problems().get(0).column()))
                .containsExactly("water_body", "species", "cooperative", "presentation", "date", "key");
        assertThat(fates.get(6).kind()).isEqualTo(Fate.Kind.NEW);
    }

    @Test
    void aFactorOfTheSameImportCountsFromItsDay() {
        org.merewarden.intake.Batch batch = new org.merewarden.intake.Batch() {
            @Override
            public boolean brings(String name, String... keys) {
                return false;
            }

            @Override
            public List<TableRow> rows(String name) {
                return List.of(new TableRow(
                        2, Map.of("species", "FPE", "presentation", "coming", "valid_from", today, "factor", 1.2)));
            }
        };
        List<Fate> fates = table.examine(
                List.of(
                        row(2, "c1", "presentation", "coming"),
                        row(3, "c2", "presentation", "coming", "date", today.minusDays(1)),
                        // factors are found by their exact name when the row is stored
                        row(4, "c3", "presentation", "Coming")),
                batch);
        assertThat(fates).extracting(Fate::kind).containsExactly(Fate.Kind.NEW, Fate.Kind.REFUSED, Fate.Kind.REFUSED);
    }

    @Test
    void theColumnsAreThoseOfTheFormat() {
        assertThat(table.definition().columns().stream().map(org.merewarden.intake.Column::name))
                .containsExactly(
                        "key",
                        "date",
                        "slip",
                        "water_body",
                        "species",
                        "population",
                        "cooperative",
                        "sector",
                        "gear",
                        "nets",
                        "nights",
                        "weight_kg",
                        "presentation",
                        "number",
                        "fate",
                        "place",
                        "note");
    }
}
