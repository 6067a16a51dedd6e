package org.merewarden.waterbody;

/** A species of the FAO list. */
public record Species(String code, String scientificName, String englishName) {}
