package org.merewarden.web;

import jakarta.servlet.http.HttpServletRequest;
import jakarta.servlet.http.HttpServletResponse;
import java.util.Locale;
import java.util.TimeZone;
import org.jspecify.annotations.Nullable;
import org.springframework.context.i18n.LocaleContext;
import org.springframework.context.i18n.TimeZoneAwareLocaleContext;
import org.springframework.stereotype.Component;
import org.springframework.web.servlet.LocaleContextResolver;
import org.springframework.web.servlet.i18n.AcceptHeaderLocaleResolver;

/**
 * Every page is written in the reader's language and in the office's time: the language comes from the browser, the time
 * zone from the settings, asked for once per request and only where a page shows a moment.
 */
@Component("localeResolver")
class OfficeLocale extends AcceptHeaderLocaleResolver implements LocaleContextResolver {
    private final OfficeSettings settings;

    OfficeLocale(OfficeSettings settings) {
        this.settings = settings;
        setDefaultLocale(Locale.UK);
    }

    @Override
    public LocaleContext resolveLocaleContext(HttpServletRequest request) {
        return new Context(resolveLocale(request), settings);
    }

    @Override
    public void setLocaleContext(
            HttpServletRequest request, @Nullable HttpServletResponse response, @Nullable LocaleContext context) {
        throw new UnsupportedOperationException("the language follows the browser, the time zone the settings");
    }

    private static final class Context implements TimeZoneAwareLocaleContext {
        private final Locale locale;
        private final OfficeSettings settings;
        private @Nullable TimeZone zone;

        Context(Locale locale, OfficeSettings settings) {
            this.locale = locale;
            this.settings = settings;
        }

        @Override
        public Locale getLocale() {
            return locale;
        }

        @Override
        public TimeZone getTimeZone() {
            TimeZone known = zone;
            if (known == null) {
                known = TimeZone.getTimeZone(settings.zone());
                zone = known;
            }
            return known;
        }
    }
}
