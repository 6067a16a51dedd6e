package org.merewarden.account;

import java.time.Clock;
import java.util.Collection;
import java.util.List;
import org.merewarden.activity.ActivityLog;
import org.merewarden.web.NotFound;
import org.merewarden.web.Who;
import org.springframework.orm.ObjectOptimisticLockingFailureException;
import org.springframework.security.crypto.password.PasswordEncoder;
import org.springframework.session.FindByIndexNameSessionRepository;
import org.springframework.session.Session;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Makes and changes accounts; every change is on record and ends the person's sessions where their rights change. */
@Service
@Transactional
class Accounts {
    /** The act would leave the office without an enabled administrator. */
    static class LastAdministrator extends RuntimeException {}

    private final AccountRepository accounts;
    private final PasswordEncoder passwords;
    private final ActivityLog activity;
    private final FindByIndexNameSessionRepository<? extends Session> sessions;
    private final Clock clock;

    Accounts(
            AccountRepository accounts,
            PasswordEncoder passwords,
            ActivityLog activity,
            FindByIndexNameSessionRepository<? extends Session> sessions,
            Clock clock) {
        this.accounts = accounts;
        this.passwords = passwords;
        this.activity = activity;
        this.sessions = sessions;
        this.clock = clock;
    }

    @Transactional(readOnly = true)
    public List<Account> all() {
        return accounts.findAllByOrderByUsername();
    }

    @Transactional(readOnly = true)
    public boolean none() {
        return accounts.count() == 0;
    }

    @Transactional(readOnly = true)
    public boolean exists(String username) {
        return accounts.existsByUsername(username);
    }

    @Transactional(readOnly = true)
    public Account get(String username) {
        return accounts.findByUsername(username).orElseThrow(() -> new NotFound("account " + username));
    }

    public void create(String username, String displayName, Role role, Collection<String> waters, String password) {
        Account account =
                new Account(username, displayName, role, passwords.encode(password), clock.instant(), Who.name());
        account.describe(displayName, role, waters);
        accounts.saveAndFlush(account);
        activity.record("created account", username, null, text(account));
    }

    /** @param version the version the person saw; a newer one in the store is a conflict */
    public void describe(String username, int version, String displayName, Role role, Collection<String> waters) {
        Account account = get(username);
        if (account.version() != version) {
            throw new ObjectOptimisticLockingFailureException(Account.class, username);
        }
        if (role != Role.ADMINISTRATOR) {
            keepAnAdministrator(account);
        }
        boolean rightsChange = account.role() != role;
        String before = text(account);
        account.describe(displayName, role, waters);
        accounts.saveAndFlush(account);
        activity.record("changed account", username, before, text(account));
        if (rightsChange) {
            endSessions(username);
        }
    }

    public void setPassword(String username, String password) {
        Account account = get(username);
        account.password(passwords.encode(password));
        accounts.saveAndFlush(account);
        activity.record("set new password", username, null, null);
        endSessions(username);
    }

    public void disable(String username) {
        Account account = get(username);
        keepAnAdministrator(account);
        account.disable(clock.instant());
        accounts.saveAndFlush(account);
        activity.record("disabled account", username, "may sign in", "may not sign in");
        endSessions(username);
    }

    public void enable(String username) {
        Account account = get(username);
        account.enable();
        accounts.saveAndFlush(account);
        activity.record("enabled account", username, "may not sign in", "may sign in");
    }

    private void keepAnAdministrator(Account account) {
        List<Account> administrators = accounts.lockEnabledAdministrators();
        if (administrators.size() == 1 && administrators.get(0).username().equals(account.username())) {
            throw new LastAdministrator();
        }
    }

    private void endSessions(String username) {
        sessions.findByPrincipalName(username).keySet().forEach(sessions::deleteById);
    }

    private static String text(Account account) {
        Person person = account.asPerson();
        String waters = person.waters().isEmpty() ? "" : "; waters: " + String.join(", ", person.waters());
        return person.displayName() + "; " + person.role() + waters;
    }
}
