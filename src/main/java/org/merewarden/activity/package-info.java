/** The append-only record of who did what, when, from what to what. */
@NullMarked
package org.merewarden.activity;

import org.jspecify.annotations.NullMarked;
