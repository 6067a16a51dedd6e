package org.merewarden.command;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.stream.IntStream;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVRecord;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.statespace.StateSpaceAssessor;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.policy.EarlierSeason;
import org.merewarden.core.policy.LimitRule;
import org.merewarden.core.policy.Policy;
import org.merewarden.core.policy.Recommendation;
import org.merewarden.records.FolderEvidence;

/** Limits from a folder of tables, without leaving the process. */
class AdviseTest {
    private static final String CATCHES = "water_body,species,year,catch_t\n"
            + "mere,FPE,2018,6\nmere,FPE,2019,5\nmere,FPE,2020,4\nmere,FPE,2021,5\n";

    @TempDir
    Path folder;

    @TempDir
    Path results;

    private final ByteArrayOutputStream out = new ByteArrayOutputStream();
    private final ByteArrayOutputStream err = new ByteArrayOutputStream();

    private int run(String... words) {
        return CommandLine.run(
                List.of(words),
                new PrintStream(out, true, StandardCharsets.UTF_8),
                new PrintStream(err, true, StandardCharsets.UTF_8));
    }

    private List<CSVRecord> advise() throws IOException {
        Path limits = results.resolve("limits.csv");
        int status = run("advise", folder.toString(), "--out", limits.toString());
        assertThat(status).as(err.toString(StandardCharsets.UTF_8)).isIn(0, 3);
        return read(limits);
    }

    private static List<CSVRecord> read(Path file) throws IOException {
        try (var parser = CSVFormat.RFC4180
                .builder()
                .setHeader()
                .setSkipHeaderRecord(true)
                .get()
                .parse(Files.newBufferedReader(file))) {
            return parser.getRecords();
        }
    }

    private void table(String name, String text) throws IOException {
        Files.writeString(folder.resolve(name + ".csv"), text);
    }

    private static double number(CSVRecord row, String column) {
        return Double.parseDouble(row.get(column));
    }

    @Test
    void theDemonstrationRegionGivesTheSameBytesForAnyNumberOfThreads() throws IOException {
        Path one = results.resolve("one.csv");
        Path two = results.resolve("two.csv");
        int status = run("advise", "db-seed", "--out", one.toString(), "--threads", "1");
        assertThat(run("advise", "db-seed", "--out", two.toString(), "--threads", "2"))
                .isEqualTo(status);
        assertThat(Files.readAllBytes(two)).isEqualTo(Files.readAllBytes(one));
        List<CSVRecord> rows = read(one);
        assertThat(rows).hasSize(30).allMatch(r -> r.get("season").equals("2026"));
        for (CSVRecord row : rows) {
            if (!row.get("limit_t").isEmpty() && !row.get("ceiling_t").isEmpty()) {
                assertThat(number(row, "limit_t")).isLessThanOrEqualTo(number(row, "ceiling_t"));
                assertThat(number(row, "below_limit_chance")).isLessThanOrEqualTo(0.1);
            }
            assertThat(row.toString()).doesNotContain("NaN").doesNotContain("Infinity");
        }
        // db-seed/limits.csv: 5.5 t for 2025, 4 t for 2026; the season before the one advised counts
        assertThat(rows.stream()
                        .filter(r -> r.get("water_body").equals("skelder-water")
                                && r.get("species").equals("FPE")))
                .singleElement()
                .satisfies(r -> assertThat(number(r, "earlier_limit_t")).isEqualTo(5.5));
        assertThat(out.toString(StandardCharsets.UTF_8))
                .contains("season 2026")
                .contains("reviewed by a qualified fisheries scientist");
    }

    @Test
    void theRowIsTheRulesWorking() throws IOException {
        table("stocks", "water_body,species\nmere,FPE\n");
        table("catches", CATCHES);
        table("limits", "water_body,species,season,issued_on,amount\nmere,FPE,2021,2020-12-01,4\n");
        CSVRecord row = advise().get(0);

        FolderEvidence read = FolderEvidence.read(folder);
        var evidence = read.stocks().get(0).evidence();
        Posterior posterior = new StateSpaceAssessor().assess(evidence, 2021, evidence.seed());
        Outlook outlook = new Outlook(posterior, List.of(), 10, 0.2, 0, evidence.seed() + 2022);
        Recommendation expected = new LimitRule(Policy.DEFAULT).recommend(outlook, new EarlierSeason(4, 5));
        assertThat(number(row, "limit_t")).isEqualTo(expected.limitTonnes());
        assertThat(number(row, "earlier_limit_t")).isEqualTo(4);
        assertThat(number(row, "earlier_removals_t")).isEqualTo(5);
        assertThat(number(row, "below_limit_chance")).isCloseTo(expected.risk(), within(1e-9));
    }

    /** Of two papers for one season the later counts; effort limits hold no tonnes. */
    @Test
    void theLatestPaperCounts() throws IOException {
        table("stocks", "water_body,species\nmere,FPE\n");
        table("catches", CATCHES);
        table("limits", """
                water_body,species,season,issued_on,kind,amount,unit
                mere,FPE,2021,2021-06-01,catch,3,t
                mere,FPE,2021,2020-12-01,catch,4,t
                mere,FPE,2020,2019-12-01,effort,100,net-nights
                """);
        FolderEvidence read = FolderEvidence.read(folder);
        var stock = read.stocks().get(0);
        assertThat(read.limit(stock, 2021)).hasValue(3);
        assertThat(read.limit(stock, 2020)).isEmpty();
        assertThat(read.limit(stock, 2019)).isEmpty();
    }

    @Test
    void badLimitsAreNamedAndNothingIsWritten() throws IOException {
        table("stocks", "water_body,species\nmere,FPE\n");
        table("catches", CATCHES);
        table("limits", "water_body,species,season,issued_on,amount,unit\nmere,FPE,2021,2020-12-01,4,kg\n");
        Path limits = results.resolve("l.csv");
        assertThat(run("advise", folder.toString(), "--out", limits.toString())).isEqualTo(CommandLine.UNUSABLE);
        assertThat(err.toString(StandardCharsets.UTF_8))
                .contains("limits.csv, line 2, column unit, “kg”: a catch limit is in t");
        assertThat(limits).doesNotExist();
    }

    @Test
    void resultsAreNotLeftWhereTheyWouldBeReadAsATable() throws IOException {
        table("stocks", "water_body,species\nmere,FPE\n");
        table("catches", CATCHES);
        assertThat(run(
                        "advise",
                        folder.toString(),
                        "--out",
                        folder.resolve("LIMITS.csv").toString()))
                .isEqualTo(CommandLine.UNUSABLE);
        assertThat(err.toString(StandardCharsets.UTF_8)).contains("would be read as the table limits");
    }

    @Test
    void stocksWithoutEstimatesAndWithoutEvidenceAreToldInTheNote() throws IOException {
        table(
                "stocks",
                "water_body,species,population,recruitment\nmere,FPE,,natural\nmere,FPP,,natural\n"
                        + "mere,FPP,pond,stocked only\n");
        table("catches", CATCHES);
        List<CSVRecord> rows = advise();
        assertThat(IntStream.range(0, 3).mapToObj(i -> rows.get(i).get("note")))
                .satisfiesExactly(
                        own -> assertThat(own).isEmpty(),
                        none -> assertThat(none).contains("provisional ceiling"),
                        stocked -> assertThat(stocked)
                                .contains("nothing is recommended")
                                .contains("not settled"));
        assertThat(rows.get(2).get("limit_t")).isEmpty();
    }
}
