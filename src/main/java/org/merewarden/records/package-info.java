/** Evidence records and events, their edit history and data-quality findings. */
@NullMarked
package org.merewarden.records;

import org.jspecify.annotations.NullMarked;
