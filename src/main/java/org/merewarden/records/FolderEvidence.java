package org.merewarden.records;

import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.OptionalDouble;
import java.util.OptionalInt;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.intake.Batch;
import org.merewarden.intake.CheckedTable;
import org.merewarden.intake.FolderTables;
import org.merewarden.intake.Problem;
import org.merewarden.intake.RefusedImport;
import org.merewarden.intake.TableRow;
import org.merewarden.waterbody.RegisterTables;
import org.merewarden.waterbody.StockReferences;

/**
 * The tables of a folder as evidence, without a store: what importing the folder into an empty store would give.
 *
 * <p>Only {@code stocks.csv} is needed. Without {@code water-bodies.csv} the water bodies are those that the stocks name:
 * lakes of which nothing is known but the area, taken as the latest season's in {@code areas.csv}, else as {@value
 * #UNKNOWN_AREA_HECTARES} ha. That area counts only for a stock with neither a catch nor a stated {@code msy_t}, whose
 * prior of MSY rests on it.
 */
public final class FolderEvidence {
    static final double UNKNOWN_AREA_HECTARES = 1000;
    private static final String WATER_BODIES = "water-bodies";
    private static final String STOCKS = "stocks";

    private final FolderTables.Content content;
    private final Map<String, TableRow> waterBodies = new HashMap<>();
    // by table and water body: each stock looks at its own water's rows alone
    private final Map<String, Map<String, List<TableRow>>> byWater = new HashMap<>();

    private FolderEvidence(FolderTables.Content content) {
        this.content = content;
        content.of(WATER_BODIES).forEach(row -> waterBodies.put(row.need("code"), row));
        group(STOCKS);
        group(PaperLimits.DEFINITION.name());
        RecordTables.ALL.forEach(table -> group(table.name()));
    }

    private void group(String table) {
        byWater.put(table, content.of(table).stream().collect(Collectors.groupingBy(row -> row.need("water_body"))));
    }

    /** @param speciesKey species code, or code.population */
    public record StockEvidence(String waterBody, String speciesKey, Evidence evidence) {}

    /** @throws RefusedImport with every reason: file, line, column, value and rule */
    public static FolderEvidence read(Path folder) {
        if (Files.isDirectory(folder) && FolderTables.file(folder, STOCKS).isEmpty()) {
            throw new RefusedImport(List.of(
                    folder.resolve(STOCKS + ".csv") + ": there is no such file; it names the stocks to assess"));
        }
        boolean registered = Files.isDirectory(folder)
                && FolderTables.file(folder, WATER_BODIES).isPresent();
        List<CheckedTable> tables = new ArrayList<>();
        RegisterTables.withoutStore().forEach(t -> tables.add(registered ? t : withoutRegister(t)));
        for (RecordTable table : RecordTables.ALL) {
            CheckedTable checked = new CheckedTable(
                    table.definition(), (row, batch) -> table.problems(row, StockReferences.NONE, batch));
            tables.add(registered ? checked : withoutRegister(checked));
        }
        CheckedTable limits = new CheckedTable(PaperLimits.DEFINITION, FolderEvidence::limitProblems);
        tables.add(registered ? limits : withoutRegister(limits));
        return new FolderEvidence(FolderTables.read(folder, tables, List.of(WATER_BODIES, STOCKS)));
    }

    private static Stream<Problem> limitProblems(TableRow row, Batch batch) {
        Problem unknown = StockReferences.NONE.stockProblem(row, batch);
        return unknown == null ? PaperLimits.problem(row).stream() : Stream.of(unknown);
    }

    private static CheckedTable withoutRegister(CheckedTable table) {
        return new CheckedTable(
                table.definition(), (row, batch) -> table.rules().problems(row, new NamedByStocks(batch)));
    }

