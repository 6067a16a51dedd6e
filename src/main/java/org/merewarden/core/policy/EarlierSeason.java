package org.merewarden.core.policy;

/**
 * What is known of the season before the one that is advised.
 *
 * @param limitTonnes its limit, total removals, t, >= 0; NaN where none was in force
 * @param removalsTonnes its removals, recorded or expected, t, >= 0; NaN where unknown
 */
public record EarlierSeason(double limitTonnes, double removalsTonnes) {
    /** No limit was in force. */
    public static final EarlierSeason WITHOUT_LIMIT = new EarlierSeason(Double.NaN, Double.NaN);

    public EarlierSeason {
        if (limitTonnes < 0 || removalsTonnes < 0) {
            throw new IllegalArgumentException(
                    "needs limit >= 0 and removals >= 0, got " + limitTonnes + ", " + removalsTonnes);
        }
    }
}
