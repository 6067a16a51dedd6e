package org.merewarden.core.policy;

/**
 * The constants of the office's written rule (model.md section 8's defaults in {@link #DEFAULT}).
 *
 * @param limitFraction B lim as a fraction of K, in (0, 1)
 * @param watchFrom probability from which a stock is watched, in (0, 1)
 * @param strainedFrom probability from which it is strained: the risk tolerance
 * @param criticalFrom probability from which it is critical
 */
public record Policy(double limitFraction, double watchFrom, double strainedFrom, double criticalFrom) {

    public static final Policy DEFAULT = new Policy(0.2, 0.05, 0.10, 0.50);

    public Policy {
        require(0 < limitFraction && limitFraction < 1, "0 < B lim / K < 1", limitFraction);
        require(0 < watchFrom && watchFrom < strainedFrom, "0 < watch < strained", watchFrom);
        require(strainedFrom < criticalFrom && criticalFrom < 1, "strained < critical < 1", criticalFrom);
    }

    private static void require(boolean holds, String rule, double value) {
        if (!holds) {
            throw new IllegalArgumentException("needs " + rule + ", got " + value);
        }
    }
}
