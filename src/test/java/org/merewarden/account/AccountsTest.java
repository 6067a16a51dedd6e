package org.merewarden.account;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.containsString;
import static org.hamcrest.Matchers.not;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.flash;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.util.Set;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.security.authentication.TestingAuthenticationToken;
import org.springframework.security.core.context.SecurityContextHolder;
import org.springframework.security.crypto.password.PasswordEncoder;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;
import org.springframework.test.web.servlet.request.MockHttpServletRequestBuilder;

@WholeApplication
class AccountsTest {
    private static final String PASSWORD = "seven slow swans";

    @Autowired
    private MockMvc mvc;

    @Autowired
    private Accounts accounts;

    @Autowired
    private People people;

    @Autowired
    private PasswordEncoder passwords;

    @Autowired
    private JdbcClient jdbc;

    @Test
    void makesAnAccountAndRecordsWhoDidIt() throws Exception {
        done(made("acc.new", "CLERK", "skelder, wend-mere", PASSWORD))
                .andExpect(redirectedUrl("/accounts"))
                .andExpect(flash().attribute("done", "Account acc.new is made."));
        Account account = accounts.get("acc.new");
        assertThat(account.asPerson().waters()).containsExactly("skelder", "wend-mere");
        assertThat(account.passwordHash()).startsWith("{bcrypt}").doesNotContain(PASSWORD);
        assertThat(passwords.matches(PASSWORD, account.passwordHash())).isTrue();
        assertThat(lastEntry("acc.new"))
                .isEqualTo("chief created account null -> Some Body; CLERK; waters: skelder, wend-mere");
        mvc.perform(get("/accounts").with(user("chief").roles("ADMINISTRATOR")))
                .andExpect(status().isOk())
                .andExpect(content().string(containsString("acc.new")));
    }

    @Test
    void tellsEveryFieldThatIsWrongAndStoresNothing() throws Exception {
        done(made("X", "", "", "short"))
                .andExpect(status().isUnprocessableContent())
                .andExpect(content().string(containsString("href=\"#username\"")))
                .andExpect(content().string(containsString("&quot;X&quot; is not a user name")))
                .andExpect(content().string(containsString("Choose a role.")))
                .andExpect(content().string(containsString("at least 12 characters; this one has 5")))
                .andExpect(content().string(containsString("aria-describedby=\"password-hint password-error\"")))
                .andExpect(content().string(not(containsString("value=\"short\""))));
        assertThat(accounts.exists("x")).isFalse();
    }

    @Test
    void aUserNameIsGivenOnce() throws Exception {
        account("acc.twice", Role.CLERK);
        done(made("acc.twice", "CLERK", "", PASSWORD))
                .andExpect(status().isUnprocessableContent())
                .andExpect(content().string(containsString("already an account")));
    }

    @Test
    void changesRoleAndWatersFromTheVersionThatWasSeen() throws Exception {
        account("acc.change", Role.CLERK);
        int version = accounts.get("acc.change").version();
        done(changed("acc.change", version, "BIOLOGIST", "First")).andExpect(redirectedUrl("/accounts"));
        assertThat(lastEntry("acc.change")).isEqualTo("chief changed account Some Body; CLERK -> First; BIOLOGIST");

        done(changed("acc.change", version, "APPROVER", "Second"))
                .andExpect(status().isConflict())
                .andExpect(content().string(containsString("First; Biologist")))
                .andExpect(content().string(containsString("value=\"Second\"")));
        assertThat(accounts.get("acc.change").displayName()).isEqualTo("First");
    }

    @Test
    void theLastAdministratorKeepsRoleAndAccess() throws Exception {
        // other tests may have left administrators in the shared store
        accounts.all().stream()
                .filter(a -> a.role() == Role.ADMINISTRATOR && a.enabled())
                .forEach(a -> jdbc.sql("update account set disabled_at = current_timestamp where username = ?")
                        .param(a.username())
                        .update());
        account("acc.last", Role.ADMINISTRATOR);
        int version = accounts.get("acc.last").version();
        done(changed("acc.last", version, "CLERK", "Some Body"))
                .andExpect(status().isUnprocessableContent())
                .andExpect(content().string(containsString("last administrator")));
        done(post("/accounts/acc.last/disable")).andExpect(flash().attributeExists("refused"));
        assertThat(accounts.get("acc.last").asPerson())
                .isEqualTo(new Person("acc.last", "Some Body", Role.ADMINISTRATOR, Set.of(), true));

        account("acc.second", Role.ADMINISTRATOR);
        done(post("/accounts/acc.last/disable")).andExpect(flash().attributeExists("done"));
        assertThat(accounts.get("acc.last").enabled()).isFalse();
        done(post("/accounts/acc.last/enable")).andExpect(flash().attributeExists("done"));
        assertThat(accounts.get("acc.last").enabled()).isTrue();
    }

