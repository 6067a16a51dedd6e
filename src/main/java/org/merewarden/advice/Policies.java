package org.merewarden.advice;

import java.time.Clock;
import java.util.List;
import org.merewarden.activity.ActivityLog;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.NotFound;
import org.merewarden.web.OfficeSettings;
import org.merewarden.web.Who;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/**
 * The office's written rule as numbered versions: proposed, then adopted or refused by somebody else unless the office
 * allows one's own proposals. The version adopted last is in force; nothing is ever edited.
 */
@Service
class Policies implements PolicyInForce {
    private final PolicyStore store;
    private final PolicyWords words;
    private final StandingsRefresh standings;
    private final OfficeSettings settings;
    private final ActivityLog activity;
    private final Clock clock;

    Policies(
            PolicyStore store,
            PolicyWords words,
            StandingsRefresh standings,
            OfficeSettings settings,
            ActivityLog activity,
            Clock clock) {
        this.store = store;
        this.words = words;
        this.standings = standings;
        this.settings = settings;
        this.activity = activity;
        this.clock = clock;
    }

    @Override
    public Policy policy() {
        return store.inForce().policy();
    }

    @Override
    public int number() {
        return store.inForce().number();
    }

    /** Newest first. */
    List<PolicyVersion> all() {
        return store.all();
    }

    /** @throws NotFound where no version has that number */
    static PolicyVersion find(List<PolicyVersion> all, int number) {
        return all.stream()
                .filter(v -> v.number() == number)
                .findFirst()
                .orElseThrow(() -> new NotFound("policy version " + number));
    }

    static PolicyVersion inForce(List<PolicyVersion> all) {
        return all.stream().filter(PolicyVersion::inForce).findFirst().orElseThrow();
    }

    /**
     * Writes a version down; returns its number.
     *
     * @throws NotAllowed where it changes nothing of the version in force
     */
    @Transactional
    public int propose(Policy policy, String reason) {
        store.lock();
        PolicyVersion inForce = inForce(store.all());
        if (policy.equals(inForce.policy())) {
            throw new NotAllowed("policy.form.same");
        }
        int number = store.add(policy, Who.name(), clock.instant());
        store.decide(number, PolicyVersion.PROPOSED, Who.name(), clock.instant(), reason);
        activity.record(
                "proposed policy",
                subject(number),
                described(inForce, policy),
                words.changed(policy, inForce.policy()) + "; " + reason);
        return number;
    }

    /** Puts a proposed version in force and has every stock judged by it. */
    @Transactional
    public void adopt(int number, String reason) {
        checkReason(reason);
        store.lock();
        List<PolicyVersion> all = store.all();
        PolicyVersion before = inForce(all);
        PolicyVersion version = open(all, number);
        boolean own = version.proposer().filter(Who.name()::equals).isPresent();
        if (own && !settings.get(OfficeSettings.OWN_PROPOSALS).equals("yes")) {
            throw new NotAllowed("policy.own");
        }
        String written = reason + (own ? " (own proposal, as the office’s settings allow)" : "");
        store.decide(number, PolicyVersion.ADOPTED, Who.name(), clock.instant(), written);
        standings.queue(number);
        activity.record(
                "adopted policy",
                subject(number),
                described(before, version.policy()),
                words.changed(version.policy(), before.policy()) + "; " + written);
    }

    @Transactional
    public void refuse(int number, String reason) {
        checkReason(reason);
        store.lock();
        open(store.all(), number);
        store.decide(number, PolicyVersion.REFUSED, Who.name(), clock.instant(), reason);
        activity.record("refused policy", subject(number), "proposed", reason);
    }

    private static PolicyVersion open(List<PolicyVersion> all, int number) {
        PolicyVersion version = find(all, number);
        if (version.state() != PolicyVersion.State.OPEN) {
            throw new NotAllowed("policy.decided");
        }
        return version;
    }

    private static void checkReason(String reason) {
        if (reason.isBlank()) {
            throw new NotAllowed("policy.reason.needed");
        }
        if (reason.length() > Decisions.LONGEST_REASON) {
            throw new NotAllowed("policy.reason.long");
        }
    }

    private static String subject(int number) {
        return "policy version " + number;
    }

    /** What the other policy changes, as it is in this version. */
    private String described(PolicyVersion version, Policy other) {
        return "version " + version.number() + ": " + words.changed(version.policy(), other);
    }
}
