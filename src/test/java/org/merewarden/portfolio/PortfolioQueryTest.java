package org.merewarden.portfolio;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class PortfolioQueryTest {
    private static final Entry SECURE = Made.entry(
            Made.stock(1, "alder", "pike", "North"),
            Made.assessment(1, 30, 1.2, "STRONG"),
            Made.standing(1, "SECURE", 0.6),
            Made.catchLimit(1, 12),
            Made.uptake(1, 3000, "2026-09-03"));
    private static final Entry STRAINED = Made.entry(
            Made.stock(2, "birch", "perch", "South"),
            Made.assessment(2, 10, 0.7, "FAIR"),
            Made.standing(2, "STRAINED", 0.1),
            Made.catchLimit(2, 9),
            Made.uptake(2, 8000, "2026-08-01"));
    private static final Entry WORSE_MARGIN = Made.entry(
            Made.stock(3, "cedar", "perch", "South"),
            Made.assessment(3, 20, 0.5, "THIN"),
            Made.standing(3, "STRAINED", -0.2),
            null,
            null);
    private static final Entry CLOSED = Made.entry(
            Made.stock(4, "dove", "pike", "North"),
            Made.assessment(4, 5, 0.3, "FAIR"),
            Made.standing(4, "STRAINED", 1.0),
            Made.catchLimit(4, 0),
            null);
    private static final Entry UNASSESSED =
            Made.entry(Made.stock(5, "elm", "bream", null), null, null, Made.catchLimit(5, 2), null);
    private static final List<Entry> ALL = List.of(UNASSESSED, SECURE, CLOSED, STRAINED, WORSE_MARGIN);

    private static PortfolioQuery sorted(String column, String direction) {
        return new PortfolioQuery(null, null, null, null, null, null, column, direction, null);
    }

    private static List<String> lakes(PortfolioQuery query) {
        return query.apply(ALL).stream().map(e -> e.stock().lake()).toList();
    }

    @Test
    void startsWithTheWorstStandingAndThenTheLeastMargin() {
        assertThat(lakes(PortfolioQuery.ALL)).containsExactly("cedar", "birch", "dove", "alder", "elm");
    }

    @ParameterizedTest
    @CsvSource({
        "water, asc, alder birch cedar dove elm",
        "water, desc, elm dove cedar birch alder",
        "margin, asc, cedar birch alder dove elm",
        "margin, desc, alder birch cedar dove elm",
        "msy, desc, alder cedar birch dove elm",
        "yield, asc, dove birch cedar alder elm",
        "biomass, asc, dove cedar birch alder elm",
        "limit, asc, dove elm birch alder cedar",
        "taken, desc, birch alder dove elm cedar",
        "evidence, asc, alder birch dove cedar elm",
        "standing, desc, alder cedar birch dove elm",
        "assessed, desc, dove cedar birch alder elm",
        "nonsense, asc, cedar birch dove alder elm",
    })
    void sortsByEachColumnWithMissingValuesLast(String column, String direction, String expected) {
        assertThat(lakes(sorted(column, direction))).containsExactly(expected.split(" "));
    }

    @ParameterizedTest
    @CsvSource(
            nullValues = "-",
            value = {
                "perch, -, -, -, -, -, cedar birch",
                "south PERCH ced, -, -, -, -, -, cedar",
                "-, North, -, -, -, -, dove alder",
                "-, -, PIKE, -, -, -, dove alder",
                "-, -, -, north-coop, -, -, cedar birch dove alder elm",
                "-, -, -, other, -, -, ''",
                "-, -, -, -, unassessed, -, elm",
                "-, -, -, -, strained, -, cedar birch dove",
                "-, -, -, -, -, FAIR, birch dove",
                "-, South, -, -, -, FAIR, birch",
            })
    void filters(
            String q, String district, String species, String coop, String standing, String evidence, String expected) {
        PortfolioQuery query = new PortfolioQuery(q, district, species, coop, standing, evidence, null, null, null);
        assertThat(String.join(" ", lakes(query))).isEqualTo(expected);
    }

    @Test
    void aHeaderTurnsItsOwnOrderAndKeepsTheFilters() {
        PortfolioQuery query = new PortfolioQuery("a&b =", "North", null, null, "", null, "margin", "asc", 2026);
        assertThat(query.sortAddress(Column.MARGIN))
                .isEqualTo("/portfolio?q=a%26b%20%3D&district=North&sort=margin&dir=desc&season=2026");
        assertThat(query.sortAddress(Column.MSY)).endsWith("&sort=msy&dir=asc&season=2026");
        assertThat(sorted("margin", "desc").sortAddress(Column.MARGIN)).endsWith("sort=margin&dir=asc");
    }
}
