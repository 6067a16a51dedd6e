package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.Instant;
import java.util.List;
import java.util.UUID;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.assessment.AssessForTests;
import org.merewarden.web.Seasons;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

/** A limit issued ahead of its season: when the season has come, the stock is judged against it. */
@WholeApplication
class StandingsRefreshTest {
    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private AssessForTests assess;

    @Autowired
    private StandingsRefresh refresh;

    @Autowired
    private Standings standings;

    @Autowired
    private Seasons seasons;

    @Test
    void theTurnOfTheSeasonIsNoticed() throws Exception {
        TestRegion region = new TestRegion(jdbc);
        int season = seasons.current();
        String lake = "turn-" + UUID.randomUUID().toString().substring(0, 8);
        long stock = region.stock(region.lake(lake, "Turning Lake"), "FPE");
        region.catches(stock, season - 4, List.of(20.0, 18.0, 19.0, 21.0));
        assess.assess(stock, season - 1);
        // as it was judged before the season began
        jdbc.sql("update stock_standing set season_year = ?, removals_t = 1 where stock_id = ?")
                .params(season - 1, stock)
                .update();
        region.limit(stock, season, 17);

        refresh.turnOfSeason();

        Instant end = Instant.now().plusSeconds(60);
        while (standings.of(stock).orElseThrow().removalsTonnes() != 17
                && Instant.now().isBefore(end)) {
            Thread.sleep(100);
        }
        assertThat(standings.of(stock).orElseThrow().season()).isEqualTo(season);
        assertThat(standings.of(stock).orElseThrow().removalsTonnes()).isEqualTo(17);
    }
}
