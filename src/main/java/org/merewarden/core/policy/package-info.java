/** The written rule: standing, and the way from a limit to the amount to be logged. */
@NullMarked
package org.merewarden.core.policy;

import org.jspecify.annotations.NullMarked;
