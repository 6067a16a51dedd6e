package org.merewarden.portfolio;

import java.util.List;
import org.springframework.context.MessageSource;
import org.springframework.stereotype.Component;

/** The feature's texts, under keys that start with {@code portfolio.}, and those of others by their whole key. */
@Component("portfolioTexts")
class Texts extends org.merewarden.web.Texts {
    Texts(MessageSource messages) {
        super(messages);
    }

    String get(String key, Object... arguments) {
        return of("portfolio." + key, arguments);
    }

    String sentences(List<String> sentences) {
        return String.join(" ", sentences);
    }
}
