package org.merewarden.account;

import jakarta.persistence.CollectionTable;
import jakarta.persistence.Column;
import jakarta.persistence.ElementCollection;
import jakarta.persistence.Entity;
import jakarta.persistence.EnumType;
import jakarta.persistence.Enumerated;
import jakarta.persistence.FetchType;
import jakarta.persistence.GeneratedValue;
import jakarta.persistence.GenerationType;
import jakarta.persistence.Id;
import jakarta.persistence.JoinColumn;
import jakarta.persistence.Version;
import java.time.Instant;
import java.util.Collection;
import java.util.HashSet;
import java.util.Set;
import java.util.TreeSet;
import org.hibernate.annotations.BatchSize;
import org.jspecify.annotations.Nullable;

/** An account. It is never deleted, since the record of who did what names it; it is disabled. */
@Entity
class Account {
    @Id
    @GeneratedValue(strategy = GenerationType.IDENTITY)
    private @Nullable Long id;

    @Version
    private int version;

    private String username;
    private String displayName;

    @Enumerated(EnumType.STRING)
    private Role role;

    private String passwordHash;
    private Instant createdAt;
    private String createdBy;
    private @Nullable Instant disabledAt;

    @ElementCollection(fetch = FetchType.EAGER)
    @CollectionTable(name = "account_water_body", joinColumns = @JoinColumn(name = "account_id"))
    @Column(name = "water_body_code")
    @BatchSize(size = 100)
    private Set<String> waters = new HashSet<>();

    @SuppressWarnings("NullAway.Init")
    protected Account() {}

    Account(String username, String displayName, Role role, String passwordHash, Instant createdAt, String createdBy) {
        this.username = username;
        this.displayName = displayName;
        this.role = role;
        this.passwordHash = passwordHash;
        this.createdAt = createdAt;
        this.createdBy = createdBy;
    }

    Person asPerson() {
        return new Person(username, displayName, role, new TreeSet<>(waters), enabled());
    }

    void describe(String newDisplayName, Role newRole, Collection<String> newWaters) {
        displayName = newDisplayName;
        role = newRole;
        waters.clear();
        waters.addAll(newWaters);
    }

    void password(String newHash) {
        passwordHash = newHash;
    }

    void disable(Instant when) {
        disabledAt = when;
    }

    void enable() {
        disabledAt = null;
    }

    boolean enabled() {
        return disabledAt == null;
    }

    int version() {
        return version;
    }

    String username() {
        return username;
    }

    String displayName() {
        return displayName;
    }

    Role role() {
        return role;
    }

    String passwordHash() {
        return passwordHash;
    }

    Instant createdAt() {
        return createdAt;
    }

    String createdBy() {
        return createdBy;
    }
}
