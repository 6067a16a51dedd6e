package org.merewarden.violations;

/** Root of a tiny application that breaks the rules on purpose. */
public class Violations {}
