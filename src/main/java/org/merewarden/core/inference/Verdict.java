package org.merewarden.core.inference;

import java.util.List;

/**
 * Whether the estimation settled, and what is to be said about it.
 *
 * @param settled false: no limit may rest on it without a written reason
 * @param reasons sentences for the reader; when not settled the first one names the first failure
 */
public record Verdict(boolean settled, List<String> reasons) {
    public Verdict {
        reasons = List.copyOf(reasons);
    }
}
