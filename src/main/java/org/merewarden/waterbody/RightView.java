package org.merewarden.waterbody;

/** A cooperative's right to a share of a stock's limit. */
public record RightView(
        long cooperativeId, String cooperativeCode, String cooperativeName, long stockId, double sharePercent) {}
