package org.merewarden.waterbody;

import org.springframework.data.jpa.repository.JpaRepository;

interface Stocks extends JpaRepository<Stock, Long> {}
