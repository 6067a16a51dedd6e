package org.merewarden.account;

import java.util.List;
import java.util.Set;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.boot.ApplicationArguments;
import org.springframework.boot.ApplicationRunner;
import org.springframework.context.annotation.Profile;
import org.springframework.core.annotation.Order;
import org.springframework.stereotype.Component;

/** One account per role with a known password; exists in the demonstration only, and only in a store without accounts. */
@Component
@Profile("demo")
@Order(0)
class DemonstrationAccounts implements ApplicationRunner {
    private static final Logger log = LoggerFactory.getLogger(DemonstrationAccounts.class);

    /** What the sign-in page shows. */
    public record Key(Role role, String username, String password) {}

    private static final List<Key> KEYS = List.of(
            new Key(Role.BIOLOGIST, "biologist", "perchlantern-2"),
            new Key(Role.APPROVER, "approver", "quietferry-71"),
            new Key(Role.CLERK, "clerk", "slipwaykettle-5"),
            new Key(Role.ADMINISTRATOR, "administrator", "mossgatehouse-9"));

    private final Accounts accounts;

    DemonstrationAccounts(Accounts accounts) {
        this.accounts = accounts;
    }

    List<Key> keys() {
        return KEYS;
    }

    @Override
    public void run(ApplicationArguments arguments) {
        if (accounts.none()) {
            for (Key key : KEYS) {
                Set<String> waters = key.role() == Role.CLERK ? Set.of(Person.ALL_WATERS) : Set.of();
                accounts.create(key.username(), name(key.role()), key.role(), waters, key.password());
            }
        }
        KEYS.forEach(key -> log.info("demonstration account: {} / {}", key.username(), key.password()));
    }

    private static String name(Role role) {
        return switch (role) {
            case BIOLOGIST -> "Ines Harrowgate";
            case APPROVER -> "Tobias Wend";
            case CLERK -> "Marta Quillon";
            case ADMINISTRATOR -> "Ruben Ashlake";
        };
    }
}
