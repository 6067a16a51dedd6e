package org.merewarden.season;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeSet;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.season.Completeness.Records;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.RightView;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.stereotype.Service;

/** Uptake read from the log. Each call costs the same few statements, whatever the number of stocks. */
@Service
class StoredUptakes implements Uptakes {
    /** Rows of the log (alias l) that count: neither withdrawn nor replaced by a later row. */
    static final String COUNTED =
            "l.entry_kind <> 'withdrawal' and not exists (select 1 from landing n where n.corrects_id = l.id)";
    /** Counted rows that are removals against a limit: released fish are not. */
    static final String TAKEN = COUNTED + " and l.sector = 'commercial' and l.fate in ('kept', 'discarded', 'seized')";

    private final JdbcClient jdbc;
    private final Register register;
    private final Completeness completeness;

    StoredUptakes(JdbcClient jdbc, Register register, Completeness completeness) {
        this.jdbc = jdbc;
        this.register = register;
        this.completeness = completeness;
    }

    @Override
    public List<UptakeView> ofSeason(int season) {
        Map<Long, Sum> sums = new HashMap<>();
        jdbc.sql(sums("")).param("season", season).query(row -> {
            sums.put(row.getLong(1), new Sum(row.getDouble(2), row.getObject(3, LocalDate.class)));
        });
        Map<Long, List<RightView>> rights =
                register.rights().stream().collect(Collectors.groupingBy(RightView::stockId));
        var stocks = new TreeSet<>(sums.keySet());
        stocks.addAll(rights.keySet());
        Records records = completeness.of(season);
        List<UptakeView> views = new ArrayList<>();
        for (long stock : stocks) {
            views.add(view(stock, sums.get(stock), rights.getOrDefault(stock, List.of()), records));
        }
        return views;
    }

    @Override
    public Optional<UptakeView> of(long stockId, int season) {
        Optional<Sum> sum = jdbc.sql(sums(" and l.stock_id = :stock"))
                .param("season", season)
                .param("stock", stockId)
                .query((row, n) -> new Sum(row.getDouble(2), row.getObject(3, LocalDate.class)))
                .optional();
        List<RightView> rights = register.rightsOfStock(stockId);
        if (sum.isEmpty() && rights.isEmpty()) {
            return Optional.empty();
        }
        return Optional.of(view(stockId, sum.orElse(null), rights, completeness.of(season)));
    }

    /** By stock: kilograms taken, and the date of the last landing of any fate. */
    private static String sums(String condition) {
        return """
                select l.stock_id,
                  sum(case when l.sector = 'commercial' and l.fate in ('kept', 'discarded', 'seized')
                      then l.live_weight_kg else 0 end),
                  max(l.landed_on)
                from landing l where l.season_year = :season and l.stock_id is not null and\s""" + COUNTED + condition + " group by l.stock_id";
    }

    private static UptakeView view(long stock, @Nullable Sum sum, List<RightView> rights, Records records) {
        List<LocalDate> ends = rights.stream()
                .flatMap(r -> records.end(r.cooperativeId()).stream())
                .sorted(Comparator.naturalOrder())
                .toList();
        LocalDate upTo = !ends.isEmpty() ? ends.get(0) : sum == null ? null : sum.lastLanding();
        List<String> silent = rights.stream()
                .filter(r -> records.silent(r.cooperativeId()))
                .map(RightView::cooperativeName)
                .toList();
        return new UptakeView(stock, sum == null ? 0 : sum.takenKg(), upTo, silent);
    }

    private record Sum(double takenKg, LocalDate lastLanding) {}
}
