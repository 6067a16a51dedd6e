/** What follows from an assessment under a course of fishing: projections of its draws and the risk they show. */
@NullMarked
package org.merewarden.core.outlook;

import org.jspecify.annotations.NullMarked;
