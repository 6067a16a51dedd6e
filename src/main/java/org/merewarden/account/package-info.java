/** People, roles and the two doors: sign-in and set-up. */
@NullMarked
package org.merewarden.account;

import org.jspecify.annotations.NullMarked;
