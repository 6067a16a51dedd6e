/** Catch limits for regional inland fisheries. The sub-packages are the features; {@code core} is plain Java. */
@NullMarked
package org.merewarden;

import org.jspecify.annotations.NullMarked;
