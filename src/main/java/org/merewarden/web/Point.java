package org.merewarden.web;

/** A point of a drawing, in the units of its axes. */
public record Point(double x, double y) {}