    /** Any water body that a stock names is there; while the stocks themselves are examined, any is. */
    private record NamedByStocks(Batch batch) implements Batch {
        @Override
        public boolean brings(String table, String... keys) {
            if (!table.equals(WATER_BODIES)) {
                return batch.brings(table, keys);
            }
            List<TableRow> stocks = batch.rows(STOCKS);
            return stocks.isEmpty()
                    || stocks.stream().anyMatch(s -> s.need("water_body").equals(keys[0]));
        }
    }

    /** What was passed over. */
    public List<String> remarks() {
        return content.remarks();
    }

    /** The last season with a catch, an effort or a survey of any stock; empty where there is none. */
    public OptionalInt lastSeason() {
        return List.of(RecordTables.CATCHES, RecordTables.EFFORT, RecordTables.SURVEYS).stream()
                .flatMap(table -> content.of(table.name()).stream())
                .mapToInt(EvidenceMapping::year)
                .max();
    }

    /** Every stock, by water body, species and population. */
    public List<StockEvidence> stocks() {
        return content.of(STOCKS).stream()
                .sorted(Comparator.comparing((TableRow row) -> row.need("water_body"))
                        .thenComparing(FolderEvidence::speciesKey))
                .map(row -> new StockEvidence(row.need("water_body"), speciesKey(row), evidence(row)))
                .toList();
    }

    /** The catch limit of a season, t of total removals, as it was issued last; empty where none is on paper. */
    public OptionalDouble limit(StockEvidence stock, int season) {
        return rows(PaperLimits.DEFINITION.name(), stock.waterBody()).stream()
                .filter(row -> speciesKey(row).equals(stock.speciesKey()) && PaperLimits.season(row) == season)
                .max(Comparator.comparing(row -> Objects.requireNonNull(row.date("issued_on"))))
                .filter(row -> row.need("kind").equals("catch"))
                .map(row -> OptionalDouble.of(Objects.requireNonNull(row.number("amount"))))
                .orElse(OptionalDouble.empty());
    }

    private static String speciesKey(TableRow row) {
        String population = row.textOrEmpty("population");
        return population.isEmpty() ? row.need("species") : row.need("species") + "." + population;
    }

    private Evidence evidence(TableRow stock) {
        String water = stock.need("water_body");
        Map<String, Object> subject = new HashMap<>(waterBody(water).values());
        subject.putAll(stock.values());
        int stocksInLake = rows(STOCKS, water).size();
        return EvidenceMapping.evidence(
                new TableRow(stock.line(), subject),
                stocksInLake,
                RecordedShare.of(speciesKey(stock), stocksInLake, taken(water)),
                table -> rows(table.name(), water).stream()
                        .filter(row -> about(row, stock))
                        .toList());
    }

    private List<RecordedShare.Taken> taken(String water) {
        return rows(RecordTables.CATCHES.name(), water).stream()
                .map(row -> new RecordedShare.Taken(
                        speciesKey(row),
                        EvidenceMapping.year(row),
                        EvidenceMapping.catchRecord(row).removalsTonnes()))
                .toList();
    }

    /** Whether the row of the stock's water body is about the stock, or about the water or all its stocks. */
    private static boolean about(TableRow row, TableRow stock) {
        String species = row.textOrEmpty("species");
        return species.isEmpty()
                || species.equals(stock.need("species"))
                        && row.textOrEmpty("population").equals(stock.textOrEmpty("population"));
    }

    private List<TableRow> rows(String table, String waterBody) {
        return byWater.getOrDefault(table, Map.of()).getOrDefault(waterBody, List.of());
    }

    private TableRow waterBody(String code) {
        TableRow registered = waterBodies.get(code);
        return registered != null ? registered : new TableRow(0, Map.of("kind", "lake", "area_ha", lastArea(code)));
    }

    private double lastArea(String waterBody) {
        return rows("areas", waterBody).stream()
                .max(Comparator.comparing(EvidenceMapping::year))
                .map(row -> row.number("area_ha"))
                .orElse(UNKNOWN_AREA_HECTARES);
    }
}
