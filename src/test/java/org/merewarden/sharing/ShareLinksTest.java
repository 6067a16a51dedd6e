package org.merewarden.sharing;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.containsString;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.header;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.time.LocalDate;
import java.time.OffsetDateTime;
import java.util.UUID;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.advice.Limits;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.mock.web.MockHttpServletResponse;
import org.springframework.test.web.servlet.MockMvc;

@WholeApplication
class ShareLinksTest {
    @Autowired
    MockMvc mvc;

    @Autowired
    JdbcClient jdbc;

    @Autowired
    Limits limits;

    String id;
    String own;
    String other;
    long perch;

    @BeforeEach
    void region() {
        id = UUID.randomUUID().toString().substring(0, 8);
        own = "own-" + id;
        other = "other-" + id;
        TestRegion region = new TestRegion(jdbc);
        long lake = region.lake("share-" + id, "Share Water " + id);
        perch = region.stock(lake, "FPE");
        long ownId = region.cooperative(own, "Own " + id);
        long otherId = region.cooperative(other, "Other " + id);
        region.right(ownId, perch, 50);
        region.right(otherId, perch, 50);
        int season = limits.presentSeason();
        long limit = region.limit(perch, season, 50);
        jdbc.sql("insert into allocation (limit_id, cooperative_id, share_percent, amount_kg) values (?, ?, 50, 25000)")
                .params(limit, ownId)
                .update();
        landing(lake, ownId, season, "slip-own-" + id, 18_000);
        landing(lake, otherId, season, "slip-other-" + id, 7_770);
    }

    private void landing(long lake, long cooperative, int season, String slip, double kg) {
        jdbc.sql("insert into landing (entry_key, entry_kind, landed_on, season_year, slip, water_body_id, stock_id,"
                        + " species, cooperative_id, weight_kg, conversion_factor, live_weight_kg, recorded_at,"
                        + " recorded_by) values (?, 'landing', ?, ?, ?, ?, ?, 'FPE', ?, ?, 1, ?, ?, 'test')")
                .params(
                        slip,
                        LocalDate.of(season, 3, 3),
                        season,
                        slip,
                        lake,
                        perch,
                        cooperative,
                        kg,
                        kg,
                        OffsetDateTime.now())
                .update();
    }

    private String make() throws Exception {
        String page = mvc.perform(post("/shares")
                        .with(user("share-biologist").roles("BIOLOGIST"))
                        .with(csrf())
                        .param("cooperative", own)
                        .param("label", "meeting")
                        .param("days", "30"))
                .andExpect(status().isOk())
                .andReturn()
                .getResponse()
                .getContentAsString();
        Matcher link = Pattern.compile("http://[^<\"]*/view/([A-Za-z0-9_-]+)").matcher(page);
        assertThat(link.find()).isTrue();
        return link.group(1);
    }

    private MockHttpServletResponse open(String token) throws Exception {
        return mvc.perform(get("/view/" + token)).andReturn().getResponse();
    }

    @Test
    void aLinkShowsItsCooperativeItsOwnAndNothingOfTheOther() throws Exception {
        String token = make();
        assertThat(token).hasSize(43);
        String page = mvc.perform(get("/view/" + token))
                .andExpect(status().isOk())
                .andExpect(header().string("X-Robots-Tag", "noindex"))
                .andExpect(header().string("Cache-Control", "no-store"))
                .andExpect(header().string("Referrer-Policy", "no-referrer"))
                .andReturn()
                .getResponse()
                .getContentAsString();
        assertThat(page)
                .contains("18\u00a0t of your 25\u00a0t are recorded up to")
                .contains("About 7\u00a0t are left, possibly less")
                .contains("Closure may come earlier than the date shown")
                .contains("A limit is no entitlement")
                .contains("slip-own-" + id)
                .doesNotContain("slip-other-" + id)
                .doesNotContain("Other " + id)
                .doesNotContain("7.77")
                .doesNotContain("7,770")
                .doesNotContainIgnoringCase("margin")
                .doesNotContain("href=\"http");
    }

    @Test
    void aClosedStockIsCalledClosedAndNotUsedUp() throws Exception {
        int season = limits.presentSeason();
        new TestRegion(jdbc).closure(perch, season, OffsetDateTime.parse(season + "-06-05T14:00Z"));
        assertThat(open(make()).getContentAsString())
                .contains("The stock is closed from 5 Jun " + season + ", 14:00: nothing may be taken")
                .contains("18\u00a0t of your landings are recorded up to")
                .contains("All together 50\u00a0t could be removed this season until the stock was closed.")
                .contains("Closed from 5 Jun " + season + ", 14:00 for the whole water.")
                .doesNotContain(">0\u00a0t", " 0\u00a0t", "used up");
    }

