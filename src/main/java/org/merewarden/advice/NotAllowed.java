package org.merewarden.advice;

/** What the rules do not allow; the message says which rule: the key of its sentence, or the sentence. */
final class NotAllowed extends RuntimeException {
    NotAllowed(String messageKey) {
        super(messageKey);
    }
}
