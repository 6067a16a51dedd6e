package org.merewarden.records;

import java.util.List;

/**
 * Something about the records that a biologist should look at.
 *
 * @param rule suffix of the sentence's message key
 * @param details what stands in the sentence, in order
 */
record Finding(String rule, List<String> details) {
    static Finding of(String rule, String... details) {
        return new Finding(rule, List.of(details));
    }
}
