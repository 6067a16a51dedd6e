package org.merewarden.web;

import org.jspecify.annotations.Nullable;
import org.springframework.context.MessageSource;
import org.springframework.context.annotation.Primary;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** Texts of the message bundles in the reader's language. */
@Primary
@Component("texts")
public class Texts {
    private final MessageSource messages;

    public Texts(MessageSource messages) {
        this.messages = messages;
    }

    /** The text under the whole key. */
    public String of(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }

    /** The text under the whole key, or the fallback where there is none. */
    public String orElse(String key, String fallback) {
        String text = messages.getMessage(key, new Object[0], "", LocaleContextHolder.getLocale());
        return text == null || text.isEmpty() ? fallback : text;
    }
}
