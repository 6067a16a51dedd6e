package org.merewarden.portfolio;

import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.springframework.web.util.UriComponentsBuilder;

/**
 * What of the portfolio is asked for, as it stands in the address; an empty or missing part asks for everything.
 *
 * @param q words that must occur in the names of water, species or district
 * @param sort key of a {@link Column}; anything else is the default order
 * @param dir desc, else ascending
 */
record PortfolioQuery(
        @Nullable String q,
        @Nullable String district,
        @Nullable String species,
        @Nullable String cooperative,
        @Nullable String standing,
        @Nullable String evidence,
        @Nullable String sort,
        @Nullable String dir,
        @Nullable Integer season) {
    static final PortfolioQuery ALL = new PortfolioQuery(null, null, null, null, null, null, null, null, null);

    List<Entry> apply(List<Entry> entries) {
        return entries.stream()
                .filter(this::matches)
                .sorted(column().order(descending()))
                .toList();
    }

    Column column() {
        return Column.of(sort).orElse(Column.STANDING);
    }

    boolean descending() {
        return "desc".equals(dir);
    }

    boolean filtered() {
        return Stream.of(q, district, species, cooperative, standing, evidence).anyMatch(PortfolioQuery::given);
    }

    private boolean matches(Entry e) {
        return wordsIn(e)
                && asks(district, e.stock().district())
                && asks(species, e.stock().species())
                && asks(standing, e.standingCode())
                && asks(evidence, e.assessment() == null ? null : e.assessment().strength())
                && (!given(cooperative) || e.rights().stream().anyMatch(r -> asks(cooperative, r.cooperativeCode())));
    }

    private boolean wordsIn(Entry e) {
        if (q == null || q.isBlank()) {
            return true;
        }
        String text =
                (e.stock().title() + " " + e.stock().key() + " " + e.stock().district()).toLowerCase(Locale.ROOT);
        return Stream.of(q.toLowerCase(Locale.ROOT).trim().split("\\s+")).allMatch(text::contains);
    }

    private static boolean asks(@Nullable String wanted, @Nullable String value) {
        return wanted == null || wanted.isBlank() || wanted.equals(value);
    }

    private static boolean given(@Nullable String part) {
        return part != null && !part.isBlank();
    }

    /** The address under the path with this query's parts. */
    String address(String path) {
        return address(path, sort, dir);
    }

    /** The address that sorts by the column, the other way round where it is sorted upwards already. */
    String sortAddress(Column column) {
        boolean turn = column == column() && !descending();
        return address("/portfolio", column.key(), turn ? "desc" : "asc");
    }

    private String address(String path, @Nullable String sortBy, @Nullable String direction) {
        UriComponentsBuilder builder = UriComponentsBuilder.fromPath(path);
        add(builder, "q", q);
        add(builder, "district", district);
        add(builder, "species", species);
        add(builder, "cooperative", cooperative);
        add(builder, "standing", standing);
        add(builder, "evidence", evidence);
        add(builder, "sort", sortBy);
        add(builder, "dir", direction);
        add(builder, "season", season == null ? null : season.toString());
        return builder.encode().build().toUriString();
    }

    /** Values go in as variables, so that whatever they hold is encoded. */
    private static void add(UriComponentsBuilder builder, String name, @Nullable String value) {
        if (value != null && !value.isBlank()) {
            builder.queryParam(name, "{" + name + "}").uriVariables(Map.of(name, value));
        }
    }
}
