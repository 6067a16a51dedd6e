package org.merewarden.advice;

import java.util.List;
import org.merewarden.jobs.JobHandler;
import org.merewarden.jobs.JobView;
import org.merewarden.jobs.Jobs;
import org.merewarden.jobs.RunningJob;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/**
 * Judges every stock anew after a version of the rule was adopted, and when the limits of a new season come into force. Judging twice changes nothing, so a run whose process
 * died starts from its beginning.
 */
@Service
class StandingsRefresh implements JobHandler {
    static final String KIND = "standings";

    private final Jobs jobs;
    private final Register register;
    private final PolicyStore policies;
    private final StandingKeeper standings;
    private final Limits limits;

    StandingsRefresh(Jobs jobs, Register register, PolicyStore policies, StandingKeeper standings, Limits limits) {
        this.jobs = jobs;
        this.register = register;
        this.policies = policies;
        this.standings = standings;
        this.limits = limits;
    }

    /** In the transaction of the adoption: the job is there when the version is in force, and only then. */
    void queue(int policyNumber) {
        jobs.submit(KIND, "standings by policy version " + policyNumber, Integer.toString(policyNumber));
    }

    /** Queues the job where standings are still against the limits of a season that has passed. */
    @Transactional
    public void turnOfSeason() {
        int season = limits.presentSeason();
        boolean passed = standings.all().stream().anyMatch(standing -> standing.season() < season);
        boolean queued = jobs.recent(KIND, 1).stream().anyMatch(JobView::active);
        if (passed && !queued) {
            jobs.submit(KIND, "standings of season " + season, Integer.toString(season));
        }
    }

    @Override
    public String kind() {
        return KIND;
    }

    @Override
    public void run(RunningJob job) {
        List<StockView> stocks = register.stocks();
        PolicyStore.Numbered version;
        do {
            version = policies.inForce();
            for (int i = 0; i < stocks.size(); i++) {
                standings.refresh(stocks.get(i).id(), version.policy());
                job.progress(i + 1, stocks.size(), "");
            }
            // a version adopted meanwhile has a job of its own, which this one may have overtaken with older figures
        } while (version.number() != policies.inForce().number());
    }
}
