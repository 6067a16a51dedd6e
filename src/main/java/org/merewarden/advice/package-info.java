/** Standing, limits, decisions, allocations and notices. */
@NullMarked
package org.merewarden.advice;

import org.jspecify.annotations.NullMarked;
