package org.merewarden.violations.left;

import org.merewarden.violations.right.internal.Hidden;

/** Reaches into another module's inside, on purpose. */
public class Reaching {
    public final Hidden hidden = new Hidden();
}
