package org.merewarden.core.policy;

/** How a stock stands, best first; "unassessed" is the absence of one. */
public enum Standing {
    SECURE,
    WATCH,
    STRAINED,
    CRITICAL
}
