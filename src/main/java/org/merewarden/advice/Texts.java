package org.merewarden.advice;

import org.jspecify.annotations.Nullable;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** This room's sentences, in the reader's language. */
@Component("adviceTexts")
class Texts {
    private final MessageSource messages;

    Texts(MessageSource messages) {
        this.messages = messages;
    }

    String of(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
