package org.merewarden.core.evidence;

/** The lake's area in one season, ha, > 0. */
public record AreaRecord(int year, double areaHectares) {
    public AreaRecord {
        Check.positive("area_ha", areaHectares);
    }
}
