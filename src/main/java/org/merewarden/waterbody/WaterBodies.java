package org.merewarden.waterbody;

import java.util.Optional;
import org.springframework.data.jpa.repository.JpaRepository;

interface WaterBodies extends JpaRepository<WaterBody, Long> {
    Optional<WaterBody> findByDetailsCode(String code);
}
