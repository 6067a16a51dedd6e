package org.merewarden;

import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.request.MockHttpServletRequestBuilder;

/** A limit with as much on its notice as an office may well write: eight cooperatives and long texts. */
public record HeavyNotice(MockMvc mvc, JdbcClient jdbc, String lake) {
    public static final String MEASURES =
            sentences("Gill nets of at least 32 mm knot to knot; bay closed in May.", 600);
    public static final String LEGAL = sentences("Inland Fisheries Ordinance of 1998, sections 12 to 17.", 500);
    public static final String OBJECTION = sentences("In writing to the office within four weeks of issue.", 300);
    public static final String REASON = sentences("Held low since the autumn nets caught few young fish.", 700);
    public static final String REMARK = sentences("Agreed after the hearing of the cooperatives in March.", 500);

    private static String sentences(String sentence, int characters) {
        return (sentence + " ")
                .repeat(characters / sentence.length() + 1)
                .substring(0, characters)
                .strip();
    }

    /** A lake with one stock, which eight cooperatives fish. */
    public HeavyNotice register() {
        TestRegion region = new TestRegion(jdbc);
        long stock = region.stock(region.lake(lake, "Broad Water of the Upper Valley"), "FPE");
        for (int i = 1; i <= 8; i++) {
            long cooperative =
                    region.cooperative(lake + "-coop-" + i, "Net Fishers’ Cooperative of the Landing Place " + i);
            region.right(cooperative, stock, 12.5);
        }
        return this;
    }

    /** The request that proposes 123 t for a season. */
    public MockHttpServletRequestBuilder proposal(int season) {
        return post("/stocks/" + lake + "/FPE/limits")
                .param("season", Integer.toString(season))
                .param("kind", "catch")
                .param("key", java.util.UUID.randomUUID().toString())
                .param("amount", "123")
                .param("subsistence", "3.25")
                .param("angling", "4.5")
                .param("research", "0.75")
                .param("other", "6.5")
                .param("reportedFraction", "0.8")
                .param("validFrom", season + "-02-01")
                .param("validTo", season + "-11-30")
                .param("measures", MEASURES)
                .param("legalBasis", LEGAL)
                .param("objection", OBJECTION)
                .param("reason", REASON)
                .with(user("ines").roles("BIOLOGIST"))
                .with(csrf());
    }

    /** Proposes a limit. Returns the notice's number. */
    public long propose(MockHttpServletRequestBuilder proposal) throws Exception {
        mvc.perform(proposal).andExpect(status().is3xxRedirection());
        return jdbc.sql("select max(l.id) from catch_limit l join stock s on s.id = l.stock_id"
                        + " join water_body w on w.id = s.water_body_id where w.code = ?")
                .param(lake)
                .query(Long.class)
                .single();
    }

    /** @param act issue, refuse or withdraw */
    public void decide(long notice, String act, String words) throws Exception {
        mvc.perform(post("/limits/" + notice + "/" + act)
                        .param("reason", words)
                        .with(user("tobias").roles("APPROVER"))
                        .with(csrf()))
                .andExpect(status().is3xxRedirection());
    }
}
