package org.merewarden.web;

import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.core.env.Environment;
import org.springframework.core.env.Profiles;
import org.springframework.dao.DataAccessException;
import org.springframework.security.authentication.AnonymousAuthenticationToken;
import org.springframework.security.core.Authentication;
import org.springframework.security.core.context.SecurityContextHolder;
import org.springframework.stereotype.Component;
import org.springframework.web.context.request.RequestContextHolder;
import org.springframework.web.context.request.ServletRequestAttributes;

/** What stands around every page; the layout asks for it once by the bean's name. */
@Component("pageFrame")
class PageFrame {
    private static final Logger log = LoggerFactory.getLogger(PageFrame.class);
    private static final List<String> ROLES = List.of("CLERK", "BIOLOGIST", "APPROVER", "ADMINISTRATOR");

    private final OfficeSettings settings;
    private final Seasons seasons;
    private final boolean demonstration;

    PageFrame(OfficeSettings settings, Seasons seasons, Environment environment) {
        this.settings = settings;
        this.seasons = seasons;
        this.demonstration = environment.acceptsProfiles(Profiles.of("demo"));
    }

    /** For a page of the office. Role is the suffix of its message key; both null where nobody is signed in. */
    record Frame(
            String office,
            boolean demonstration,
            @Nullable String person,
            @Nullable String role,
            List<Navigation.Link> links) {}

    /** The office's name and whether this is the demonstration, for pages without navigation. */
    public Frame bare() {
        return new Frame(office(settings()), demonstration, null, null, List.of());
    }

    public Frame office() {
        Map<String, String> all = settings();
        Authentication who = SecurityContextHolder.getContext().getAuthentication();
        if (who == null || !who.isAuthenticated() || who instanceof AnonymousAuthenticationToken) {
            return new Frame(office(all), demonstration, null, null, List.of());
        }
        String role = ROLES.stream().filter(Who::has).findFirst().orElse(null);
        int season = seasons.current(all);
        return new Frame(office(all), demonstration, who.getName(), role, Navigation.of(role, season, address()));
    }

    /** The error page stands in this frame too, and must come even when the store is gone. */
    private Map<String, String> settings() {
        try {
            return settings.all();
        } catch (DataAccessException e) {
            log.warn("settings cannot be read, pages show the defaults", e);
            return OfficeSettings.DEFAULTS;
        }
    }

    private static String office(Map<String, String> all) {
        return all.getOrDefault(OfficeSettings.OFFICE_NAME, "");
    }

    private static String address() {
        return RequestContextHolder.getRequestAttributes() instanceof ServletRequestAttributes attributes
                ? attributes.getRequest().getRequestURI()
                : "";
    }
}
