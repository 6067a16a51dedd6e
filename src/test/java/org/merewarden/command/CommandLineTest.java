package org.merewarden.command;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVRecord;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.inference.statespace.StateSpaceAssessor;
import org.merewarden.records.FolderEvidence;

/** Whole runs, without leaving the process. */
class CommandLineTest {
    private static final Path DEMONSTRATION = Path.of("db-seed");
    private static final String STOCKS = "water_body,species\nmere,FPE\n";
    private static final String CATCHES = "water_body,species,year,catch_t\nmere,FPE,2020,4\nmere,FPE,2021,5\n";

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

    private int assess(String name, String... options) {
        List<String> words = new ArrayList<>(List.of(
                "assess", folder.toString(), "--out", results.resolve(name).toString()));
        words.addAll(List.of(options));
        return run(words.toArray(String[]::new));
    }

    private String told() {
        return err.toString(StandardCharsets.UTF_8);
    }

    private void table(String name, String text) throws IOException {
        Files.writeString(folder.resolve(name + ".csv"), text);
    }

    private List<CSVRecord> rows(String name) throws IOException {
        try (var parser = CSVFormat.RFC4180
                .builder()
                .setHeader()
                .setSkipHeaderRecord(true)
                .get()
                .parse(Files.newBufferedReader(results.resolve(name)))) {
            return parser.getRecords();
        }
    }

    private static double number(List<CSVRecord> rows, String quantity, String year, String column) {
        return rows.stream()
                .filter(r -> r.get("quantity").equals(quantity) && r.get("year").equals(year))
                .mapToDouble(r -> Double.parseDouble(r.get(column)))
                .findFirst()
                .orElseThrow();
    }

    private void nothingIsWritten() throws IOException {
        try (Stream<Path> written = Files.list(results)) {
            assertThat(written).isEmpty();
        }
    }

    @Test
    void theDemonstrationRegionGivesTheSameBytesForAnyNumberOfThreads() throws IOException {
        Path one = results.resolve("one.csv");
        Path three = results.resolve("three.csv");
        int status = run("assess", DEMONSTRATION.toString(), "--out", one.toString(), "--threads", "1");
        assertThat(run("assess", DEMONSTRATION.toString(), "--out", three.toString(), "--threads", "3"))
                .isEqualTo(status);
        assertThat(Files.readAllBytes(three)).isEqualTo(Files.readAllBytes(one));

        List<CSVRecord> rows = rows("one.csv");
        Map<String, Long> stocks = rows.stream()
                .collect(Collectors.groupingBy(
                        r -> r.get("water_body") + " " + r.get("species"), Collectors.counting()));
        assertThat(stocks).hasSize(30);
        boolean settled = rows.stream().allMatch(r -> r.get("verdict").equals("settled"));
        assertThat(status).isEqualTo(settled ? CommandLine.SETTLED : CommandLine.SOME_NOT_SETTLED);
        // the region's files end with 2025
        assertThat(rows.stream()
                        .filter(r -> r.get("quantity").equals("biomass_t")
                                && r.get("year").equals("2026")))
                .hasSize(30);
        assertThat(rows).noneMatch(r -> r.toString().contains("NaN"));
        assertThat(out.toString(StandardCharsets.UTF_8))
                .contains("Last closed season: 2025")
                .contains("skelder-water FPE")
                .contains("reviewed by a qualified fisheries scientist");
        assertThat(told()).contains("stock 30 of 30").contains("landings.csv is passed over");
    }

    /**
     * The medians of the long general-purpose MCMC of reference/SOURCES.md on the same model, priors and data, from tables
     * alone. The reference states its medians as good to about 3 % (r) and 1 % (MSY): ours lie within that and 2 of our
     * standard errors. It states no error of the others; there its 430 effective draws of r, the fewest it names, are taken
     * (our judgement), and ours lie within 2 joint standard errors. The spread is read from its quartiles.
     */
    @Test
    void albacoreFromTablesAgreesWithLongMcmc() throws IOException {
        albacore();
        assertThat(assess("albacore.csv")).isEqualTo(CommandLine.SETTLED);
        List<CSVRecord> rows = rows("albacore.csv");
        double ess = number(rows, "msy_t", "", "ess");
        assertThat(ess).isGreaterThan(400);
        // r = FMSY (1 + n), n = 1
        agrees(2 * number(rows, "fmsy", "", "q50"), 0.351, 0.03 + 2 * error(0.273, 0.444, ess));
        agrees(number(rows, "msy_t", "", "q50"), 20.49, 0.01 + 2 * error(18.77, 22.14, ess));
        double both = 1 / (1 / ess + 1.0 / 430);
        agrees(number(rows, "process_sd", "", "q50"), 0.0679, 2 * error(0.0546, 0.0838, both));
        agrees(number(rows, "observation_sd:longline", "", "q50"), 0.1284, 2 * error(0.1133, 0.1455, both));
        // at the start of 1989, the last season
        agrees(number(rows, "b_over_bmsy", "1989", "q50"), 0.662, 2 * error(0.582, 0.748, both));
    }

