package org.merewarden.account;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.containsString;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.util.Map;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.merewarden.web.OfficeSettings;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;

@WholeApplication
class SettingsPageTest {
    @Autowired
    private MockMvc mvc;

    @Autowired
    private OfficeSettings settings;

    @Autowired
    private JdbcClient jdbc;

    @AfterEach
    void asBefore() {
        jdbc.sql("delete from office_setting").update();
    }

    @Test
    void storesWhatDiffersAndRecordsIt() throws Exception {
        saved("Office of the Eastern Meres", "Europe/Oslo", "4", "no").andExpect(redirectedUrl("/settings"));
        assertThat(settings.all())
                .isEqualTo(Map.of(
                        "office_name",
                        "Office of the Eastern Meres",
                        "time_zone",
                        "Europe/Oslo",
                        "first_month",
                        "4",
                        "own_proposals",
                        "no",
                        "legal_basis",
                        "",
                        "objection",
                        ""));
        assertThat(jdbc.sql("select before_text || ' -> ' || after_text from activity_entry where action = ?"
                                + " order by id desc limit 3")
                        .param("changed setting")
                        .query(String.class)
                        .list())
                .containsExactly(
                        "1 -> 4", "UTC -> Europe/Oslo", "Inland Fisheries Office -> Office of the Eastern Meres");
        mvc.perform(get("/settings").with(user("chief").roles("ADMINISTRATOR")))
                .andExpect(content().string(containsString("Office of the Eastern Meres</span>")))
                .andExpect(content().string(containsString("<option value=\"4\" selected=\"selected\">April")));
    }

    @Test
    void refusesWhatCannotBe() throws Exception {
        saved(" ", "Mars/Olympus", "13", "maybe")
                .andExpect(status().isUnprocessableContent())
                .andExpect(content().string(containsString("Enter the name of the office.")))
                .andExpect(content().string(containsString("&quot;Mars/Olympus&quot; is not a time zone")))
                .andExpect(content().string(containsString("Choose a month.")))
                .andExpect(content().string(containsString("Choose yes or no.")));
        assertThat(settings.get(OfficeSettings.TIME_ZONE)).isEqualTo("UTC");
    }

    private ResultActions saved(String office, String zone, String month, String own) throws Exception {
        return mvc.perform(post("/settings")
                .param("officeName", office)
                .param("timeZone", zone)
                .param("firstMonth", month)
                .param("ownProposals", own)
                .with(csrf())
                .with(user("chief").roles("ADMINISTRATOR")));
    }
}
