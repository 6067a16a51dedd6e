package org.merewarden.intake;

import java.time.OffsetDateTime;
import java.time.ZoneId;
import java.time.format.DateTimeFormatter;
import java.time.format.FormatStyle;
import java.util.function.Function;
import org.merewarden.web.OfficeSettings;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.context.support.MessageSourceAccessor;
import org.springframework.stereotype.Component;

/** The texts of the import pages in the reader's language. */
@Component
class Words {
    private final MessageSourceAccessor messages;
    private final OfficeSettings settings;

    Words(MessageSource messages, OfficeSettings settings) {
        this.messages = new MessageSourceAccessor(messages);
        this.settings = settings;
    }

    String of(String key, Object... values) {
        return messages.getMessage("intake." + key, values);
    }

    /** Writes times in the office's zone, which is read once. */
    Function<OffsetDateTime, String> times() {
        ZoneId zone = settings.zone();
        DateTimeFormatter format = DateTimeFormatter.ofLocalizedDateTime(FormatStyle.MEDIUM, FormatStyle.SHORT)
                .withLocale(LocaleContextHolder.getLocale());
        return time -> format.format(time.atZoneSameInstant(zone));
    }
}