    @Test
    void aNewPasswordReplacesTheOldAndMustBeLong() throws Exception {
        account("acc.pass", Role.CLERK);
        done(post("/accounts/acc.pass/password").param("password", "short"))
                .andExpect(flash().attributeExists("refused"));
        assertThat(passwords.matches(PASSWORD, accounts.get("acc.pass").passwordHash()))
                .isTrue();
        done(post("/accounts/acc.pass/password").param("password", PASSWORD + "!"))
                .andExpect(flash().attributeExists("done"));
        assertThat(passwords.matches(PASSWORD, accounts.get("acc.pass").passwordHash()))
                .isFalse();
        done(post("/accounts/acc.pass/password").param("password", "ü".repeat(37)))
                .andExpect(flash().attributeExists("refused"));
    }

    @Test
    void anUnknownAccountIsNotFound() throws Exception {
        mvc.perform(get("/accounts/acc.nobody").with(user("chief").roles("ADMINISTRATOR")))
                .andExpect(status().isNotFound());
        done(post("/accounts/acc.nobody/password").param("password", "short")).andExpect(status().isNotFound());
    }

    @Test
    void clerksLogAtTheirWatersOnly() {
        account("acc.clerk", Role.CLERK, "skelder");
        account("acc.rover", Role.CLERK, "*");
        account("acc.approver", Role.APPROVER);
        account("acc.keeper", Role.ADMINISTRATOR);
        assertThat(mayLog("acc.clerk", "skelder")).isTrue();
        assertThat(mayLog("acc.clerk", "wend-mere")).isFalse();
        assertThat(mayLog("acc.rover", "wend-mere")).isTrue();
        assertThat(mayLog("acc.approver", "wend-mere")).isTrue();
        assertThat(mayLog("acc.keeper", "wend-mere")).isFalse();
        assertThat(mayLog("acc.unknown", "skelder")).isFalse();
        assertThat(people.mayLogAt("skelder")).as("nobody signed in").isFalse();
        assertThat(people.all()).extracting(Person::username).contains("acc.clerk", "acc.rover");
    }

    private boolean mayLog(String username, String lake) {
        SecurityContextHolder.getContext().setAuthentication(new TestingAuthenticationToken(username, "", "ROLE_X"));
        try {
            return people.mayLogAt(lake);
        } finally {
            SecurityContextHolder.clearContext();
        }
    }

    private void account(String username, Role role, String... waters) {
        accounts.create(username, "Some Body", role, Set.of(waters), PASSWORD);
    }

    private ResultActions done(MockHttpServletRequestBuilder act) throws Exception {
        return mvc.perform(act.with(csrf()).with(user("chief").roles("ADMINISTRATOR")));
    }

    private static MockHttpServletRequestBuilder made(String username, String role, String waters, String password) {
        return post("/accounts")
                .param("username", username)
                .param("displayName", "Some Body")
                .param("role", role)
                .param("waters", waters)
                .param("password", password);
    }

    private static MockHttpServletRequestBuilder changed(String username, int version, String role, String name) {
        return post("/accounts/" + username)
                .param("version", Integer.toString(version))
                .param("displayName", name)
                .param("role", role)
                .param("waters", "");
    }

    private String lastEntry(String subject) {
        return jdbc.sql("select actor, action, before_text, after_text from activity_entry where subject = ?"
                        + " order by id desc limit 1")
                .param(subject)
                .query((row, n) ->
                        row.getString(1) + " " + row.getString(2) + " " + row.getString(3) + " -> " + row.getString(4))
                .single();
    }
}
