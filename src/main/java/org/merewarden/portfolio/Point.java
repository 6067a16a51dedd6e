package org.merewarden.portfolio;

/** A place in a diagram, in the diagram's own units. */
record Point(double x, double y) {}
