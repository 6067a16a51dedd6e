package org.merewarden.account;

import java.util.List;
import java.util.Optional;
import org.merewarden.web.Who;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Who the people of the office are and where they may log landings. */
@Service
@Transactional(readOnly = true)
public class People {
    private final AccountRepository accounts;

    People(AccountRepository accounts) {
        this.accounts = accounts;
    }

    /** Whether the signed-in person may log landings at this water; no when nobody is signed in. */
    public boolean mayLogAt(String lakeCode) {
        return current().map(person -> person.mayLogAt(lakeCode)).orElse(false);
    }

    /** The signed-in person. */
    public Optional<Person> current() {
        return accounts.findByUsername(Who.name()).map(Account::asPerson).filter(Person::enabled);
    }

    /** Everybody, disabled accounts too, by user name. */
    public List<Person> all() {
        return accounts.findAllByOrderByUsername().stream()
                .map(Account::asPerson)
                .toList();
    }
}