    /** Standard error of the logarithm of a median of so many draws with these quartiles, as if lognormal. */
    private static double error(double lower, double upper, double draws) {
        return Math.log(upper / lower) / 1.349 * Math.sqrt(Math.PI / 2 / draws);
    }

    private static void agrees(double median, double reference, double tolerance) {
        assertThat(Math.log(median / reference))
                .as("%s against %s", median, reference)
                .isBetween(-tolerance, tolerance);
    }

    @Test
    void theFileHoldsTheEnginesDraws() throws IOException {
        albacore();
        assess("albacore.csv");
        List<CSVRecord> rows = rows("albacore.csv");
        var evidence = FolderEvidence.read(folder).stocks().get(0).evidence();
        Posterior posterior = new StateSpaceAssessor().assess(evidence, 1989, evidence.seed());
        String msy = ResultsFile.number(Quantiles.of(posterior.msyTonnes(), 0.25));
        String biomass = ResultsFile.number(Arrays.stream(posterior.biomassTonnes())
                .mapToDouble(b -> b[b.length - 1])
                .average()
                .orElseThrow());
        assertThat(rows.stream().filter(r -> r.get("quantity").equals("msy_t")))
                .allMatch(r -> r.get("q25").equals(msy));
        assertThat(rows.stream()
                        .filter(r -> r.get("quantity").equals("biomass_t")
                                && r.get("year").equals("1990")))
                .hasSize(1)
                .allMatch(r -> r.get("mean").equals(biomass));
    }

    @Test
    void anotherSeedIsAnotherSampleOfTheSamePosterior() throws IOException {
        albacore();
        assess("a.csv");
        assess("b.csv", "--seed", "1");
        double first = number(rows("a.csv"), "msy_t", "", "q50");
        double second = number(rows("b.csv"), "msy_t", "", "q50");
        assertThat(second).isNotEqualTo(first).isBetween(0.97 * first, 1.03 * first);
    }

    @Test
    void growthIsAsWishedUnlessTheFolderStatesItsShape() throws IOException {
        albacore();
        assess("logistic.csv");
        assess("gompertz.csv", "--growth", "gompertz");
        assess("fitted.csv", "--growth", "fitted");
        assertThat(number(rows("logistic.csv"), "shape", "", "mean")).isEqualTo(1);
        List<CSVRecord> gompertz = rows("gompertz.csv");
        assertThat(number(gompertz, "shape", "", "q95")).isZero();
        // K = e · BMSY under Gompertz growth (Fox 1970)
        assertThat(number(gompertz, "k_t", "", "mean") / number(gompertz, "bmsy_t", "", "mean"))
                .isBetween(Math.E - 1e-6, Math.E + 1e-6);
        assertThat(number(rows("fitted.csv"), "shape", "", "sd")).isBetween(0.1, 1.0);

        Files.writeString(
                folder.resolve("priors.csv"),
                Files.readString(folder.resolve("priors.csv")) + "stand-in,FPP,shape,,2,0,\n");
        assess("stated.csv", "--growth", "gompertz");
        assertThat(number(rows("stated.csv"), "shape", "", "mean")).isEqualTo(2);
    }

    private void albacore() throws IOException {
        List<String[]> series;
        try (var in = Stream.of(new String(
                        CommandLineTest.class
                                .getResourceAsStream("/reference/series_south_atlantic_albacore.csv")
                                .readAllBytes(),
                        StandardCharsets.UTF_8)
                .split("\n"))) {
            series = in.skip(1).map(l -> l.strip().split(",")).toList();
        }
        table("stocks", "water_body,species\nstand-in,FPP\n");
        table(
                "catches",
                series.stream()
                        .map(r -> "stand-in,FPP," + r[0] + "," + r[1] + ",0.1\n")
                        .collect(Collectors.joining("", "water_body,species,year,catch_t,cv\n", "")));
        table(
                "surveys",
                series.stream()
                        .map(r -> "stand-in,FPP," + r[0] + ",longline,0,index," + r[2] + "\n")
                        .collect(Collectors.joining(
                                "", "water_body,species,year,series,time_of_year,kind,value\n", "")));
        table("priors", """
                water_body,species,parameter,series,median,log_sd,reason
                stand-in,FPP,fmsy,,0.175,0.5,
                stand-in,FPP,msy_t,,23,0.8,
                stand-in,FPP,process_sd,,0.1,0.4,
                stand-in,FPP,observation_sd,,0.2,0.4,
                stand-in,FPP,harvest_sd,,0.3,0,
                stand-in,FPP,biomass_fraction_at_start,,0.9,0.25,
                stand-in,FPP,first_harvest_rate,,0.12,0.8,
                stand-in,FPP,catchability,,1,2,
                """);
    }

