package org.merewarden.violations.right.internal;

/** Not for other modules. */
public class Hidden {}
