package org.merewarden.core.evidence;

import org.jspecify.annotations.Nullable;

/**
 * Life history and standing knowledge of the stock.
 *
 * @param species FAO three-letter code
 * @param stockedOnly whether recruitment comes from stocking alone
 * @param productivity very slow, slow, moderate or fast, where someone judged it
 * @param maxAgeYears oldest age seen
 * @param growthKPerYear von Bertalanffy K
 * @param growthLinfCm von Bertalanffy asymptotic length in cm
 * @param shareOfLakeYield this stock's share of all species' yield of the lake, 0–1
 */
public record Traits(
        String species,
        boolean stockedOnly,
        @Nullable String productivity,
        @Nullable Double maxAgeYears,
        @Nullable Double growthKPerYear,
        @Nullable Double growthLinfCm,
        @Nullable Double shareOfLakeYield) {}
