/** Share links and what a cooperative sees. */
@NullMarked
package org.merewarden.sharing;

import org.jspecify.annotations.NullMarked;
