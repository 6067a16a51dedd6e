package org.merewarden.assessment;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.CyclicBarrier;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;

@WholeApplication
class AssessmentRaceTest {
    private static final int RUNS = 6;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private AssessForTests assess;

    @Test
    void runsOverTheSameStockAtTheSameTimeAllKeepTheirResult() throws Exception {
        var region = new TestRegion(jdbc);
        long stock = region.stock(region.lake("race-lake", "Race Lake"), "FPE");
        region.catches(stock, 2015, List.of(3.0, 3.5, 4.0, 3.2, 3.1));
        assess.assess(stock, 2025);
        CyclicBarrier start = new CyclicBarrier(RUNS);
        ExecutorService threads = Executors.newFixedThreadPool(RUNS);
        try {
            List<Future<?>> runs = new ArrayList<>();
            for (int i = 0; i < RUNS; i++) {
                runs.add(threads.submit(() -> {
                    start.await();
                    assess.assess(stock, 2025);
                    return null;
                }));
            }
            for (Future<?> run : runs) {
                run.get();
            }
        } finally {
            threads.shutdown();
        }
        assertThat(jdbc.sql("select number from assessment where stock_id = ? order by number")
                        .param(stock)
                        .query(Integer.class)
                        .list())
                .containsExactly(1, 2, 3, 4, 5, 6, 7);
    }
}
