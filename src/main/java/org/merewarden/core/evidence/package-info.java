/** What an assessment reads: immutable seasonal records with gaps, uncertainty and events, and their content hash. */
@NullMarked
package org.merewarden.core.evidence;

import org.jspecify.annotations.NullMarked;
