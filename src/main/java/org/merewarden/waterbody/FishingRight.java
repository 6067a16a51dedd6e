package org.merewarden.waterbody;

import jakarta.persistence.Entity;
import jakarta.persistence.GeneratedValue;
import jakarta.persistence.GenerationType;
import jakarta.persistence.Id;
import jakarta.persistence.Table;
import jakarta.persistence.Version;
import jakarta.validation.constraints.DecimalMax;
import jakarta.validation.constraints.DecimalMin;
import org.jspecify.annotations.Nullable;

/** A cooperative's share of a stock's limit, per cent; the shares of one stock add up to 100 at most. */
@Entity
@Table(name = "fishing_right")
class FishingRight {
    @Id
    @GeneratedValue(strategy = GenerationType.IDENTITY)
    @Nullable
    Long id;

    @Version
    int version;

    long cooperativeId;

    long stockId;

    @DecimalMin("0.01")
    @DecimalMax("100")
    double sharePercent;
}