    @Test
    void aStockThatCannotBeAssessedHasEmptyRowsAndStatusThree() throws IOException {
        table("stocks", "water_body,species,population,recruitment\nmere,FPE,,natural\nmere,FPP,pond,stocked only\n");
        table("catches", CATCHES);
        assertThat(assess("r.csv")).isEqualTo(CommandLine.SOME_NOT_SETTLED);
        List<CSVRecord> stocked = rows("r.csv").stream()
                .filter(r -> r.get("species").equals("FPP.pond"))
                .toList();
        assertThat(stocked).isNotEmpty().allMatch(r -> r.get("verdict").equals("not-settled"));
        assertThat(stocked)
                .allMatch(r -> r.get("mean").isEmpty() && r.get("ess").isEmpty());
        assertThat(out.toString(StandardCharsets.UTF_8))
                .contains("Not settled: mere FPP.pond")
                .contains("Recruitment comes from stocking alone");
    }

    @Test
    void aMissingFolderOrTableOfStocksIsNamed() throws IOException {
        assertThat(run("assess", folder.resolve("none").toString(), "--out", results + "/r.csv"))
                .isEqualTo(CommandLine.UNUSABLE);
        assertThat(told()).contains("none: there is no such folder");
        table("catches", CATCHES);
        assertThat(assess("r.csv")).isEqualTo(CommandLine.UNUSABLE);
        assertThat(told()).contains("stocks.csv: there is no such file");
        nothingIsWritten();
    }

