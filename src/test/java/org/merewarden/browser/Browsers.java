package org.merewarden.browser;

import static org.junit.jupiter.api.Assumptions.assumeTrue;

import com.microsoft.playwright.Browser;
import com.microsoft.playwright.BrowserType;
import com.microsoft.playwright.Playwright;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;

/** Debian's Chromium, driven by Playwright. */
final class Browsers implements AutoCloseable {
    private static final Path CHROMIUM = Path.of("/usr/bin/chromium");

    private final Playwright playwright;
    private final Browser browser;

    private Browsers() {
        playwright = Playwright.create(
                new Playwright.CreateOptions().setEnv(Map.of("PLAYWRIGHT_SKIP_BROWSER_DOWNLOAD", "1")));
        browser = playwright
                .chromium()
                .launch(new BrowserType.LaunchOptions()
                        .setExecutablePath(CHROMIUM)
                        .setArgs(List.of("--no-sandbox", "--disable-gpu", "--disable-background-networking")));
    }

    /** Skips the calling test, saying so, where there is no Chromium; fails where MEREWARDEN_BROWSER=required. */
    static Browsers start() {
        boolean there = Files.exists(CHROMIUM);
        if (!there && "required".equals(System.getenv("MEREWARDEN_BROWSER"))) {
            throw new IllegalStateException("MEREWARDEN_BROWSER=required, but there is no " + CHROMIUM);
        }
        assumeTrue(there, () -> "browser tests are skipped: there is no " + CHROMIUM + " (Debian package chromium)");
        return new Browsers();
    }

    Browser browser() {
        return browser;
    }

    @Override
    public void close() {
        browser.close();
        playwright.close();
    }
}
