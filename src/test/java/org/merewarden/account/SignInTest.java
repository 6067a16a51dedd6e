package org.merewarden.account;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.forwardedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.header;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.net.CookieManager;
import java.net.URI;
import java.net.URLEncoder;
import java.net.http.HttpClient;
import java.net.http.HttpRequest;
import java.net.http.HttpResponse;
import java.nio.charset.StandardCharsets;
import java.util.Set;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.hamcrest.Matchers;
import org.junit.jupiter.api.Test;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.boot.test.web.server.LocalServerPort;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;

@WholeApplication
class SignInTest {
    private static final String PASSWORD = "a pond full of ink";

    @Autowired
    private MockMvc mvc;

    @Autowired
    private Accounts accounts;

    @LocalServerPort
    private int port;

    @Test
    void rightPasswordOpensThePortfolio() throws Exception {
        account("door.right");
        tried("door.right", PASSWORD, "192.0.2.1").andExpect(redirectedUrl("/portfolio"));
        tried(" Door.Right ", PASSWORD, "192.0.2.1").andExpect(redirectedUrl("/portfolio"));
    }

    @Test
    void wrongPasswordUnknownNameAndDisabledAccountLookTheSame() throws Exception {
        account("door.wrong");
        account("door.disabled");
        accounts.disable("door.disabled");
        tried("door.wrong", PASSWORD + "!", "192.0.2.2").andExpect(redirectedUrl("/sign-in?wrong"));
        tried("door.unknown", PASSWORD, "192.0.2.2").andExpect(redirectedUrl("/sign-in?wrong"));
        tried("door.disabled", PASSWORD, "192.0.2.2").andExpect(redirectedUrl("/sign-in?wrong"));
        mvc.perform(get("/sign-in?wrong=")).andExpect(content().string(Matchers.containsString("do not fit together")));
    }

    @Test
    void guessingIsStoppedPerNameAndAddress() throws Exception {
        account("door.guessed");
        for (int i = 0; i < SignInGuard.TRIES_PER_NAME; i++) {
            tried("door.guessed", "guess " + i, "192.0.2.3").andExpect(redirectedUrl("/sign-in?wrong"));
        }
        tried("door.guessed", PASSWORD, "192.0.2.3")
                .andExpect(status().isTooManyRequests())
                .andExpect(header().exists("Retry-After"))
                .andExpect(forwardedUrl("/sign-in/later"));
        tried("door.guessed", PASSWORD, "192.0.2.4").andExpect(redirectedUrl("/portfolio"));
    }

    @Test
    void aSuccessClearsTheCountOfItsName() throws Exception {
        account("door.clumsy");
        for (int round = 0; round < 3; round++) {
            for (int i = 0; i < SignInGuard.TRIES_PER_NAME - 1; i++) {
                tried("door.clumsy", "guess", "192.0.2.5").andExpect(redirectedUrl("/sign-in?wrong"));
            }
            tried("door.clumsy", PASSWORD, "192.0.2.5").andExpect(redirectedUrl("/portfolio"));
        }
    }

    @Test
    void guessingOverManyNamesIsStoppedPerAddress() throws Exception {
        for (int i = 0; i < SignInGuard.TRIES_PER_ADDRESS; i++) {
            tried("nobody" + i, "guess", "192.0.2.6").andExpect(redirectedUrl("/sign-in?wrong"));
        }
        tried("nobody-else", "guess", "192.0.2.6").andExpect(status().isTooManyRequests());
    }

    @Test
    void aPostWithoutTheTokenOfThePageIsRefused() throws Exception {
        mvc.perform(post("/settings").with(user("door.admin").roles("ADMINISTRATOR")))
                .andExpect(status().isForbidden());
    }

    @Test
    void everyAnswerCarriesTheHeaders() throws Exception {
        mvc.perform(get("/sign-in"))
                .andExpect(status().isOk())
                .andExpect(header().string(
                                "Content-Security-Policy",
                                "default-src 'self'; script-src 'self'; style-src 'self'; img-src 'self' data:;"
                                        + " object-src 'none'; base-uri 'none'; form-action 'self';"
                                        + " frame-ancestors 'none'"))
                .andExpect(header().string("Referrer-Policy", "no-referrer"))
                .andExpect(header().string("X-Content-Type-Options", "nosniff"))
                .andExpect(header().string("Cache-Control", Matchers.containsString("no-store")))
                .andExpect(content().string(Matchers.not(Matchers.containsString("demonstration"))));
    }

