package org.merewarden.core.policy;

import java.util.ArrayList;
import java.util.List;
import java.util.SplittableRandom;
import org.merewarden.core.dynamics.AnnualMap;
import org.merewarden.core.dynamics.ConstantMortality;
import org.merewarden.core.dynamics.SurplusProduction;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.evidence.Traits;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.statespace.StateSpaceAssessor;
import org.merewarden.core.outlook.Outlook;

/**
 * A simulated stock with known truth, fished freely at first and then, season after season, under the limit that the rule
 * recommends from the evidence so far: assess, advise, catch. The limit is taken whole, as far as it is there.
 */
final class ManagedStock {
    /** How much is known. */
    enum Knowledge {
        /** Twenty seasons of catches, an index every season, scatter about 0.2. */
        RICH(20, 1, 0.2),
        /** Eight seasons of catches, an index every fourth season, scatter about 0.5. */
        THIN(8, 4, 0.5);

        final int before;
        final int every;
        final double scatter;

        Knowledge(int before, int every, double scatter) {
            this.before = before;
            this.every = every;
            this.scatter = scatter;
        }
    }

    private static final int FIRST_MANAGED = 2001;
    private static final double CATCH_CV = 0.1;
    private static final Habitat HABITAT = new Habitat("lake", 3000, null, null, null, null, 2);
    private static final Traits TRAITS = new Traits("FPP", false, null, null, null, null, null);

    private final Knowledge knowledge;
    private final Policy policy;
    private final SplittableRandom random;
    private final SurplusProduction law;
    private final double processSd;
    private final double scatter;
    private final double logQ;
    private final List<CatchRecord> catches = new ArrayList<>();
    private final List<SurveyRecord> surveys = new ArrayList<>();
    private final List<Double> states = new ArrayList<>();
    private final List<Double> limits = new ArrayList<>();
    private double biomass;
    private int unsettled;

    /** The first stock of the seed that starts its managed time at or above B lim. */
    static ManagedStock startingAboveLimit(Knowledge knowledge, Policy policy, long seed) {
        SplittableRandom random = new SplittableRandom(seed);
        ManagedStock stock = new ManagedStock(knowledge, policy, random);
        while (stock.biomass < stock.limitBiomass()) {
            stock = new ManagedStock(knowledge, policy, random);
        }
        return stock;
    }

    private ManagedStock(Knowledge knowledge, Policy policy, SplittableRandom random) {
        this.knowledge = knowledge;
        this.policy = policy;
        this.random = random;
        double msy = 50 * Math.exp(0.6 * random.nextGaussian());
        double fmsy = 0.2 * Math.exp(0.5 * random.nextGaussian());
        law = SurplusProduction.fromReferencePoints(msy, fmsy, 1);
        processSd = 0.1 * Math.exp(0.4 * random.nextGaussian());
        double harvestSd = 0.3 * Math.exp(0.5 * random.nextGaussian());
        scatter = knowledge.scatter * Math.exp(0.4 * random.nextGaussian());
        logQ = -3 + 0.5 * random.nextGaussian();
        biomass = law.capacity() * 0.8 * Math.exp(0.3 * random.nextGaussian());
        double l = Math.log(0.15) + random.nextGaussian();
        for (int year = FIRST_MANAGED - knowledge.before; year < FIRST_MANAGED; year++) {
            season(year, Math.exp(l));
            l += harvestSd * random.nextGaussian();
        }
    }

    private void season(int year, double mortality) {
        ConstantMortality flow = new ConstantMortality(law, mortality);
        double taken = flow.removals(biomass, 1) * Math.exp(CATCH_CV * random.nextGaussian());
        catches.add(new CatchRecord(year, "commercial", taken, CATCH_CV, 1));
        if (year % knowledge.every == 0) {
            double index = Math.exp(logQ + scatter * random.nextGaussian()) * flow.after(biomass, 0.5);
            surveys.add(new SurveyRecord(year, "nets", 0.5, false, index, null, null));
        }
        biomass = flow.after(biomass, 1) * Math.exp(processSd * random.nextGaussian());
    }

    /** Runs the managed seasons. */
    ManagedStock manage(int seasons) {
        states.add(biomass / limitBiomass());
        double before = Double.NaN;
        for (int year = FIRST_MANAGED; year < FIRST_MANAGED + seasons; year++) {
            double limit = limit(year, before);
            season(year, new AnnualMap(law).mortality(biomass, limit));
            states.add(biomass / limitBiomass());
            limits.add(limit);
            before = limit;
        }
        return this;
    }

    private double limit(int year, double before) {
        Evidence evidence = evidence();
        Posterior posterior = new StateSpaceAssessor().assess(evidence, year - 1, evidence.seed());
        unsettled += posterior.verdict().settled() ? 0 : 1;
        if (posterior.draws() == 0) {
            return Double.isNaN(before) ? 0 : before;
        }
        Outlook outlook = new Outlook(
                posterior, List.of(), policy.horizonYears(), policy.limitFraction(), 0, evidence.seed() + year);
        return new LimitRule(policy)
                .recommend(
                        outlook,
                        new EarlierSeason(
                                before, catches.get(catches.size() - 1).removalsTonnes()))
                .limitTonnes();
    }

    private Evidence evidence() {
        return new Evidence(
                HABITAT,
                TRAITS,
                catches,
                List.of(),
                surveys,
                List.of(),
                List.of(),
                List.of(
                        new PriorRecord("msy_t", "", 50, 0.6, null),
                        new PriorRecord("fmsy", "", 0.2, 0.5, null),
                        new PriorRecord("observation_sd", "", knowledge.scatter, 0.4, null),
                        new PriorRecord("catchability", "", Math.exp(-3), 0.5, null)));
    }

    double limitBiomass() {
        return policy.limitFraction() * law.capacity();
    }

    /** B/B lim at the start of the first managed season and at the end of each. */
    List<Double> states() {
        return states;
    }

    /** t, by managed season. */
    List<Double> limits() {
        return limits;
    }

    double msy() {
        return law.msy();
    }

    int unsettled() {
        return unsettled;
    }
}
