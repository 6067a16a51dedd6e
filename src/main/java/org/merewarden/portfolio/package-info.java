/** The table of all stocks, their comparison, and the page of one stock. */
@NullMarked
package org.merewarden.portfolio;

import org.jspecify.annotations.NullMarked;
