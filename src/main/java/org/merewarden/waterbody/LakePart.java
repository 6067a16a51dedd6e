package org.merewarden.waterbody;

/**
 * A part that a feature above the register adds to a water body's page: its fragment is included with the view under the
 * name {@code part}.
 */
public interface LakePart {
    /** The template that holds the part, as a fragment {@code part}, e.g. {@code assessment/lake-yield}. */
    String template();

    /** What the fragment shows of the water body, in finished strings. */
    Object view(WaterBodyView lake);
}
