package org.merewarden.web;

import org.jspecify.annotations.Nullable;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** Texts of the message bundles in the reader's language. */
@Component("webTexts")
public class Texts {
    private final MessageSource messages;

    Texts(MessageSource messages) {
        this.messages = messages;
    }

    /** The text under the whole key. */
    public String of(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
