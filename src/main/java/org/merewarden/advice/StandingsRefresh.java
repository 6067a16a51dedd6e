package org.merewarden.advice;

import java.util.List;
import org.merewarden.jobs.JobHandler;
import org.merewarden.jobs.Jobs;
import org.merewarden.jobs.RunningJob;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.springframework.stereotype.Service;

/**
 * Judges every stock anew after a version of the rule was adopted. Judging twice changes nothing, so a run whose process
 * died starts from its beginning.
 */
@Service
class StandingsRefresh implements JobHandler {
    static final String KIND = "standings";

    private final Jobs jobs;
    private final Register register;
    private final PolicyStore policies;
    private final StandingKeeper standings;

    StandingsRefresh(Jobs jobs, Register register, PolicyStore policies, StandingKeeper standings) {
        this.jobs = jobs;
        this.register = register;
        this.policies = policies;
        this.standings = standings;
    }

    /** In the transaction of the adoption: the job is there when the version is in force, and only then. */
    void queue(int policyNumber) {
        jobs.submit(KIND, "standings by policy version " + policyNumber, Integer.toString(policyNumber));
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
