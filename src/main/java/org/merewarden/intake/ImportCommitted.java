package org.merewarden.intake;

import java.util.Set;

/** Published in the transaction that stores an import. */
public record ImportCommitted(long importId, Set<String> tables) {}
