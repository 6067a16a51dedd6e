package org.merewarden.intake;

import org.springframework.context.MessageSource;
import org.springframework.context.support.MessageSourceAccessor;
import org.springframework.stereotype.Component;

/** The texts of the import pages in the reader's language. */
@Component
class Words {
    private final MessageSourceAccessor messages;

    Words(MessageSource messages) {
        this.messages = new MessageSourceAccessor(messages);
    }

    String of(String key, Object... values) {
        return messages.getMessage("intake." + key, values);
    }
}
