package org.merewarden.advice;

/** A cooperative's part of the amount to be logged. */
public record AllocationView(
        long limitId,
        long stockId,
        int season,
        long cooperativeId,
        String cooperativeName,
        double sharePercent,
        long amountKg) {}
