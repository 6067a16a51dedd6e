/** From evidence to draws: estimation, diagnostics, evidence strength. */
@NullMarked
package org.merewarden.core.inference;

import org.jspecify.annotations.NullMarked;
