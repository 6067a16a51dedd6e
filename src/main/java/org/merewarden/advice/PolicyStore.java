package org.merewarden.advice;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.time.Instant;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.List;
import java.util.Map;
import java.util.stream.Collectors;
import org.merewarden.core.policy.Policy;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Repository;

/** The versions of the rule and the acts about them, each written once. */
@Repository
class PolicyStore {
    private static final String IN_FORCE =
            "select policy_number from policy_act where act = 'ADOPTED' order by id desc limit 1";

    private final JdbcClient jdbc;

    PolicyStore(JdbcClient jdbc) {
        this.jdbc = jdbc;
    }

    record Numbered(int number, Policy policy) {}

    private record ActOf(int number, PolicyVersion.Act act) {}

    /** All versions, newest first; two statements. */
    List<PolicyVersion> all() {
        // before the acts: a version that is being written meanwhile would have none
        List<Numbered> versions = jdbc.sql("select * from policy_version order by number desc")
                .query((row, n) -> new Numbered(row.getInt("number"), policy(row)))
                .list();
        List<ActOf> acts = acts();
        int inForce = acts.stream()
                .filter(a -> a.act().act().equals(PolicyVersion.ADOPTED))
                .reduce((before, after) -> after)
                .orElseThrow()
                .number();
        Map<Integer, List<PolicyVersion.Act>> byNumber = acts.stream()
                .collect(Collectors.groupingBy(ActOf::number, Collectors.mapping(ActOf::act, Collectors.toList())));
        return versions.stream()
                .map(v -> new PolicyVersion(
                        v.number(), v.policy(), v.number() == inForce, byNumber.getOrDefault(v.number(), List.of())))
                .toList();
    }

    private List<ActOf> acts() {
        return jdbc.sql("select policy_number, act, decided_at, decided_by, reason from policy_act order by id")
                .query((row, n) -> new ActOf(
                        row.getInt("policy_number"),
                        new PolicyVersion.Act(
                                row.getString("act"),
                                row.getObject("decided_at", OffsetDateTime.class)
                                        .toInstant(),
                                row.getString("decided_by"),
                                row.getString("reason"))))
                .list();
    }

    /** One statement. */
    Numbered inForce() {
        return jdbc.sql("select * from policy_version where number = (" + IN_FORCE + ")")
                .query((row, n) -> new Numbered(row.getInt("number"), policy(row)))
                .single();
    }

    /** Holds every other change of the rule until this transaction ends. */
    void lock() {
        jdbc.sql("select number from policy_version where number = 1 for update")
                .query(Integer.class)
                .single();
    }

    /** Under the lock; returns the new version's number. */
    int add(Policy policy, String by, Instant at) {
        int number = 1
                + jdbc.sql("select max(number) from policy_version")
                        .query(Integer.class)
                        .single();
        jdbc.sql("""
                        insert into policy_version (number, limit_fraction, ramp_line, ramp_target_fraction,
                            ramp_low_fraction, ramp_high_fraction, catch_quantile, horizon_years, tolerance,
                            steadiness_cap, carry_over, payback, set_aside_subsistence, set_aside_angling,
                            set_aside_research, set_aside_other, rounding_share, rounding_least_kg, watch_from,
                            strained_from, critical_from, pooled, interval_probability, created_at, created_by)
                        values (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)""")
                .params(number, policy.limitFraction())
                .params(List.of(
                        policy.ramp().line().name(),
                        policy.ramp().targetFraction(),
                        policy.ramp().lowFraction(),
                        policy.ramp().highFraction()))
                .params(policy.quantile(), policy.horizonYears(), policy.tolerance(), policy.steadinessCap())
                .params(policy.lastSeason().carryOver(), policy.lastSeason().payback())
                .params(policy.setAsides().subsistence(), policy.setAsides().angling())
                .params(policy.setAsides().research(), policy.setAsides().other())
                .params(policy.rounding().share(), policy.rounding().leastKilograms())
                .params(policy.standing().watchFrom(), policy.standing().strainedFrom())
                .params(policy.standing().criticalFrom(), policy.pooled(), policy.intervalProbability())
                .params(at.atOffset(ZoneOffset.UTC), by)
                .update();
        return number;
    }

    void decide(int number, String act, String by, Instant at, String reason) {
        jdbc.sql("insert into policy_act (policy_number, act, decided_at, decided_by, reason) values (?, ?, ?, ?, ?)")
                .params(number, act, at.atOffset(ZoneOffset.UTC), by, reason)
                .update();
    }

    private static Policy policy(ResultSet row) throws SQLException {
        return new Policy(
                row.getDouble("limit_fraction"),
                new Policy.Ramp(
                        Policy.Line.valueOf(row.getString("ramp_line")),
                        row.getDouble("ramp_target_fraction"),
                        row.getDouble("ramp_low_fraction"),
                        row.getDouble("ramp_high_fraction")),
                row.getDouble("catch_quantile"),
                row.getInt("horizon_years"),
                row.getDouble("tolerance"),
                row.getDouble("steadiness_cap"),
                new Policy.LastSeason(row.getDouble("carry_over"), row.getDouble("payback")),
                new Policy.SetAsides(
                        row.getDouble("set_aside_subsistence"),
                        row.getDouble("set_aside_angling"),
                        row.getDouble("set_aside_research"),
                        row.getDouble("set_aside_other")),
                new Policy.Rounding(row.getDouble("rounding_share"), row.getDouble("rounding_least_kg")),
                new Policy.CutPoints(
                        row.getDouble("watch_from"), row.getDouble("strained_from"), row.getDouble("critical_from")),
                row.getBoolean("pooled"),
                row.getDouble("interval_probability"));
    }
}
