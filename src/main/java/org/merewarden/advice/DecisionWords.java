package org.merewarden.advice;

import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** Why something was decided, in the reader's language: what was written, and what is on record beside it. */
@Component
class DecisionWords {
    private final Texts texts;

    DecisionWords(Texts texts) {
        this.texts = texts;
    }

    /** Empty where nothing was written. */
    String reason(LimitHistory.Decision decision) {
        Beside beside = decision.beside();
        Long successor = beside.successor();
        return Stream.of(
                        decision.reason(),
                        successor == null ? "" : texts.of("advice.by." + decision.act(), Long.toString(successor)),
                        said("advice.beside.", beside.doubt()),
                        said("advice.beside.", beside.own() ? "own" : null))
                .filter(part -> !part.isBlank())
                .collect(Collectors.joining(" "));
    }

    private String said(String key, @Nullable String what) {
        return what == null ? "" : texts.of(key + what);
    }
}
