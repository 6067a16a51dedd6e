package org.merewarden.waterbody;

import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Column;
import org.merewarden.intake.Problem;
import org.merewarden.intake.TableRow;

/**
 * Finds the water bodies and stocks that import rows name by {@code water_body}, {@code species} and {@code population}:
 * the register as it stood when this was made (two statements), together with what the same import brings.
 */
public final class StockReferences {
    /** Nothing is registered: only what the same import brings. */
    public static final StockReferences NONE = new StockReferences(Map.of(), Map.of());

    private final Map<String, WaterBodyView> lakes;
    private final Map<String, StockView> stocks;

    private StockReferences(Map<String, WaterBodyView> lakes, Map<String, StockView> stocks) {
        this.lakes = lakes;
        this.stocks = stocks;
    }

    public static StockReferences of(Register register) {
        return new StockReferences(
                register.waterBodies().stream().collect(Collectors.toMap(WaterBodyView::code, Function.identity())),
                register.stocks().stream().collect(Collectors.toMap(StockView::key, Function.identity())));
    }

    /** The three key columns that name a stock. */
    public static List<Column> columns() {
        return List.of(
                Column.code("water_body", "code of the water body")
                        .between(0, 60)
                        .asKey(),
                Column.code("species", "FAO three-letter code of the species")
                        .between(0, 3)
                        .asKey(),
                population());
    }

    public static Column population() {
        return Column.code("population", "empty unless the water holds two stocks of the species")
                .between(0, 40)
                .asKey()
                .orElse("");
    }

    /** lake:species or lake:species.population, also for a stock that is not registered yet. */
    public static String key(TableRow row) {
        String population = row.textOrEmpty("population");
        return row.textOrEmpty("water_body") + ":" + row.textOrEmpty("species")
                + (population.isEmpty() ? "" : "." + population);
    }

    public Optional<WaterBodyView> lake(TableRow row) {
        return Optional.ofNullable(lakes.get(row.textOrEmpty("water_body")));
    }

    public Optional<StockView> stock(TableRow row) {
        return Optional.ofNullable(stocks.get(key(row)));
    }

    /** Why the row's water body is unknown, or null. */
    public @Nullable Problem lakeProblem(TableRow row, Batch batch) {
        String code = row.textOrEmpty("water_body");
        return lakes.containsKey(code) || batch.brings("water-bodies", code)
                ? null
                : new Problem(
                        "water_body",
                        code,
                        "no water body has the code “" + code + "”; add the water body or mend the code");
    }

    /** Why the row's stock is unknown, or null. */
    public @Nullable Problem stockProblem(TableRow row, Batch batch) {
        Problem lake = lakeProblem(row, batch);
        if (lake != null) {
            return lake;
        }
        String species = row.textOrEmpty("species");
        String population = row.textOrEmpty("population");
        if (stocks.containsKey(key(row))
                || batch.brings("stocks", row.textOrEmpty("water_body"), species, population)) {
            return null;
        }
        String which =
                population.isEmpty() ? "“" + species + "”" : "“" + species + "”, population “" + population + "”";
        return new Problem(
                "species",
                species,
                "the water body “" + row.textOrEmpty("water_body") + "” has no stock of species " + which
                        + "; add the stock or mend the code");
    }
}
