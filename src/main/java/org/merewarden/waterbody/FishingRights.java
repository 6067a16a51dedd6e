package org.merewarden.waterbody;

import java.util.List;
import java.util.Optional;
import org.springframework.data.jpa.repository.JpaRepository;

interface FishingRights extends JpaRepository<FishingRight, Long> {
    List<FishingRight> findByStockId(long stockId);

    Optional<FishingRight> findByCooperativeIdAndStockId(long cooperativeId, long stockId);
}