    @Test
    void whatIsDecidedIsShownToTheKilogram() throws Exception {
        jdbc.sql("update catch_limit set amount = 52.346, set_aside_research_t = 2.346 where stock_id = ?")
                .param(perch)
                .update();
        jdbc.sql(
                        "update allocation set amount_kg = 25125 where limit_id in (select id from catch_limit where stock_id = ?)")
                .param(perch)
                .update();
        assertThat(open(make()).getContentAsString())
                .contains("18\u00a0t of your 25.125\u00a0t are recorded")
                .contains("52.346\u00a0t may be removed this season, of which 2.346\u00a0t are set aside")
                .contains("Limit for the whole water: 52.346\u00a0t.");
    }

    @Test
    void theStoreKnowsOnlyTheHashAndThePageShowsTheLinkOnce() throws Exception {
        String token = make();
        assertThat(jdbc.sql("select count(*) from share_link where token_hash = ?")
                        .param(ShareLinks.hash(token))
                        .query(Long.class)
                        .single())
                .isEqualTo(1);
        assertThat(mvc.perform(get("/shares").with(user("share-biologist").roles("BIOLOGIST")))
                        .andExpect(status().isOk())
                        .andReturn()
                        .getResponse()
                        .getContentAsString())
                .contains("Own " + id)
                .doesNotContain(token);
    }

    @Test
    void unknownExpiredAndRevokedLookTheSame() throws Exception {
        String expired = make();
        jdbc.sql("update share_link set expires_at = ? where token_hash = ?")
                .params(OffsetDateTime.now().minusSeconds(1), ShareLinks.hash(expired))
                .update();
        String revoked = make();
        assertThat(open(revoked).getStatus()).isEqualTo(200);
        long link = jdbc.sql("select id from share_link where token_hash = ? and last_used_at is not null")
                .param(ShareLinks.hash(revoked))
                .query(Long.class)
                .single();
        mvc.perform(post("/shares/" + link + "/revoke")
                        .with(user("share-admin").roles("ADMINISTRATOR"))
                        .with(csrf()))
                .andExpect(status().is3xxRedirection());

        MockHttpServletResponse unknown = open("A".repeat(43));
        assertThat(unknown.getStatus()).isEqualTo(404);
        for (String token : new String[] {expired, revoked}) {
            MockHttpServletResponse same = open(token);
            assertThat(same.getStatus()).isEqualTo(404);
            assertThat(same.getContentAsString()).isEqualTo(unknown.getContentAsString());
            assertThat(same.getHeaderNames()).isEqualTo(unknown.getHeaderNames());
        }
    }

    @Test
    void whenTheWholeLimitIsUsedUpTheViewSaysStop() throws Exception {
        jdbc.sql("update landing set live_weight_kg = 40000 where slip = ?")
                .param("slip-other-" + id)
                .update();
        assertThat(open(make()).getContentAsString())
                .contains("By the records the limit for the whole water is used up")
                .doesNotContain("About 7");
    }

    @Test
    void aNumberOfDaysThatIsNoneIsNamedInWords() throws Exception {
        for (String[] bad : new String[][] {
            {"a month", "is no whole number"},
            {"731", "open for 1 to 730 whole days"},
            {"", "open for 1 to 730 whole days"}
        }) {
            mvc.perform(post("/shares")
                            .with(user("share-biologist").roles("BIOLOGIST"))
                            .with(csrf())
                            .param("cooperative", own)
                            .param("days", bad[0]))
                    .andExpect(status().isUnprocessableContent())
                    .andExpect(content().string(containsString(bad[1])));
        }
    }

    @Test
    void aBadFormMakesNothing() throws Exception {
        mvc.perform(post("/shares")
                        .with(user("share-biologist").roles("BIOLOGIST"))
                        .with(csrf())
                        .param("cooperative", own)
                        .param("days", "731"))
                .andExpect(status().isUnprocessableContent());
        mvc.perform(post("/shares")
                        .with(user("share-clerk").roles("CLERK"))
                        .with(csrf())
                        .param("cooperative", own)
                        .param("days", "30"))
                .andExpect(status().isForbidden());
        assertThat(jdbc.sql("select count(*) from share_link s join cooperative c on c.id = s.cooperative_id"
                                + " where c.code = ?")
                        .param(own)
                        .query(Long.class)
                        .single())
                .isZero();
    }
}
