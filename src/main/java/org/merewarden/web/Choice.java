package org.merewarden.web;

/** One option of a choice field. */
public record Choice(String value, String label) {}
