package org.merewarden.activity;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.allOf;
import static org.hamcrest.Matchers.containsString;
import static org.hamcrest.Matchers.not;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.time.OffsetDateTime;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;

@WholeApplication
class ActivityPageTest {
    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Test
    void showsBeforeAndAfterAndEscapesThem() throws Exception {
        entry("act.one", "2020-03-01T10:00:00Z", "changed thing", "<b>12 t</b>", "no");
        shown("/activity?person=act.one")
                .andExpect(content()
                        .string(allOf(
                                containsString("changed thing"),
                                containsString("&lt;b&gt;12 t&lt;/b&gt;"),
                                containsString("<small>after:</small> no"),
                                containsString("One entry is on record"))));
    }

    @Test
    void filtersByTextTakenLiterally() throws Exception {
        entry("act.text", "2020-03-02T10:00:00Z", "first", "share 50% of it", null);
        entry("act.text", "2020-03-02T11:00:00Z", "second", "share 501 of it", null);
        shown("/activity?person=act.text&text=SHARE 50%")
                .andExpect(
                        content().string(allOf(containsString("share 50% of it"), not(containsString("share 501")))));
    }

    @Test
    void aDayBeyondAllCalendarsIsSaidToBeUnreadable() throws Exception {
        shown("/activity?to=+999999999-12-31")
                .andExpect(content().string(containsString("A date or page in the address cannot be read")));
        shown("/activity?from=-999999999-01-01")
                .andExpect(content().string(containsString("A date or page in the address cannot be read")));
    }

    @Test
    void filtersByDaysOfTheOffice() throws Exception {
        entry("act.day", "2020-03-03T00:00:00Z", "did at midnight", null, null);
        entry("act.day", "2020-03-03T23:59:59Z", "did at the end", null, null);
        entry("act.day", "2020-03-04T00:00:00Z", "did the day after", null, null);
        shown("/activity?person=act.day&from=2020-03-03&to=2020-03-03")
                .andExpect(content()
                        .string(allOf(
                                containsString("did at midnight"),
                                containsString("did at the end"),
                                not(containsString("did the day after")))));
    }

    @Test
    void newestFirstInPagesWhoseAddressKeepsTheFilter() throws Exception {
        for (int i = 0; i < 51; i++) {
            entry("act.many", "2020-04-01T10:%02d:00Z".formatted(i), "act " + i + ".", null, "a&b");
        }
        String first = shown("/activity?person=act.many&text=a%26b")
                .andReturn()
                .getResponse()
                .getContentAsString();
        assertThat(first).contains("act 50.", "act 1.").doesNotContain("act 0.");
        assertThat(first.indexOf("act 50.")).isLessThan(first.indexOf("act 49."));
        assertThat(first).contains("href=\"/activity?person=act.many&amp;text=a%26b&amp;page=2\"");
        shown("/activity?person=act.many&text=a%26b&page=2")
                .andExpect(content().string(allOf(containsString("act 0."), not(containsString("act 1.")))));
    }

    @Test
    void aDateThatIsNoneIsSaid() throws Exception {
        shown("/activity?from=yesterday").andExpect(content().string(containsString("cannot be read")));
    }

    private ResultActions shown(String address) throws Exception {
        return mvc.perform(get(java.net.URI.create(address.replace(" ", "%20").replaceAll("%$", "%25")))
                        .with(user("reader").roles("BIOLOGIST")))
                .andExpect(status().isOk());
    }

    private void entry(String actor, String at, String action, String before, String after) {
        jdbc.sql("insert into activity_entry (happened_at, actor, action, subject, before_text, after_text)"
                        + " values (:at, :actor, :action, 'a thing', :before, :after)")
                .param("at", OffsetDateTime.parse(at))
                .param("actor", actor)
                .param("action", action)
                .param("before", before)
                .param("after", after)
                .update();
    }
}
