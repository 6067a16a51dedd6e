package org.merewarden.core.dynamics;

import org.springframework.util.StringUtils;

/** A core class that imports a framework, on purpose: the import rule must refuse it. */
class DeliberateViolation {
    boolean blank(String text) {
        return !StringUtils.hasText(text);
    }
}
