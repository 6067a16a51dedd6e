/** Assessments of one evidence version, stored for ever. */
@NullMarked
package org.merewarden.assessment;

import org.jspecify.annotations.NullMarked;