    @Test
    void theWholeWayThroughTheRealServer() throws Exception {
        account("door.walker");
        CookieManager cookies = new CookieManager();
        HttpClient browser = HttpClient.newBuilder().cookieHandler(cookies).build();
        String page = send(browser, HttpRequest.newBuilder(address("/sign-in"))).body();
        String before = cookies.getCookieStore().getCookies().get(0).getValue();

        HttpResponse<String> in = send(browser, signIn(page, "door.walker", PASSWORD));
        assertThat(in.statusCode()).isEqualTo(302);
        String cookie = in.headers().firstValue("Set-Cookie").orElse("");
        assertThat(cookie).contains("HttpOnly").contains("SameSite=Lax");
        assertThat(cookies.getCookieStore().getCookies().get(0).getValue())
                .as("a new session after signing in")
                .isNotEqualTo(before);

        HttpResponse<String> missing = send(browser, HttpRequest.newBuilder(address("/no-such-page")));
        assertThat(missing.statusCode()).isEqualTo(404);
        assertThat(missing.body())
                .contains("Nothing here", "door.walker", "local law prevails")
                .doesNotContain("Exception", "Whitelabel");
        HttpResponse<String> forbidden = send(browser, HttpRequest.newBuilder(address("/accounts")));
        assertThat(forbidden.statusCode()).isEqualTo(403);
        assertThat(forbidden.body()).contains("Not for your role");

        accounts.setPassword("door.walker", PASSWORD + " and more");
        HttpResponse<String> ended = send(browser, HttpRequest.newBuilder(address("/activity")));
        assertThat(ended.statusCode()).as("a new password ends the sessions").isEqualTo(302);
    }

    @Test
    void tooManyTriesAreToldOnThePage() throws Exception {
        HttpClient browser =
                HttpClient.newBuilder().cookieHandler(new CookieManager()).build();
        String page = send(browser, HttpRequest.newBuilder(address("/sign-in"))).body();
        HttpResponse<String> last = null;
        for (int i = 0; i <= SignInGuard.TRIES_PER_NAME; i++) {
            last = send(browser, signIn(page, "door.flood", "guess"));
        }
        assertThat(last.statusCode()).isEqualTo(429);
        assertThat(last.body()).contains("Too many attempts", "<h1>Sign in</h1>");
    }

    private void account(String name) {
        if (!accounts.exists(name)) {
            accounts.create(name, "Some Body", Role.CLERK, Set.of(), PASSWORD);
        }
    }

    private ResultActions tried(String name, String password, String address) throws Exception {
        return mvc.perform(post("/sign-in")
                .param("username", name)
                .param("password", password)
                .with(csrf())
                .with(request -> {
                    request.setRemoteAddr(address);
                    return request;
                }));
    }

    private HttpRequest.Builder signIn(String page, String name, String password) {
        Matcher token = Pattern.compile("name=\"_csrf\" value=\"([^\"]+)\"").matcher(page);
        assertThat(token.find()).isTrue();
        String form =
                "username=" + encoded(name) + "&password=" + encoded(password) + "&_csrf=" + encoded(token.group(1));
        return HttpRequest.newBuilder(address("/sign-in"))
                .header("Content-Type", "application/x-www-form-urlencoded")
                .POST(HttpRequest.BodyPublishers.ofString(form));
    }

    private URI address(String path) {
        return URI.create("http://localhost:" + port + path);
    }

    private static String encoded(String text) {
        return URLEncoder.encode(text, StandardCharsets.UTF_8);
    }

    private static HttpResponse<String> send(HttpClient browser, HttpRequest.Builder request) throws Exception {
        return browser.send(request.header("Accept", "text/html").build(), HttpResponse.BodyHandlers.ofString());
    }
}
