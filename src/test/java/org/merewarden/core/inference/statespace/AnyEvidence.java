package org.merewarden.core.inference.statespace;

import java.util.SplittableRandom;
import org.merewarden.core.evidence.AreaRecord;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;

/** Evidence that no lake would give: whatever the records' own checks let pass, in any mixture and size. */
final class AnyEvidence {
    private static final String[] PARAMETERS = {
        "msy_t",
        "fmsy",
        "process_sd",
        "harvest_sd",
        "observation_sd",
        "shape",
        "catchability",
        "first_harvest_rate",
        "biomass_fraction_at_start"
    };
    private static final int FIRST = 1900;

    private final SplittableRandom random;
    private final Cases cases = new Cases();
    final int lastClosedYear;

    AnyEvidence(long seed) {
        random = new SplittableRandom(seed);
        int seasons = 1 + random.nextInt(random.nextInt(4) == 0 ? 120 : 25);
        lastClosedYear = FIRST + seasons - 1 + random.nextInt(12) - 3;
        boolean wild = random.nextBoolean();
        double typical = wild ? power(9) : power(3);
        catches(seasons, typical, wild);
        surveys(seasons, typical, wild);
        effort(seasons);
        events(seasons, typical);
        areas(seasons);
        priors(typical);
    }

    Cases cases() {
        return cases;
    }

    private double power(double decades) {
        return Math.pow(10, decades * (2 * random.nextDouble() - 1));
    }

    private boolean sometimes(double share) {
        return random.nextDouble() < share;
    }

    private Double cv() {
        double[] odd = {0, 1e-9, 0.1, 0.5, 5, 1e6};
        return random.nextBoolean() ? null : (Double) odd[random.nextInt(odd.length)];
    }

    private void catches(int seasons, double typical, boolean wild) {
        double kept = random.nextDouble();
        int sectors = random.nextInt(3);
        for (int t = 0; t < seasons; t++) {
            for (int s = 0; s < sectors; s++) {
                if (sometimes(kept)) {
                    double tonnes = sometimes(0.1) ? 0 : typical * (wild ? power(3) : power(0.3));
                    double reported = sometimes(0.7) ? 1 : 0.001 + 0.999 * random.nextDouble();
                    cases.catches.add(new CatchRecord(FIRST + t, "sector " + s, tonnes, cv(), reported));
                }
            }
        }
    }

    private void surveys(int seasons, double typical, boolean wild) {
        int series = random.nextInt(4);
        for (int j = 0; j < series; j++) {
            boolean absolute = sometimes(0.25);
            double kept = random.nextDouble();
            double unit = absolute ? 5 * typical : power(9);
            double time = sometimes(0.3) ? random.nextInt(2) : random.nextDouble();
            for (int t = 0; t < seasons; t++) {
                if (sometimes(kept)) {
                    double value = sometimes(0.05) ? 0 : unit * (wild ? power(3) : power(0.3));
                    Double nets = sometimes(0.5) ? null : (Double) (double) random.nextInt(4);
                    cases.surveys.add(new SurveyRecord(FIRST + t, "series " + j, time, absolute, value, cv(), nets));
                }
            }
        }
    }

    private void effort(int seasons) {
        double kept = sometimes(0.5) ? 0 : random.nextDouble();
        double unit = power(6);
        for (int t = 0; t < seasons; t++) {
            if (sometimes(kept)) {
                double effort = sometimes(0.1) ? 0 : unit * power(0.5);
                cases.effort.add(new EffortRecord(FIRST + t, "boats", effort, null));
            }
        }
    }

    private void events(int seasons, double typical) {
        int count = random.nextInt(5);
        for (int k = 0; k < count; k++) {
            int year = FIRST + random.nextInt(seasons + 2) - 1;
            switch (random.nextInt(3)) {
                case 0 ->
                    cases.events.add(new EventRecord(
                            "k" + k, year, "fish kill", fraction(), fraction(), fraction(), null, null));
                case 1 -> {
                    Double residual = random.nextBoolean() ? null : (Double) (typical * power(2));
                    cases.events.add(new EventRecord("c" + k, year, "closure", null, residual, null, null, null));
                }
                default -> {
                    Integer into = random.nextBoolean() ? null : (Integer) (year + random.nextInt(3));
                    cases.events.add(
                            new EventRecord("s" + k, year, "stocking", null, null, null, typical * power(4), into));
                }
            }
        }
    }

    private Double fraction() {
        return random.nextBoolean() ? null : (Double) (random.nextBoolean() ? 1.0 : random.nextDouble());
    }

    private void areas(int seasons) {
        int count = random.nextInt(3);
        for (int k = 0; k < count; k++) {
            cases.areas.removeIf(a -> a.year() == FIRST);
            cases.areas.add(new AreaRecord(FIRST + k * random.nextInt(1 + seasons), 3000 * power(2)));
        }
    }

    private void priors(double typical) {
        double[] spreads = {0, 0, 0.01, 0.5, 3};
        for (String parameter : PARAMETERS) {
            if (sometimes(0.3)) {
                double median = parameter.equals("msy_t") ? typical * power(2) : power(2);
                double logSd = spreads[random.nextInt(spreads.length)];
                cases.priors.add(new PriorRecord(parameter, "", median, logSd, "test"));
            }
        }
    }
}