    @Test
    void tablesAreFoundWhateverTheCaseOfTheirFilesNames() throws IOException {
        Files.writeString(folder.resolve("STOCKS.CSV"), STOCKS);
        Files.writeString(folder.resolve("Water-Bodies.csv"), "code,name,area_ha\nmere,Mere,12\n");
        Files.writeString(folder.resolve("CATCHES.CSV"), CATCHES);
        var read = FolderEvidence.read(folder);
        assertThat(read.remarks()).isEmpty();
        assertThat(read.stocks().get(0).evidence().catches()).hasSize(2);
        assertThat(read.stocks().get(0).evidence().habitat().areaHectares()).isEqualTo(12);
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', textBlock = """
        stocks       | water_body,species,population~mere,FPE,süd    | stocks.csv, line 2, “byte FC”: not UTF-8
        stocks       | water_body,species~mere,XXX                   | stocks.csv, line 2, column species, “XXX”
        stocks       | water_body~mere                               | stocks.csv, line 1: the table stocks needs
        stocks       | water_body,species                            | stocks.csv: there is no row below the header
        water-bodies | code,name,area_ha~mere,Südmere,12             | water-bodies.csv, line 2, “byte FC”: not UTF-8
        water-bodies | code,name,area_ha                             | water-bodies.csv: there is no row below the header
        """)
    void whereTheRegisterIsUnusableItAloneIsTold(String name, String text, String message) throws IOException {
        table("stocks", STOCKS);
        table("catches", CATCHES);
        Files.writeString(folder.resolve(name + ".csv"), text.replace('~', '\n') + "\n", StandardCharsets.ISO_8859_1);
        assertThat(assess("r.csv")).isEqualTo(CommandLine.UNUSABLE);
        assertThat(told().strip()).startsWith(message).hasLineCount(1);
        nothingIsWritten();
    }

    @Test
    void twoFilesOfOneTableAreRefused() throws IOException {
        table("stocks", STOCKS);
        table("catches", CATCHES);
        Files.writeString(folder.resolve("CATCHES.CSV"), CATCHES);
        assertThat(assess("r.csv")).isEqualTo(CommandLine.UNUSABLE);
        assertThat(told().strip())
                .isEqualTo(
                        "CATCHES.CSV and catches.csv: both are the table catches; a folder has one file of each table");
        nothingIsWritten();
    }

    @Test
    void aWorkbookIsToldAndPassedOver() throws IOException {
        table("stocks", STOCKS);
        table("catches", CATCHES);
        Files.writeString(folder.resolve("SURVEYS.XLSX"), "");
        assertThat(FolderEvidence.read(folder).remarks())
                .singleElement()
                .asString()
                .startsWith("SURVEYS.XLSX is passed over");
    }

    @Test
    void aFolderWithoutAnySeasonIsRefused() throws IOException {
        table("stocks", STOCKS);
        assertThat(assess("r.csv")).isEqualTo(CommandLine.UNUSABLE);
        assertThat(told()).contains("no catch, effort or survey is recorded");
        nothingIsWritten();
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', textBlock = """
        catches | water_body,species,year,catch_t~mere,FPE,2020,4~mere,FPE,2021,much    | catches.csv, line 3, column catch_t, “much”: a number such as 12.4 is needed
        catches | water_body,species,year,catch_t~mere,FPE,2020,-1                      | catches.csv, line 2, column catch_t, “-1”: must lie between 0 and
        catches | water_body,species,year,catch_t~mere,FPI,2020,4                       | catches.csv, line 2, column species, “FPI”: the water body “mere” has no stock of species “FPI”
        catches | water_body,species,year,catch_t~fen,FPE,2020,4                        | catches.csv, line 2, column water_body, “fen”: no water body has the code “fen”
        catches | water_body,species,year,catch_t~mere,FPE,2020,4~mere,FPE,2020,5       | catches.csv, line 3, column water_body, species, population, year, sector, “mere, FPE, , 2020, commercial”: the same key as line 2
        catches | water_body,species,year~mere,FPE,2020                                 | catches.csv, line 1: the table catches needs the columns catch_t
        surveys | water_body,species,year,series,kind,value~mere,FPE,2020,s,biomass,9   | surveys.csv, line 2, column cv: a biomass needs its cv
        events  | key,water_body,year,kind,low,likely,high~k,mere,2020,fish kill,0.5,0.4,0.6 | events.csv, line 2, column likely, “0.4”: needs low ≤ likely ≤ high
        events  | key,water_body,year,kind~k,fen,2020,closure                           | events.csv, line 2, column water_body, “fen”
        areas   | water_body,year,area_ha~fen,2020,12                                   | areas.csv, line 2, column water_body, “fen”
        priors  | water_body,species,parameter,median,log_sd~mere,FPE,colour,1,1        | priors.csv, line 2, column parameter, “colour”: must be one of
        stocks  | water_body,species~mere,XXX                                           | stocks.csv, line 2, column species, “XXX”: no species has the code “XXX”
        water-bodies | code,name,area_ha~fen,Fen,12                                     | stocks.csv, line 2, column water_body, “mere”: no water body has the code “mere”
        """)
    void anUnusableTableIsToldWithFileLineColumnValueAndRule(String name, String text, String message)
            throws IOException {
        table("stocks", STOCKS);
        table("catches", CATCHES);
        table(name, text.replace('~', '\n') + "\n");
        assertThat(assess("r.csv")).isEqualTo(CommandLine.UNUSABLE);
        assertThat(told()).contains(message);
        nothingIsWritten();
    }

    @Test
    void anUnusableFolderLeavesEarlierResults() throws IOException {
        Files.writeString(results.resolve("r.csv"), "earlier");
        table("stocks", STOCKS);
        table("catches", CATCHES + "mere,FPE,2020,4\n");
        assertThat(assess("r.csv")).isEqualTo(CommandLine.UNUSABLE);
        assertThat(Files.readString(results.resolve("r.csv"))).isEqualTo("earlier");
    }

    @Test
    void unknownColumnsAreToldAndPassedOver() throws IOException {
        table("stocks", "water_body,species,colour\nmere,FPE,green\n");
        table("catches", CATCHES);
        assertThat(assess("r.csv")).isIn(CommandLine.SETTLED, CommandLine.SOME_NOT_SETTLED);
        assertThat(told()).contains("stocks.csv: the column colour is unknown and passed over");
    }

    @ParameterizedTest
    @ValueSource(strings = {"advice", "assess", "assess --colour", "--server.port=1 assess"})
    void whatIsNoCommandIsRefused(String words) {
        assertThat(CommandLine.isServer(words.split(" "))).isFalse();
        assertThat(run(words.split(" "))).isEqualTo(CommandLine.UNUSABLE);
        assertThat(told()).isNotBlank();
    }

    @Test
    void propertiesAloneStartTheServerAndHelpIsGiven() {
        assertThat(CommandLine.isServer()).isTrue();
        assertThat(CommandLine.isServer("--spring.profiles.active=demo", "--server.port=0"))
                .isTrue();
        assertThat(CommandLine.isServer("--help")).isFalse();
        assertThat(run("assess", "--help")).isZero();
        assertThat(out.toString(StandardCharsets.UTF_8)).contains("assess FOLDER --out RESULTS.csv");
    }

    @ParameterizedTest
    @CsvSource({
        "0, no draw",
        "0.004, fewer than 1 draw of 100",
        "0.01, about 1 draw of 100",
        "0.35, about 35 draws of 100",
        "0.996, more than 99 draws of 100",
        "1, every draw"
    })
    void chancesAreToldInWords(double probability, String words) {
        assertThat(ReadableTable.chance(probability)).isEqualTo(words);
    }
}
