package org.merewarden.core.evidence;

import org.jspecify.annotations.Nullable;

/**
 * A stocking, fish kill or closure.
 *
 * @param kind stocking, fish kill or closure
 * @param low fish kill: least fraction of the biomass lost
 * @param likely fish kill: likely fraction; closure: residual catch in t
 * @param high fish kill: greatest fraction
 * @param recruitedTonnes stocking: number × survival × weight at recruitment, t
 * @param recruitYear stocking: season in which the fish recruit
 */
public record EventRecord(
        String key,
        int year,
        String kind,
        @Nullable Double low,
        @Nullable Double likely,
        @Nullable Double high,
        @Nullable Double recruitedTonnes,
        @Nullable Integer recruitYear) {}
