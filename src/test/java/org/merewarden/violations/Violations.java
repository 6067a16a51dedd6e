package org.merewarden.violations;

import org.springframework.modulith.Modulithic;

/** Root of a tiny application that breaks the rules on purpose. */
@Modulithic
public class Violations {}
