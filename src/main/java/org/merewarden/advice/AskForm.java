package org.merewarden.advice;

import org.jspecify.annotations.Nullable;
import org.merewarden.web.Cells;
import org.springframework.validation.BindingResult;

/** What a reader asks beside the rule's own alternatives, as it is typed; kept in the address. */
class AskForm {
    private static final double MOST_TONNES = 1e7;

    /** A catch of their own, t a year. */
    private @Nullable Double own;

    /** The share of K at which growth is halved in the stress test, per cent. */
    private @Nullable Double weak = 100 * WhatIf.USUAL_HALF_GROWTH;

    public @Nullable Double getOwn() {
        return own;
    }

    public void setOwn(@Nullable Double own) {
        this.own = own;
    }

    public @Nullable Double getWeak() {
        return weak;
    }

    public void setWeak(@Nullable Double weak) {
        this.weak = weak;
    }

    /** What of it can be asked; what cannot is named at its field. */
    WhatIf check(BindingResult result) {
        if (own != null && !(own >= 0 && own <= MOST_TONNES)) {
            reject(result, "own", own);
        }
        if (weak != null && !(weak > 0 && weak <= 100)) {
            reject(result, "weak", weak);
        }
        return new WhatIf(
                result.hasFieldErrors("own") ? null : own,
                result.hasFieldErrors("weak") || weak == null ? WhatIf.USUAL_HALF_GROWTH : weak / 100);
    }

    private static void reject(BindingResult result, String field, double value) {
        result.rejectValue(field, "outlook.ask." + field + ".range", new Object[] {Cells.plain(value)}, null);
    }
}
