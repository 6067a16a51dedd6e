package org.merewarden.season;

import java.util.Arrays;
import java.util.List;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;

/** What makes a stored landing worth a look. A flag never stops a landing from being stored. */
enum Flag {
    OVER_LIMIT("over limit"),
    NO_LIMIT("no limit in force"),
    BEFORE_VALIDITY("before validity"),
    AFTER_VALIDITY("after validity"),
    NO_STOCK("not a stock of this water"),
    NO_RIGHT("no right held"),
    EARLIER_SEASON("earlier season"),
    MIXED("mixed, to be split"),
    SEIZED("seized");

    private final String stored;

    Flag(String stored) {
        this.stored = stored;
    }

    /** Key of the words that people read. */
    String messageKey() {
        return "season.flag." + name().toLowerCase(java.util.Locale.ROOT);
    }

    static @Nullable String store(List<Flag> flags) {
        return flags.isEmpty() ? null : flags.stream().map(f -> f.stored).collect(Collectors.joining("; "));
    }

    static List<Flag> read(@Nullable String text) {
        List<String> parts = text == null ? List.of() : List.of(text.split("; "));
        return Arrays.stream(values()).filter(f -> parts.contains(f.stored)).toList();
    }
}
