package org.merewarden.core.evidence;

/** Rejects a value with the inequality that it violates. */
final class Check {
    private Check() {}

    static void positive(String name, double value) {
        that(value > 0 && Double.isFinite(value), "0 < " + name + " < infinity", value);
    }

    static void that(boolean holds, String rule, Object value) {
        if (!holds) {
            throw new IllegalArgumentException("needs " + rule + ", got " + value);
        }
    }
}
