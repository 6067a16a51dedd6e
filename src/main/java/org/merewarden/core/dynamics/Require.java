package org.merewarden.core.dynamics;

/** Rejects values outside their range, naming the inequality and the value. */
final class Require {
    private Require() {}

    static void positive(String name, double value) {
        if (!(value > 0) || Double.isInfinite(value)) {
            throw new IllegalArgumentException("0 < " + name + " < infinity is violated: " + name + " = " + value);
        }
    }

    static void notNegative(String name, double value) {
        if (!(value >= 0) || Double.isInfinite(value)) {
            throw new IllegalArgumentException("0 <= " + name + " < infinity is violated: " + name + " = " + value);
        }
    }

    static void less(String lowName, double low, String highName, double high) {
        if (!(low < high)) {
            throw new IllegalArgumentException(lowName + " < " + highName + " is violated: " + lowName + " = " + low
                    + ", " + highName + " = " + high);
        }
    }
}
