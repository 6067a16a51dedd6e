/** Files in: parsing, the fate of every row, preview, commit or discard. */
@NullMarked
package org.merewarden.intake;

import org.jspecify.annotations.NullMarked;
