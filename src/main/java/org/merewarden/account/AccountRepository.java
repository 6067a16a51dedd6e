package org.merewarden.account;

import jakarta.persistence.LockModeType;
import java.util.List;
import java.util.Optional;
import org.springframework.data.jpa.repository.Lock;
import org.springframework.data.jpa.repository.Query;
import org.springframework.data.repository.Repository;

interface AccountRepository extends Repository<Account, Long> {
    Optional<Account> findByUsername(String username);

    List<Account> findAllByOrderByUsername();

    boolean existsByUsername(String username);

    long count();

    Account saveAndFlush(Account account);

    /** Locked, so that two administrators cannot take each other's role at the same moment. */
    @Lock(LockModeType.PESSIMISTIC_WRITE)
    @Query("select a from Account a where a.role = org.merewarden.account.Role.ADMINISTRATOR and a.disabledAt is null")
    List<Account> lockEnabledAdministrators();
}
