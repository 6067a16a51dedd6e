/** Queued work with stored state, progress and result. */
@NullMarked
package org.merewarden.jobs;

import org.jspecify.annotations.NullMarked;
