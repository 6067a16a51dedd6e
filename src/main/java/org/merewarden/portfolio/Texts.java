package org.merewarden.portfolio;

import java.util.List;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** The feature's texts in the reader's language, under keys that start with {@code portfolio.}. */
@Component
class Texts {
    private final MessageSource messages;

    Texts(MessageSource messages) {
        this.messages = messages;
    }

    String get(String key, Object... arguments) {
        return messages.getMessage("portfolio." + key, arguments, LocaleContextHolder.getLocale());
    }

    /** A text of another feature, by its whole key. */
    String of(String key, Object... arguments) {
        return messages.getMessage(key, arguments, LocaleContextHolder.getLocale());
    }

    /** The text under the whole key, or the fallback where there is none. */
    String orElse(String key, String fallback) {
        String text = messages.getMessage(key, new Object[0], "", LocaleContextHolder.getLocale());
        return text == null || text.isEmpty() ? fallback : text;
    }

    String sentences(List<String> sentences) {
        return String.join(" ", sentences);
    }
}
