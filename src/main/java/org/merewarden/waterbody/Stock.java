package org.merewarden.waterbody;

import jakarta.persistence.Embedded;
import jakarta.persistence.Entity;
import jakarta.persistence.GeneratedValue;
import jakarta.persistence.GenerationType;
import jakarta.persistence.Id;
import jakarta.persistence.Table;
import jakarta.persistence.Version;
import jakarta.validation.Valid;
import org.jspecify.annotations.Nullable;

/** A species in a water body. */
@Entity
@Table(name = "stock")
class Stock {
    @Id
    @GeneratedValue(strategy = GenerationType.IDENTITY)
    @Nullable
    Long id;

    @Version
    int version;

    long waterBodyId;

    @Embedded
    @Valid
    StockDetails details = new StockDetails();
}
