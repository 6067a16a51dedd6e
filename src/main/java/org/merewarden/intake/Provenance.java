package org.merewarden.intake;

import java.time.Instant;

/** Where stored rows come from. */
public record Provenance(long importId, String by, Instant at) {}
