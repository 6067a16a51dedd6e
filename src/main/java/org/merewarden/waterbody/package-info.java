/** Water bodies, stocks, cooperatives, rights and weight conversions. */
@NullMarked
package org.merewarden.waterbody;

import org.jspecify.annotations.NullMarked;
