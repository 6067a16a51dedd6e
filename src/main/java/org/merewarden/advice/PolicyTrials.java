package org.merewarden.advice;

import java.time.Clock;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.jobs.JobHandler;
import org.merewarden.jobs.JobView;
import org.merewarden.jobs.Jobs;
import org.merewarden.jobs.RunningJob;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Who;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/**
 * Puts a version of the rule to every stock, beside the version in force, before anybody adopts it. A run that is taken
 * up again after its process died passes over the stocks that it has stored already.
 */
@Service
class PolicyTrials implements JobHandler {
    static final String KIND = "policy-trial";
    private static final Logger LOG = LoggerFactory.getLogger(PolicyTrials.class);

    private final Jobs jobs;
    private final Register register;
    private final Limits limits;
    private final PolicyStore policies;
    private final PolicyTrialStore store;
    private final PolicyTrialRule rule;
    private final ActivityLog activity;
    private final Clock clock;

    PolicyTrials(
            Jobs jobs,
            Register register,
            Limits limits,
            PolicyStore policies,
            PolicyTrialStore store,
            PolicyTrialRule rule,
            ActivityLog activity,
            Clock clock) {
        this.jobs = jobs;
        this.register = register;
        this.limits = limits;
        this.policies = policies;
        this.store = store;
        this.rule = rule;
        this.activity = activity;
        this.clock = clock;
    }

    /**
     * Queues a trial of the version against the one in force.
     *
     * @throws NotAllowed where the version is in force itself or its trial is under way
     */
    @Transactional
    public void start(int number) {
        policies.lock();
        List<PolicyVersion> all = policies.all();
        PolicyVersion version = Policies.find(all, number);
        int against = Policies.inForce(all).number();
        if (version.inForce()) {
            throw new NotAllowed("policy.trial.inForce");
        }
        if (store.latest(number)
                .flatMap(t -> jobs.find(t.jobId()))
                .filter(JobView::active)
                .isPresent()) {
            throw new NotAllowed("policy.trial.underWay");
        }
        String subject = "policy version " + number + " against version " + against;
        store.add(jobs.submit(KIND, subject, Integer.toString(number)), number, against, Who.name(), clock.instant());
        activity.record("asked for policy trial", subject, null, null);
    }

    @Override
    public String kind() {
        return KIND;
    }

    @Override
    public void run(RunningJob job) {
        PolicyTrialStore.Trial trial = store.ofJob(job.id());
        List<PolicyVersion> all = policies.all();
        var versions = new Versions(numbered(all, trial.number()), numbered(all, trial.against()));
        List<StockView> stocks = register.stocks();
        Map<Long, LimitView> now = limits.inForce(limits.presentSeason()).stream()
                .collect(Collectors.toMap(LimitView::stockId, Function.identity()));
        Set<Long> stored = store.storedStocks(trial.id());
        int failed = 0;
        for (int i = 0; i < stocks.size() && !job.cancelRequested(); i++) {
            long stock = stocks.get(i).id();
            if (!stored.contains(stock) && !tried(job, trial, stock, now.get(stock), versions)) {
                failed++;
            }
            job.progress(
                    i + 1,
                    stocks.size(),
                    failed == 0 ? "" : failed + " failed unexpectedly; see the log for job " + job.id() + ".");
        }
    }

    private record Versions(PolicyStore.Numbered here, PolicyStore.Numbered against) {}

    private static PolicyStore.Numbered numbered(List<PolicyVersion> all, int number) {
        return new PolicyStore.Numbered(number, Policies.find(all, number).policy());
    }

    /** One stock's failure must not keep the others waiting; it is counted on the page and kept in the log. */
    private boolean tried(
            RunningJob job, PolicyTrialStore.Trial trial, long stock, @Nullable LimitView now, Versions versions) {
        try {
            Optional<PolicyTrialRule.Trial> here = rule.recommend(stock, versions.here());
            Optional<PolicyTrialRule.Trial> against = rule.recommend(stock, versions.against());
            PolicyTrialStore.Both both = here.isPresent() && against.isPresent()
                    ? new PolicyTrialStore.Both(here.get(), against.get())
                    : null;
            store.add(trial.id(), new PolicyTrialStore.Row(stock, now == null ? null : now.amountTonnes(), both));
            return true;
        } catch (RuntimeException e) {
            LOG.error("trial of policy version {} on stock {} failed in job {}", trial.number(), stock, job.id(), e);
            return false;
        }
    }
}
