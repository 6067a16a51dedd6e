package org.merewarden.web;

import java.util.List;
import java.util.Set;
import org.jspecify.annotations.Nullable;

/** The main pages, in the order of the year's work, each for the roles that may open and use it. */
final class Navigation {
    private static final Set<String> ALL = Set.of("CLERK", "BIOLOGIST", "APPROVER", "ADMINISTRATOR");
    private static final Set<String> FIELD = Set.of("CLERK", "BIOLOGIST", "APPROVER");
    private static final Set<String> DESK = Set.of("BIOLOGIST", "APPROVER");
    private static final Set<String> OVERSIGHT = Set.of("BIOLOGIST", "APPROVER", "ADMINISTRATOR");
    private static final Set<String> HOUSE = Set.of("ADMINISTRATOR");

    private record Entry(String key, String path, Set<String> roles) {}

    private static final List<Entry> ENTRIES = List.of(
            new Entry("nav.portfolio", "/portfolio", ALL),
            new Entry("nav.season", "/season", ALL),
            new Entry("nav.landing", "/landings/new", FIELD),
            new Entry("nav.waters", "/water-bodies", ALL),
            new Entry("nav.cooperatives", "/cooperatives", ALL),
            new Entry("nav.imports", "/imports", DESK),
            new Entry("nav.assessments", "/assessments", ALL),
            new Entry("nav.policy", "/policy", ALL),
            new Entry("nav.shares", "/shares", OVERSIGHT),
            new Entry("nav.activity", "/activity", OVERSIGHT),
            new Entry("nav.accounts", "/accounts", HOUSE),
            new Entry("nav.settings", "/settings", HOUSE));

    private Navigation() {}

    /**
     * @param key message key of the link's text
     * @param current "page" where the link leads to the page being shown, "true" to one above it, else null
     */
    record Link(String key, String address, @Nullable String current) {}

    /** The links for a role, season pages leading to the given season. */
    static List<Link> of(@Nullable String role, int season, String address) {
        return ENTRIES.stream()
                .filter(e -> role != null && e.roles().contains(role))
                .map(e -> link(e, season, address))
                .toList();
    }

    private static Link link(Entry entry, int season, String address) {
        String target = entry.path().equals("/season") ? "/season/" + season : entry.path();
        boolean above = address.startsWith(entry.path() + "/");
        return new Link(entry.key(), target, address.equals(target) ? "page" : above ? "true" : null);
    }
}
