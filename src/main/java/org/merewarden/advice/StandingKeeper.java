package org.merewarden.advice;

import java.sql.ResultSet;
import java.sql.SQLException;
import java.sql.Types;
import java.time.Clock;
import java.time.OffsetDateTime;
import java.time.ZoneOffset;
import java.util.List;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentStored;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.StandingRule;
import org.springframework.context.event.EventListener;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/**
 * Keeps every assessed stock's standing: read from the stored draws and the limit in force whenever one of them
 * changes, so that lists need no draws.
 */
@Service
class StandingKeeper implements Standings {
    private static final String LIMIT = "limit";
    private static final String LAST_REMOVALS = "last removals";
    private static final String NONE = "none";

    private final JdbcClient jdbc;
    private final Assessments assessments;
    private final Limits limits;
    private final Clock clock;
    private final PolicyStore policies;

    StandingKeeper(JdbcClient jdbc, Assessments assessments, Limits limits, Clock clock, PolicyStore policies) {
        this.jdbc = jdbc;
        this.assessments = assessments;
        this.limits = limits;
        this.clock = clock;
        this.policies = policies;
    }

    /** The removals against which a stock is judged, and what they are. */
    record Removals(double tonnes, String basis, @Nullable Long limitId) {}

    @EventListener
    void on(AssessmentStored stored) {
        refresh(stored.stockId());
    }

    /** Judges the stock anew; without draws nothing stands, and an earlier standing is taken away. */
    @Transactional
    public void refresh(long stockId) {
        lock(stockId);
        // read behind the lock: whoever adopts a version judges this stock once more, and waits for this to end
        judge(stockId, policies.inForce().policy());
    }

    /** The same by a policy that the caller has read, for many stocks. */
    @Transactional
    public void refresh(long stockId, Policy policy) {
        lock(stockId);
        judge(stockId, policy);
    }

    /** An assessment and a decision at the same moment: the second sees what the first has stored. */
    private void lock(long stockId) {
        jdbc.sql("select id from stock where id = ? for update")
                .param(stockId)
                .query(Long.class)
                .optional();
    }

    private void judge(long stockId, Policy policy) {
        Optional<AssessmentView> latest = assessments.latest(stockId);
        if (latest.isEmpty()) {
            return;
        }
        jdbc.sql("delete from stock_standing where stock_id = ?").param(stockId).update();
        Posterior posterior = assessments.posterior(latest.get().id());
        if (posterior.draws() > 0) {
            int season = limits.presentSeason();
            Removals removals = removals(latest.get(), season);
            insert(latest.get(), season, removals, new StandingRule(policy).judge(posterior, removals.tonnes()));
        }
    }

    /** The limit in force as total removals, else the last assessed season's removals, else none. */
    Removals removals(AssessmentView assessment, int season) {
        Optional<LimitView> limit = limits.inForce(assessment.stockId(), season);
        Double allowed = limit.map(LimitView::amountTonnes).orElse(null);
        if (limit.isPresent() && allowed != null) {
            return new Removals(allowed, LIMIT, limit.get().id());
        }
        Double last = assessment.lastRemovalsTonnes();
        return last == null ? new Removals(0, NONE, null) : new Removals(last, LAST_REMOVALS, null);
    }

    private void insert(AssessmentView assessment, int season, Removals removals, StandingRule.Result result) {
        jdbc.sql("""
                        insert into stock_standing (stock_id, assessment_id, season_year, limit_id, removals_t,
                            removals_basis, standing, mainly_little_known, probability, collapse_probability,
                            below_limit_probability, margin_low, margin, margin_high, margin_negative_probability,
                            tipping_biomass_t, return_time_years, computed_at)
                        values (:stock, :assessment, :season, :limit, :removals, :basis, :standing, :known, :p,
                            :collapse, :below, :marginLow, :margin, :marginHigh, :negative, :tipping, :returnTime,
                            :at)""")
                .param("stock", assessment.stockId())
                .param("assessment", assessment.id())
                .param("season", season)
                .param("limit", removals.limitId(), Types.BIGINT)
                .param("removals", removals.tonnes())
                .param("basis", removals.basis())
                .param("standing", result.standing().name())
                .param("known", result.mainlyLittleKnown())
                .param("p", result.probability())
                .param("collapse", result.collapseProbability())
                .param("below", result.belowLimitProbability())
                .param("marginLow", result.marginLow())
                .param("margin", result.margin())
                .param("marginHigh", result.marginHigh())
                .param("negative", result.marginNegativeProbability())
                .param("tipping", result.tippingBiomassTonnes(), Types.DOUBLE)
                .param("returnTime", result.returnTimeYears(), Types.DOUBLE)
                .param("at", clock.instant().atOffset(ZoneOffset.UTC))
                .update();
    }

    @Override
    public List<StandingView> all() {
        return jdbc.sql("select * from stock_standing")
                .query(StandingKeeper::view)
                .list();
    }

    @Override
    public Optional<StandingView> of(long stockId) {
        return jdbc.sql("select * from stock_standing where stock_id = ?")
                .param(stockId)
                .query(StandingKeeper::view)
                .optional();
    }

    private static StandingView view(ResultSet row, int n) throws SQLException {
        return new StandingView(
                row.getLong("stock_id"),
                row.getLong("assessment_id"),
                row.getInt("season_year"),
                row.getDouble("removals_t"),
                row.getString("removals_basis"),
                row.getString("standing"),
                row.getBoolean("mainly_little_known"),
                row.getDouble("probability"),
                row.getDouble("collapse_probability"),
                row.getDouble("below_limit_probability"),
                row.getDouble("margin_low"),
                row.getDouble("margin"),
                row.getDouble("margin_high"),
                row.getDouble("margin_negative_probability"),
                row.getObject("tipping_biomass_t", Double.class),
                row.getObject("return_time_years", Double.class),
                row.getObject("computed_at", OffsetDateTime.class).toInstant());
    }
}
