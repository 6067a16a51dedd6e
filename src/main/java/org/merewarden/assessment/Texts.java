package org.merewarden.assessment;

import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** The feature's texts in the reader's language, under keys that start with {@code assessment.}. */
@Component("assessmentTexts")
class Texts {
    private final MessageSource messages;

    Texts(MessageSource messages) {
        this.messages = messages;
    }

    String get(String key, Object... arguments) {
        return of("assessment." + key, arguments);
    }

    /** A text of another feature, by its whole key. */
    String of(String key, Object... arguments) {
        return messages.getMessage(key, arguments, LocaleContextHolder.getLocale());
    }

    /** The feature's text, or the fallback where there is none. */
    String orElse(String key, String fallback) {
        String text = messages.getMessage("assessment." + key, new Object[0], "", LocaleContextHolder.getLocale());
        return text == null || text.isEmpty() ? fallback : text;
    }
}
