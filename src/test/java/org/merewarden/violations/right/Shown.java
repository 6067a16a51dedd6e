package org.merewarden.violations.right;

/** What the module shows. */
public class Shown {}
