package org.merewarden.account;

import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.boot.context.event.ApplicationReadyEvent;
import org.springframework.context.annotation.Profile;
import org.springframework.context.event.EventListener;
import org.springframework.core.env.Environment;
import org.springframework.stereotype.Component;

/** Writes the set-up link to the log when the server starts without an account. */
@Component
@Profile("!demo")
class SetupLink {
    private static final Logger log = LoggerFactory.getLogger(SetupLink.class);

    private final SetupTokens tokens;
    private final Accounts accounts;
    private final Environment environment;

    SetupLink(SetupTokens tokens, Accounts accounts, Environment environment) {
        this.tokens = tokens;
        this.accounts = accounts;
        this.environment = environment;
    }

    @EventListener(ApplicationReadyEvent.class)
    void announce() {
        if (accounts.none()) {
            String port = environment.getProperty("local.server.port", "8080");
            log.warn(
                    "No account yet. Open this link once to make the first administrator (put your own host name in its"
                            + " place): http://localhost:{}/setup/{}",
                    port,
                    tokens.make());
        }
    }
}
