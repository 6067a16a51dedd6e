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

/** A dated factor from landed to live weight. */
@Entity
@Table(name = "weight_conversion")
class WeightConversion {
    @Id
    @GeneratedValue(strategy = GenerationType.IDENTITY)
    @Nullable
    Long id;

    @Version
    int version;

    @Embedded
    @Valid
    ConversionDetails details = new ConversionDetails();
}
