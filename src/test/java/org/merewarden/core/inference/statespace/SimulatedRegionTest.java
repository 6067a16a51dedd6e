package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVRecord;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.merewarden.command.CommandLine;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.PriorRecord;
import org.merewarden.core.evidence.SurveyRecord;
import org.merewarden.core.inference.statespace.Simulated.Regime;

/**
 * A simulated region with known truth, from files through the command line: 200 stocks of all kinds of evidence, written
 * as tables, assessed, and the truth looked for in the results' 90 % intervals.
 *
 * <p>It stands in the interval of 85 to 95 % of the 200 for MSY, FMSY and present B/BMSY. An exact engine leaves that with
 * probability 0.014 (binomial), for one of the three in 4 of 100 choices of seeds; the seeds are fixed. In the group of
 * the long calibrations.
 */
@Tag("calibration")
class SimulatedRegionTest {
    private static final int STOCKS = 200;
    private static final String[] QUANTITIES = {"msy_t", "fmsy", "b_over_bmsy"};

    @TempDir
    Path folder;

    private final Map<String, List<String>> tables = new HashMap<>(Map.of(
            "stocks", new ArrayList<>(List.of("water_body,species")),
            "catches", new ArrayList<>(List.of("water_body,species,year,catch_t,cv")),
            "surveys", new ArrayList<>(List.of("water_body,species,year,series,time_of_year,kind,value,cv")),
            "priors", new ArrayList<>(List.of("water_body,species,parameter,median,log_sd"))));

    @Test
    void theTruthIsInTheIntervalsOfTheResults() throws IOException {
        Map<String, double[]> truths = new HashMap<>();
        for (int i = 0; i < STOCKS; i++) {
            Simulated stock = Simulated.of(Regime.values()[i % Regime.values().length], 9_000_000L + i);
            String lake = "lake-" + i;
            truths.put(lake, stock.truth());
            add(lake, stock);
        }
        for (Map.Entry<String, List<String>> table : tables.entrySet()) {
            Files.write(folder.resolve(table.getKey() + ".csv"), table.getValue());
        }
        Path results = folder.resolve("results.csv");
        PrintStream silent = new PrintStream(PrintStream.nullOutputStream(), true, StandardCharsets.UTF_8);
        int status = CommandLine.run(List.of("assess", folder.toString(), "--out", results.toString()), silent, silent);

        assertThat(status).isEqualTo(CommandLine.SETTLED);
        int[] inside = inside(results, truths);
        for (int q = 0; q < QUANTITIES.length; q++) {
            System.out.printf("region of %d: %s inside for %d%n", STOCKS, QUANTITIES[q], inside[q]);
            assertThat(inside[q]).as(QUANTITIES[q]).isBetween(85 * STOCKS / 100, 95 * STOCKS / 100);
        }
    }

    private void add(String lake, Simulated stock) {
        String key = lake + ",FPP,";
        tables.get("stocks").add(lake + ",FPP");
        for (CatchRecord c : stock.evidence.catches()) {
            tables.get("catches").add(key + c.year() + "," + c.catchTonnes() + "," + c.cv());
        }
        for (SurveyRecord s : stock.evidence.surveys()) {
            String kind = s.absoluteBiomass() ? "biomass" : "index";
            String cv = s.cv() == null ? "" : Double.toString(s.cv());
            tables.get("surveys")
                    .add(key + s.year() + "," + s.series() + "," + s.timeOfYear() + "," + kind + "," + s.value() + ","
                            + cv);
        }
        for (PriorRecord p : stock.evidence.priors()) {
            tables.get("priors").add(key + p.parameter() + "," + p.median() + "," + p.logSd());
        }
    }

    /** Of each quantity, in how many stocks the truth lies between the 5 and the 95 % quantile. */
    private static int[] inside(Path results, Map<String, double[]> truths) throws IOException {
        int[] inside = new int[QUANTITIES.length];
        CSVFormat format = CSVFormat.RFC4180
                .builder()
                .setHeader()
                .setSkipHeaderRecord(true)
                .get();
        String coming = Integer.toString(Simulated.LAST + 1);
        try (var rows = format.parse(Files.newBufferedReader(results))) {
            for (CSVRecord row : rows) {
                for (int q = 0; q < QUANTITIES.length; q++) {
                    boolean wanted = row.get("quantity").equals(QUANTITIES[q])
                            && List.of("", coming).contains(row.get("year"));
                    double truth = truths.get(row.get("water_body"))[q];
                    if (wanted
                            && Double.parseDouble(row.get("q05")) <= truth
                            && truth <= Double.parseDouble(row.get("q95"))) {
                        inside[q]++;
                    }
                }
            }
        }
        return inside;
    }
}
