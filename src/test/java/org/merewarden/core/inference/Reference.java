package org.merewarden.core.inference;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import java.util.SplittableRandom;
import java.util.stream.Stream;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.evidence.Traits;

/** Published series and a builder of evidence for the tests of this package. */
final class Reference {
    static final Habitat LAKE = new Habitat("lake", 3000, null, null, null, null, 2);
    static final Traits WILD = new Traits("FPP", false, null, null, null, null, null);

    final List<CatchRecord> catches = new ArrayList<>();
    final List<EffortRecord> effort = new ArrayList<>();
    final List<SurveyRecord> surveys = new ArrayList<>();
    final List<EventRecord> events = new ArrayList<>();
    final List<PriorRecord> priors = new ArrayList<>();
    Habitat habitat = LAKE;
    Traits traits = WILD;

    /** Rows of a reference file without its header. */
    static double[][] rows(String file) {
        try (InputStream in = Objects.requireNonNull(Reference.class.getResourceAsStream("/reference/" + file), file)) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8)
                    .lines()
                    .skip(1)
                    .map(line -> Stream.of(line.split(","))
                            .mapToDouble(Double::parseDouble)
                            .toArray())
                    .toArray(double[][]::new);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Catches in thousand t stand as t here; index at the start of the year. */
    static Reference albacore() {
        Reference reference = new Reference();
        for (double[] row : rows("series_south_atlantic_albacore.csv")) {
            reference.caught((int) row[0], row[1]).index("longline", (int) row[0], 0, row[2]);
        }
        return reference;
    }

    static Reference effortSeries(String file) {
        Reference reference = new Reference();
        for (double[] row : rows(file)) {
            reference.caught((int) row[0], row[1]);
            reference.effort.add(new EffortRecord((int) row[0], "boats", row[2], null));
        }
        return reference;
    }

    Reference caught(int year, double tonnes) {
        catches.add(new CatchRecord(year, "commercial", tonnes, null, 1));
        return this;
    }

    Reference index(String series, int year, double timeOfYear, double value) {
        surveys.add(new SurveyRecord(year, series, timeOfYear, false, value, null, null));
        return this;
    }

    Reference biomass(int year, double timeOfYear, double tonnes, double cv) {
        surveys.add(new SurveyRecord(year, "marked", timeOfYear, true, tonnes, cv, null));
        return this;
    }

    Reference own(String parameter, double median, double logSd) {
        priors.add(new PriorRecord(parameter, "", median, logSd, "test"));
        return this;
    }

    Reference kill(int year, double fraction) {
        events.add(new EventRecord("k" + year, year, "fish kill", null, fraction, null, null, null));
        return this;
    }

    Reference closed(int year, Double residual) {
        events.add(new EventRecord("c" + year, year, "closure", null, residual, null, null, null));
        return this;
    }

    Reference stocked(int year, double tonnes) {
        events.add(new EventRecord("s" + year, year - 1, "stocking", null, null, null, tonnes, year));
        return this;
    }

    Evidence evidence() {
        return new Evidence(habitat, traits, catches, effort, surveys, events, List.of(), priors);
    }

    /**
     * Thirty seasons of a stock with r 0.5 and K 1000 under catches that rise and fall, and an index without noise at
     * mid-season; written out here independently of the code under test.
     */
    static Reference simulated(double killedIn10, double stockedIn15) {
        Reference reference = new Reference();
        double b = 1000;
        for (int t = 0; t < 30; t++) {
            double c = t < 12 ? 20 + 12 * t : Math.max(20, 160 - 17 * (t - 12));
            double plus = (b + (t == 15 ? stockedIn15 : 0)) * (1 - (t == 10 ? killedIn10 : 0));
            double next = plus + 0.5 * plus * (1 - plus / 1000) - c;
            reference.caught(1990 + t, c).index("gill nets", 1990 + t, 0.5, 0.02 * Math.sqrt(plus * next));
            b = next;
        }
        return reference;
    }

    /** Forty seasons with fishing that rises to 0.9 r and falls, process error 0.1, index error 0.2. */
    static Reference noisy(double r, double capacity, SplittableRandom random) {
        Reference reference = new Reference();
        double b = capacity;
        for (int t = 0; t < 40; t++) {
            double f = 0.9 * r * (t < 20 ? t / 20.0 : 1 - 0.8 * (t - 20) / 20.0);
            double c = f * Math.exp(0.2 * random.nextGaussian()) * b;
            double next = (b + r * b * (1 - b / capacity) - c) * Math.exp(0.1 * random.nextGaussian());
            reference
                    .caught(1985 + t, c)
                    .index("gill nets", 1985 + t, 0.5, Math.sqrt(b * next) * Math.exp(0.2 * random.nextGaussian()));
            b = next;
        }
        return reference;
    }
}
