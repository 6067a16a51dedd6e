package org.merewarden.core.inference.statespace;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Objects;
import java.util.SplittableRandom;
import java.util.stream.Stream;
import org.merewarden.core.evidence.AreaRecord;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.evidence.EventRecord;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.evidence.Traits;

/** Evidence for the tests of this package. */
final class Cases {
    final List<CatchRecord> catches = new ArrayList<>();
    final List<EffortRecord> effort = new ArrayList<>();
    final List<SurveyRecord> surveys = new ArrayList<>();
    final List<EventRecord> events = new ArrayList<>();
    final List<AreaRecord> areas = new ArrayList<>();
    final List<PriorRecord> priors = new ArrayList<>();

    /** Catches in thousand t stand as t; index at the start of the year (Polacheck et al. 1993, published). */
    static Cases albacore(double catchCv) {
        Cases cases = new Cases();
        for (String line : lines("series_south_atlantic_albacore.csv")) {
            double[] row =
                    Stream.of(line.split(",")).mapToDouble(Double::parseDouble).toArray();
            cases.caught((int) row[0], row[1], catchCv).index("longline", (int) row[0], 0, row[2]);
        }
        return cases;
    }

    /** The priors of the long general-purpose run on the project's own model. */
    static Cases albacoreReference() {
        return albacore(0.1)
                .own("fmsy", 0.35 / 2, 0.5)
                .own("msy_t", 23, 0.8)
                .own("process_sd", 0.1, 0.4)
                .own("observation_sd", 0.2, 0.4)
                .own("harvest_sd", 0.3, 0)
                .own("biomass_fraction_at_start", 0.9, 0.25)
                .own("first_harvest_rate", 0.12, 0.8)
                .own("catchability", 1, 2);
    }

    /** Eight seasons with everything that may happen: every kind of observation, event and gap. */
    static Cases everything() {
        Cases cases = new Cases();
        double[] taken = {12, 15, 0, 9, 11, 14, 7, 6};
        for (int t = 0; t < 8; t++) {
            int year = 2010 + t;
            if (t != 3) {
                cases.caught(year, taken[t], 0.15).caught(year, 0.3 * taken[t], 0.4);
            }
            cases.index("nets", year, 0.5, t == 6 ? 0 : 2 + 0.2 * t);
            if (t % 2 == 0) {
                cases.index("sonar", year, t == 2 ? 1 : 0, 300 - 20 * t);
            }
            if (t > 0) {
                cases.effort.add(new EffortRecord(year, "boats", 20 + 3 * t, null));
            }
        }
        cases.surveys.add(new SurveyRecord(2013, "marked", 0.3, true, 140, 0.3, null));
        cases.events.add(new EventRecord("k", 2012, "fish kill", 0.1, 0.2, 0.4, null, null));
        cases.events.add(new EventRecord("s", 2013, "stocking", null, null, null, 12.0, 2014));
        cases.events.add(new EventRecord("r", 2014, "closure", null, 2.5, null, null, null));
        cases.events.add(new EventRecord("c", 2015, "closure", null, null, null, null, null));
        cases.catches.removeIf(c -> c.year() == 2015);
        cases.areas.add(new AreaRecord(2012, 2500));
        cases.areas.add(new AreaRecord(2013, 2800));
        return cases.own("msy_t", 25, 0.6).own("fmsy", 0.25, 0.4);
    }

    static List<String> lines(String file) {
        try (InputStream in = Objects.requireNonNull(Cases.class.getResourceAsStream("/reference/" + file), file)) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8)
                    .lines()
                    .skip(1)
                    .toList();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    Cases caught(int year, double tonnes, Double cv) {
        String sector =
                "sector " + catches.stream().filter(c -> c.year() == year).count();
        catches.add(new CatchRecord(year, sector, tonnes, cv, 1));
        return this;
    }

    Cases index(String series, int year, double timeOfYear, double value) {
        surveys.add(new SurveyRecord(year, series, timeOfYear, false, value, null, null));
        return this;
    }

    Cases own(String parameter, double median, double logSd) {
        priors.removeIf(p -> p.parameter().equals(parameter));
        priors.add(new PriorRecord(parameter, "", median, logSd, "test"));
        return this;
    }

    Evidence evidence() {
        Habitat lake = new Habitat("lake", 3000, null, null, null, null, 2);
        Traits wild = new Traits("FPP", false, null, null, null, null, null);
        return new Evidence(lake, wild, catches, effort, surveys, events, areas, priors);
    }

    /** Hidden states near what the data suggest, well inside the model's range. */
    static double[] states(StateDensity density, SplittableRandom random) {
        double[] z = new double[density.size];
        for (int i = 0; i < 2 * density.seasons; i += 2) {
            z[i] = -0.6 + 0.3 * random.nextGaussian();
            z[i + 1] = -1.8 + 0.5 * random.nextGaussian();
        }
        for (int i = 2 * density.seasons; i < z.length; i++) {
            z[i] = -1.5 + random.nextGaussian();
        }
        return z;
    }
}
