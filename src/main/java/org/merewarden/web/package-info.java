/** Layout, number and date formatting, the SVG drawing helper, exports, error pages, clock, security headers. */
@NullMarked
package org.merewarden.web;

import org.jspecify.annotations.NullMarked;
