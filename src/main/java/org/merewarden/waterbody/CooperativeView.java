package org.merewarden.waterbody;

/** A cooperative as other features see it. */
public record CooperativeView(long id, String code, String name) {}
