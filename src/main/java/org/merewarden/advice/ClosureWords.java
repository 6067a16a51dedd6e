package org.merewarden.advice;

import java.time.Instant;
import java.time.LocalDate;
import java.time.ZoneId;
import org.merewarden.web.Figures;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** What a closure says of itself. It is told when it is read: only its issue fixes the moment from which it holds. */
@Component
class ClosureWords {
    private final OfficeSettings settings;
    private final Texts texts;

    ClosureWords(OfficeSettings settings, Texts texts) {
        this.settings = settings;
        this.texts = texts;
    }

    /** @param day of the office's calendar */
    record Said(LocalDate day, String measures) {}

    Said said(Instant from) {
        ZoneId zone = settings.zone();
        return new Said(
                LocalDate.ofInstant(from, zone),
                texts.of("advice.closure.measures", Figures.dateTime(from), zone.getId()));
    }
}
