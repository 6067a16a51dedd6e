package org.merewarden.waterbody;

import java.util.Optional;
import org.springframework.data.jpa.repository.JpaRepository;

interface Cooperatives extends JpaRepository<Cooperative, Long> {
    Optional<Cooperative> findByDetailsCode(String code);
}
