package org.merewarden.account;

import java.util.Locale;
import org.merewarden.web.Figures;
import org.springframework.context.MessageSource;

/** An account as the pages show it; waters are empty for roles that are not bound to them. */
record AccountRow(
        String username, String address, String name, String role, String waters, String since, String state) {

    static AccountRow of(Account account, MessageSource texts, Locale locale) {
        Person person = account.asPerson();
        return new AccountRow(
                person.username(),
                "/accounts/" + person.username(),
                person.displayName(),
                texts.getMessage("role." + person.role(), null, locale),
                waters(person, texts, locale),
                Figures.dateTime(account.createdAt()),
                texts.getMessage(person.enabled() ? "account.state.enabled" : "account.state.disabled", null, locale));
    }

    private static String waters(Person person, MessageSource texts, Locale locale) {
        if (person.role() != Role.CLERK) {
            return "";
        }
        return person.waters().contains(Person.ALL_WATERS)
                ? texts.getMessage("account.waters.all", null, locale)
                : String.join(", ", person.waters());
    }
}
