package org.merewarden.waterbody;

import java.time.LocalDate;
import java.util.List;
import org.springframework.data.jpa.repository.JpaRepository;

interface WeightConversions extends JpaRepository<WeightConversion, Long> {
    List<WeightConversion> findAllByOrderByDetailsSpeciesAscDetailsPresentationAscDetailsValidFromAsc();

    boolean existsByDetailsSpeciesAndDetailsPresentationAndDetailsValidFrom(
            String species, String presentation, LocalDate validFrom);
}
