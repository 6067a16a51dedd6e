package org.merewarden.core.inference;

/** How much an assessment knows, strongest first. */
public enum EvidenceStrength {
    STRONG,
    FAIR,
    THIN,
    NONE
}
