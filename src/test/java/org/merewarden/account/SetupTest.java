package org.merewarden.account;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.hamcrest.Matchers.containsString;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.merewarden.web.NotFound;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;

@WholeApplication
class SetupTest {
    @Autowired
    private MockMvc mvc;

    @Autowired
    private SetupTokens tokens;

    @Autowired
    private Accounts accounts;

    @Autowired
    private JdbcClient jdbc;

    @BeforeEach
    void anOfficeWithoutAccounts() {
        jdbc.sql("delete from account_water_body").update();
        jdbc.sql("delete from account").update();
    }

    @Test
    void theLinkMakesTheFirstAdministratorOnce() throws Exception {
        String token = tokens.make();
        mvc.perform(get("/setup/" + token)).andExpect(status().isOk());
        used(token, "first.admin", "nine quiet herons").andExpect(redirectedUrl("/sign-in"));
        assertThat(accounts.get("first.admin").role()).isEqualTo(Role.ADMINISTRATOR);

        mvc.perform(get("/setup/" + token)).andExpect(status().isNotFound());
        used(token, "second.admin", "nine quiet herons").andExpect(status().isNotFound());
        assertThat(accounts.exists("second.admin")).isFalse();
    }

    @Test
    void aWrongFormDoesNotUseTheLinkUp() throws Exception {
        String token = tokens.make();
        used(token, "first.admin", "short")
                .andExpect(status().isUnprocessableContent())
                .andExpect(content().string(containsString("at least 12 characters")));
        mvc.perform(get("/setup/" + token)).andExpect(status().isOk());
    }

    @Test
    void unknownReplacedAndLateLinksLookTheSame() throws Exception {
        String replaced = tokens.make();
        String late = tokens.make();
        mvc.perform(get("/setup/unknown")).andExpect(status().isNotFound());
        mvc.perform(get("/setup/" + replaced)).andExpect(status().isNotFound());
        mvc.perform(get("/setup/" + late)).andExpect(status().isOk());
        accounts.create("made.otherwise", "X", Role.ADMINISTRATOR, java.util.Set.of(), "nine quiet herons");
        mvc.perform(get("/setup/" + late)).andExpect(status().isNotFound());
        assertThatThrownBy(() -> tokens.use(late, "x.y.z", "X", "nine quiet herons"))
                .isInstanceOf(NotFound.class);
    }

    @Test
    void onlyTheHashIsStoredAndATokenHas192Bits() {
        String token = tokens.make();
        // base64url without padding: 24 bytes are 32 characters of 6 bits
        assertThat(token).matches("[A-Za-z0-9_-]{32}");
        assertThat(tokens.make()).isNotEqualTo(token);
        assertThat(jdbc.sql("select token_hash from setup_token")
                        .query(String.class)
                        .list())
                .noneMatch(stored -> stored.contains(token));
        // SHA-256 of "abc": FIPS 180-4's example, published
        assertThat(SetupTokens.hash("abc"))
                .isEqualTo("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
    }

    private ResultActions used(String token, String username, String password) throws Exception {
        return mvc.perform(post("/setup/" + token)
                .param("username", username)
                .param("displayName", "First Admin")
                .param("password", password)
                .with(csrf()));
    }
}
