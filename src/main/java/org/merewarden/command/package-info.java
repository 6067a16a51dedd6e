/** The command line: assessments of a folder of tables, without server and store. */
@NullMarked
package org.merewarden.command;

import org.jspecify.annotations.NullMarked;
