package org.merewarden.intake;

/** Published when the demonstration region was loaded into an empty store. */
public record DemonstrationLoaded() {}
