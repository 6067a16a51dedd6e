package org.merewarden;

import static java.util.stream.Collectors.counting;
import static java.util.stream.Collectors.groupingBy;
import static java.util.stream.Collectors.mapping;
import static java.util.stream.Collectors.summingDouble;
import static java.util.stream.Collectors.toMap;
import static java.util.stream.Collectors.toSet;
import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.function.DoubleUnaryOperator;
import java.util.function.Predicate;
import java.util.stream.Stream;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVRecord;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

/**
 * The files of the demonstration region: well formed, true to each other, and telling the stories they were made for.
 *
 * <p>They are written by {@code src/test/reference/demo_region.py} from known parameters (in {@code demo_truth.csv},
 * computed there). Headers and keys below are written out from the description of the tables, not taken from the
 * generator.
 */
class DemonstrationFilesTest {
    private static final Path SEED = Path.of("db-seed");
    private static final Path REFERENCE = Path.of("src/test/resources/reference");
    private static final CSVFormat CSV =
            CSVFormat.RFC4180.builder().setHeader().setSkipHeaderRecord(true).get();
    private static final List<CSVRecord> CONVERSIONS = table("conversions");

    private static List<CSVRecord> read(Path file) {
        try (var records = CSV.parse(Files.newBufferedReader(file, StandardCharsets.UTF_8))) {
            return records.getRecords();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    private static List<CSVRecord> table(String name) {
        return read(SEED.resolve(name + ".csv"));
    }

    private static List<CSVRecord> truth() {
        return read(REFERENCE.resolve("demo_truth.csv"));
    }

    private static String stock(CSVRecord row) {
        return row.get("water_body") + "/" + row.get("species") + "/" + row.get("population");
    }

    private static Set<String> stocks(List<CSVRecord> rows) {
        return rows.stream().map(DemonstrationFilesTest::stock).collect(toSet());
    }

    private static Set<String> stocks(List<CSVRecord> rows, Predicate<CSVRecord> wanted) {
        return rows.stream().filter(wanted).map(DemonstrationFilesTest::stock).collect(toSet());
    }

    private static double number(CSVRecord row, String column) {
        return Double.parseDouble(row.get(column));
    }

    private static int year(CSVRecord row) {
        return Integer.parseInt(row.get("year"));
    }

    private static int season(CSVRecord landing) {
        return LocalDate.parse(landing.get("date")).getYear();
    }

    private static boolean commercialAndKept(CSVRecord landing) {
        return landing.get("sector").equals("commercial") && landing.get("fate").equals("kept");
    }

    /** Live weight of a landing, t: as landed × the factor of its presentation in force on its day. */
    private static double liveTonnes(CSVRecord landing) {
        double factor = 1;
        String presentation = landing.get("presentation");
        if (!presentation.isEmpty() && !presentation.equals("whole")) {
            factor = CONVERSIONS.stream()
                    .filter(row -> row.get("species").equals(landing.get("species")))
                    .filter(row -> row.get("presentation").equals(presentation))
                    .filter(row -> row.get("valid_from").compareTo(landing.get("date")) <= 0)
                    .reduce((a, b) -> a.get("valid_from").compareTo(b.get("valid_from")) > 0 ? a : b)
                    .map(row -> number(row, "factor"))
                    .orElseThrow();
        }
        return number(landing, "weight_kg") * factor / 1000;
    }

    private static Map<String, Double> logged(int season) {
        return table("landings").stream()
                .filter(row -> season(row) == season && commercialAndKept(row))
                .collect(groupingBy(DemonstrationFilesTest::stock, summingDouble(DemonstrationFilesTest::liveTonnes)));
    }

    private static double meanIndex(String stock, int from, int to) {
        return table("surveys").stream()
                .filter(row -> stock(row).equals(stock) && row.get("kind").equals("index"))
                .filter(row -> year(row) >= from && year(row) <= to)
                .mapToDouble(row -> number(row, "value"))
                .average()
                .orElseThrow();
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', textBlock = """
        water-bodies | code,name,district,kind,area_ha,mean_depth_m,max_depth_m,elevation_m,latitude,longitude,dissolved_solids_mg_l,conductivity_us_cm,mean_air_temperature_c,note | code
        stocks       | water_body,species,population,local_name,recruitment,productivity,max_age_years,growth_k_per_year,growth_linf_cm,mean_weight_kg,share_of_lake_yield,price_per_kg,effort_cost,note | water_body,species,population
        cooperatives | code,name,note | code
        rights       | cooperative,water_body,species,population,share_percent | cooperative,water_body,species,population
        catches      | water_body,species,population,year,sector,catch_t,cv,reported_fraction,source | water_body,species,population,year,sector
        effort       | water_body,species,population,year,series,effort,unit,source | water_body,species,population,year,series
        surveys      | water_body,species,population,year,series,time_of_year,kind,value,cv,nets,design,unit,source | water_body,species,population,year,series,time_of_year
        events       | key,water_body,species,population,year,date,kind,low,likely,high,stage,number,mean_weight_g,survival,delay_years,recruit_weight_kg,source | key
        areas        | water_body,year,area_ha | water_body,year
        priors       | water_body,species,population,parameter,series,median,log_sd,reason | water_body,species,population,parameter,series
        limits       | water_body,species,population,season,issued_on,kind,amount,unit,set_aside_t,valid_from,valid_to,measures,legal_basis,reason | water_body,species,population,season,issued_on
        conversions  | species,population,presentation,valid_from,factor | species,population,presentation,valid_from
        landings     | key,date,slip,water_body,species,population,cooperative,sector,gear,nets,nights,weight_kg,presentation,number,fate,place,note | key
        """)
    void hasTheColumnsOfItsTableAndUniqueKeys(String table, String header, String key) throws IOException {
        Path file = SEED.resolve(table + ".csv");
        String text = Files.readString(file);
        assertThat(text.lines().findFirst()).contains(header);
        assertThat(text).endsWith("\n").doesNotContain("\r");
        List<CSVRecord> rows = table(table);
        assertThat(rows).isNotEmpty().allMatch(CSVRecord::isConsistent);
        List<String> columns = List.of(key.split(","));
        assertThat(rows.stream().map(row -> columns.stream().map(row::get).toList()))
                .doesNotHaveDuplicates();
    }

    @Test
    void isDescribedAsInventedAndSmall() throws IOException {
        assertThat(Files.readString(SEED.resolve("datapackage.json"))).contains("INVENTED DATA");
        try (Stream<Path> files = Files.list(SEED)) {
            assertThat(files.mapToLong(file -> file.toFile().length()).sum()).isLessThanOrEqualTo(1 << 20);
        }
    }

    @Test
    void isTheRegionThatWasAskedFor() {
        List<CSVRecord> lakes = table("water-bodies");
        assertThat(lakes).hasSizeBetween(20, 28);
        assertThat(lakes).allMatch(row -> number(row, "area_ha") >= 80 && number(row, "area_ha") <= 25_000);
        assertThat(lakes)
                .as("sites are invented")
                .allMatch(row -> (row.get("latitude") + row.get("longitude")).isEmpty());
        assertThat(table("stocks")).hasSizeBetween(28, 34);
        assertThat(table("cooperatives")).hasSize(4);
        assertThat(table("landings")).hasSizeBetween(2_500, 4_000);
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "stocks",
                "rights",
                "catches",
                "effort",
                "surveys",
                "events",
                "priors",
                "limits",
                "conversions",
                "landings"
            })
    void namesSpeciesByKnownCodes(String table) {
        Set<String> known = read(REFERENCE.resolve("asfis_freshwater.csv")).stream()
                .map(row -> row.get("alpha3"))
                .collect(toSet());
        Set<String> named = table(table).stream()
                .map(row -> row.get("species"))
                .filter(code -> !(table.equals("events") && code.isEmpty()))
                .filter(code -> !(table.equals("landings") && code.equals("mixed")))
                .collect(toSet());
        assertThat(named).isNotEmpty().isSubsetOf(known);
    }

    @ParameterizedTest
    @ValueSource(strings = {"rights", "catches", "effort", "surveys", "priors", "limits"})
    void namesRegisteredStocks(String table) {
        assertThat(stocks(table(table))).isNotEmpty().isSubsetOf(stocks(table("stocks")));
    }

    @ParameterizedTest
    @ValueSource(strings = {"stocks", "events", "areas", "landings"})
    void namesRegisteredWaters(String table) {
        Set<String> waters =
                table("water-bodies").stream().map(row -> row.get("code")).collect(toSet());
        assertThat(table(table)).allMatch(row -> waters.contains(row.get("water_body")));
    }

    @Test
    void sharesOutNoMoreThanThereIs() {
        Set<String> cooperatives =
                table("cooperatives").stream().map(row -> row.get("code")).collect(toSet());
        assertThat(table("rights")).allMatch(row -> cooperatives.contains(row.get("cooperative")));
        assertThat(table("rights")).allMatch(row -> number(row, "share_percent") > 0);
        assertThat(table("rights").stream()
                        .collect(groupingBy(
                                DemonstrationFilesTest::stock, summingDouble(row -> number(row, "share_percent"))))
                        .values())
                .allMatch(sum -> sum <= 100);
        assertThat(table("stocks").stream()
                        .collect(groupingBy(
                                row -> row.get("water_body"), summingDouble(row -> number(row, "share_of_lake_yield"))))
                        .values())
                .allMatch(sum -> sum <= 1);
    }

    /** The catch is printed to four significant digits, so it may differ from the log's sum by half of the fourth. */
    @ParameterizedTest
    @ValueSource(ints = {2024, 2025})
    void catchesOfTheLastSeasonsAreWhatTheLogAddsUpTo(int season) {
        Map<String, Double> logged = logged(season);
        List<CSVRecord> catches = table("catches").stream()
                .filter(row -> year(row) == season && row.get("sector").equals("commercial"))
                .toList();
        assertThat(logged.keySet()).isEqualTo(stocks(catches));
        for (CSVRecord row : catches) {
            double sum = logged.get(stock(row));
            double halfDigit = 0.5 * Math.pow(10, Math.floor(Math.log10(sum)) - 3);
            assertThat(number(row, "catch_t")).as(stock(row)).isCloseTo(sum, within(halfDigit + 1e-9));
        }
    }

    @Test
    void holdsEveryKindOfEvidence() {
        Set<String> all = stocks(table("stocks"));
        Set<String> caught = stocks(table("catches"));
        Set<String> surveyed = stocks(table("surveys"));
        Set<String> counted = stocks(table("effort"));
        assertThat(all.stream().filter(s -> caught.contains(s) && surveyed.contains(s) && counted.contains(s)))
                .as("rich")
                .hasSizeGreaterThanOrEqualTo(8);
        assertThat(all.stream().filter(s -> caught.contains(s) && !surveyed.contains(s) && !counted.contains(s)))
                .as("catch only")
                .hasSizeGreaterThanOrEqualTo(4);
        assertThat(all.stream().filter(s -> !caught.contains(s) && !surveyed.contains(s) && !counted.contains(s)))
                .as("nothing but the lake")
                .hasSize(3);
        assertThat(all.stream().filter(s -> share(s) >= 0.3 && share(s) <= 0.7))
                .as("30 to 70 % of index years missing")
                .hasSizeGreaterThanOrEqualTo(6);
        assertThat(all.stream().filter(s -> indexSeries(s).size() == 2))
                .as("two index series")
                .hasSize(1);
        assertThat(table("surveys").stream().filter(row -> row.get("kind").equals("biomass")))
                .isNotEmpty()
                .allMatch(row -> !row.get("cv").isEmpty());
    }

    /** Share of the seasons with a catch that have no index, NaN without an index. */
    private static double share(String stock) {
        Set<Integer> caught = years(table("catches"), row -> stock(row).equals(stock));
        Set<Integer> seen = years(
                table("surveys"),
                row -> stock(row).equals(stock) && row.get("kind").equals("index"));
        return seen.isEmpty()
                ? Double.NaN
                : caught.stream().filter(y -> !seen.contains(y)).count() / (double) caught.size();
    }

    private static Set<Integer> years(List<CSVRecord> rows, Predicate<CSVRecord> wanted) {
        return rows.stream().filter(wanted).map(DemonstrationFilesTest::year).collect(toSet());
    }

    private static Set<String> indexSeries(String stock) {
        return table("surveys").stream()
                .filter(row -> stock(row).equals(stock) && row.get("kind").equals("index"))
                .map(row -> row.get("series"))
                .collect(toSet());
    }

    @Test
    void holdsEveryKindOfEvent() {
        Map<String, Long> kinds = table("events").stream().collect(groupingBy(row -> row.get("kind"), counting()));
        assertThat(kinds).containsOnlyKeys("stocking", "fish kill", "closure");
        assertThat(kinds.get("fish kill")).isEqualTo(1);
        assertThat(table("areas").stream().map(row -> row.get("water_body")).distinct())
                .hasSize(1);
    }

    @Test
    void closedStockRecovers() {
        Set<String> closed = stocks(table("events"), row -> row.get("kind").equals("closure"));
        assertThat(closed).hasSize(1);
        String stock = closed.iterator().next();
        Set<Integer> years = years(table("events"), row -> row.get("kind").equals("closure"));
        assertThat(years).hasSizeGreaterThanOrEqualTo(4).contains(2025);
        int first = years.stream().min(Integer::compare).orElseThrow();
        assertThat(meanIndex(stock, 2024, 2025)).isGreaterThan(1.8 * meanIndex(stock, first - 2, first));
        assertThat(years(table("catches"), row -> stock(row).equals(stock))).doesNotContainAnyElementsOf(years);
        assertThat(table("limits"))
                .filteredOn(row -> stock(row).equals(stock) && row.get("season").equals("2026"))
                .singleElement()
                .satisfies(row -> assertThat(number(row, "amount")).isZero());
    }

    /** The tipping biomass is worked out here: B/BMSY = 1 − √(1 − H/MSY), the lower root of r B (1 − B/K) = H. */
    @Test
    void oneStockHasFallenFarBelowTheTippingBiomassOfItsLimit() {
        CSVRecord fallen = truth().stream()
                .filter(row -> row.get("case").equals("below tipping biomass"))
                .reduce((a, b) -> {
                    throw new AssertionError("two of them");
                })
                .orElseThrow();
        String stock = stock(fallen);
        double limit = table("limits").stream()
                .filter(row -> stock(row).equals(stock) && row.get("season").equals("2026"))
                .mapToDouble(row -> number(row, "amount"))
                .sum();
        double msy = number(fallen, "msy_t");
        assertThat(limit).isPositive().isLessThan(msy);
        assertThat(number(fallen, "b_over_bmsy_2026")).isLessThan(0.9 * (1 - Math.sqrt(1 - limit / msy)));
        assertThat(meanIndex(stock, 2024, 2025)).isLessThan(0.35 * meanIndex(stock, 2010, 2015));
    }

    @Test
    void standsAtManyDistancesFromTheFold() {
        Map<String, Set<String>> cases = truth().stream()
                .collect(groupingBy(row -> row.get("case"), mapping(DemonstrationFilesTest::stock, toSet())));
        assertThat(cases.get("near the fold")).hasSizeBetween(4, 6);
        assertThat(cases.get("comfortable")).hasSizeGreaterThanOrEqualTo(12);
        for (CSVRecord row : truth()) {
            double use =
                    row.get("limit_2026_t").isEmpty() ? Double.NaN : number(row, "limit_2026_t") / number(row, "msy_t");
            switch (row.get("case")) {
                case "near the fold" -> assertThat(use).as(stock(row)).isBetween(0.8, 1.0);
                case "limit above MSY" -> assertThat(use).as(stock(row)).isGreaterThan(1);
                case "comfortable" -> assertThat(use > 0.65).as(stock(row)).isFalse();
                default -> assertThat(use > 1).as(stock(row)).isFalse();
            }
        }
    }

    @Test
    void truthCoversEveryStockAndIsConsistent() {
        List<CSVRecord> truth = truth();
        assertThat(truth).hasSameSizeAs(table("stocks"));
        assertThat(stocks(truth)).isEqualTo(stocks(table("stocks")));
        for (CSVRecord row : truth) { // FMSY = r/(1+n), MSY = FMSY K (1+n)^(−1/n); six digits are printed
            double n = number(row, "shape_n");
            double fmsy = number(row, "r_per_year") / (1 + n);
            assertThat(number(row, "fmsy_per_year")).isCloseTo(fmsy, within(1e-5 * fmsy));
            double msy = fmsy * number(row, "k_t") * Math.pow(1 + n, -1 / n);
            assertThat(number(row, "msy_t")).isCloseTo(msy, within(2e-5 * msy));
        }
        List<CSVRecord> states = read(REFERENCE.resolve("demo_truth_states.csv"));
        assertThat(stocks(states, row -> year(row) == 2026)).isEqualTo(stocks(truth));
        assertThat(states).allMatch(row -> number(row, "biomass_t") > 0);
    }

    /**
     * The generator moves biomass by a closed form; here the same season is integrated step by step (Runge–Kutta 4,
     * 1,000 steps: error far below the six digits that are printed). Waters with a fish kill or stocking are left out,
     * their biomass jumps before the season.
     */
    @Test
    void trueCatchesFollowFromTrueBiomassAndHarvestRate() {
        Set<String> jumping = table("events").stream()
                .filter(row -> !row.get("kind").equals("closure"))
                .map(row -> row.get("water_body"))
                .collect(toSet());
        Map<String, CSVRecord> truth = truth().stream().collect(toMap(DemonstrationFilesTest::stock, row -> row));
        List<CSVRecord> states = read(REFERENCE.resolve("demo_truth_states.csv")).stream()
                .filter(row -> year(row) < 2026 && !jumping.contains(row.get("water_body")))
                .toList();
        assertThat(states).hasSizeGreaterThan(500);
        for (CSVRecord row : states) {
            CSVRecord parameters = truth.get(stock(row));
            double expected = integratedCatch(row, number(parameters, "r_per_year"), number(parameters, "shape_n"));
            assertThat(number(row, "catch_t"))
                    .as(stock(row) + " " + year(row))
                    .isCloseTo(expected, within(1e-4 * expected));
        }
    }

    private static double integratedCatch(CSVRecord state, double r, double n) {
        double f = number(state, "harvest_rate_per_year");
        double k = number(state, "capacity_t");
        DoubleUnaryOperator change = b -> r / n * b * (1 - Math.pow(b / k, n)) - f * b;
        int steps = 1_000;
        double h = 1.0 / steps;
        double b = number(state, "biomass_t");
        double caught = 0;
        for (int i = 0; i < steps; i++) {
            double k1 = change.applyAsDouble(b);
            double k2 = change.applyAsDouble(b + h / 2 * k1);
            double k3 = change.applyAsDouble(b + h / 2 * k2);
            double k4 = change.applyAsDouble(b + h * k3);
            double next = b + h / 6 * (k1 + 2 * k2 + 2 * k3 + k4);
            caught += f * h * (b + next) / 2;
            b = next;
        }
        return caught;
    }

    @Test
    void seasonInProgressHasItsTroubles() {
        List<CSVRecord> landings = table("landings");
        assertThat(landings.stream().map(row -> row.get("date")).max(String::compareTo))
                .contains("2026-11-22");
        Map<String, Double> logged = logged(2026);
        assertThat(table("limits").stream()
                        .filter(row -> row.get("season").equals("2026")
                                && row.get("kind").equals("catch"))
                        .filter(row -> logged.getOrDefault(stock(row), 0.0)
                                > number(row, "amount") - number(row, "set_aside_t")))
                .as("over the limit")
                .hasSize(1);
        Map<String, String> lastLanding = landings.stream()
                .filter(row -> !row.get("cooperative").isEmpty())
                .collect(toMap(
                        row -> row.get("cooperative"), row -> row.get("date"), (a, b) -> a.compareTo(b) > 0 ? a : b));
        assertThat(lastLanding.values().stream().filter(day -> day.compareTo("2026-08-01") < 0))
                .as("silent since August")
                .hasSize(1);
        assertThat(lastLanding.values().stream().filter(day -> day.compareTo("2026-11-01") > 0))
                .hasSize(3);
        Set<String> stocks = stocks(table("stocks"));
        assertThat(landings.stream().filter(row -> !row.get("species").equals("mixed") && !stocks.contains(stock(row))))
                .as("protected species")
                .hasSizeBetween(1, 2)
                .allMatch(row ->
                        row.get("fate").equals("released") && row.get("number").equals("1"));
    }
}
