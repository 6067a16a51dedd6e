package org.merewarden.waterbody;

/** Somebody else changed the same entry since the form was opened; carries what is stored now. */
class Conflict extends RuntimeException {
    private static final long serialVersionUID = 1L;

    private final String stored;
    private final int version;

    Conflict(String stored, int version) {
        super("changed by somebody else meanwhile");
        this.stored = stored;
        this.version = version;
    }

    String stored() {
        return stored;
    }

    int version() {
        return version;
    }
}
