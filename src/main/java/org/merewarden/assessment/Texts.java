package org.merewarden.assessment;

import org.springframework.context.MessageSource;
import org.springframework.stereotype.Component;

/** The feature's texts, under keys that start with {@code assessment.}, and those of others by their whole key. */
@Component("assessmentTexts")
class Texts extends org.merewarden.web.Texts {
    Texts(MessageSource messages) {
        super(messages);
    }

    String get(String key, Object... arguments) {
        return of("assessment." + key, arguments);
    }
}
