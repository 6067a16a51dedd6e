package org.merewarden.browser;

import com.microsoft.playwright.Browser;
import com.microsoft.playwright.BrowserContext;
import com.microsoft.playwright.Page;
import com.microsoft.playwright.options.AriaRole;
import java.nio.file.Path;

/** One person at a browser of the demonstration. */
final class Office implements AutoCloseable {
    /** Where the pictures are left for people to look at. */
    static final Path PICTURES = Path.of("target", "screenshots");

    private final String address;
    private final BrowserContext context;
    private final Page page;

    Office(Browser browser, int port, int width, boolean scripts) {
        address = "http://localhost:" + port;
        context = browser.newContext(new Browser.NewContextOptions()
                .setViewportSize(width, 900)
                .setJavaScriptEnabled(scripts)
                .setLocale("en-GB"));
        context.setDefaultTimeout(20_000);
        page = context.newPage();
    }

    Page page() {
        return page;
    }

    /** Signs in with what the sign-in page itself says of the person with that user name. */
    Office signIn(String username) {
        go("/sign-in");
        String password = page.locator("tr", new Page.LocatorOptions().setHasText(username))
                .filter(new com.microsoft.playwright.Locator.FilterOptions()
                        .setHas(page.locator("code", new Page.LocatorOptions().setHasText(username))))
                .locator("code")
                .last()
                .textContent();
        page.getByLabel("User name").fill(username);
        page.getByLabel("Password").fill(password);
        press("Sign in");
        return this;
    }

    Office go(String path) {
        page.navigate(address + path);
        return this;
    }

    void press(String button) {
        page.locator("main")
                .getByRole(AriaRole.BUTTON, new com.microsoft.playwright.Locator.GetByRoleOptions().setName(button))
                .first()
                .click();
    }

    void follow(String link) {
        page.locator("main")
                .getByRole(AriaRole.LINK, new com.microsoft.playwright.Locator.GetByRoleOptions().setName(link))
                .first()
                .click();
    }

    String heading() {
        return page.locator("h1").first().textContent().strip();
    }

    /** What the page says; figures and their units are kept together by blanks that do not break. */
    String text() {
        return page.locator("main").innerText().replace('\u00a0', ' ').replace('\u202f', ' ');
    }

    String path() {
        return page.url().substring(address.length());
    }

    void picture(String name) {
        page.screenshot(new Page.ScreenshotOptions()
                .setPath(PICTURES.resolve(name + ".png"))
                .setFullPage(true));
    }

    /** How far the page is wider than the window, in pixels. */
    int overflow() {
        return ((Number) page.evaluate("document.documentElement.scrollWidth - document.documentElement.clientWidth"))
                .intValue();
    }

    @Override
    public void close() {
        context.close();
    }
}
