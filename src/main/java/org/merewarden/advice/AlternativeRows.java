package org.merewarden.advice;

import java.util.List;
import java.util.function.Function;
import java.util.stream.IntStream;
import org.merewarden.advice.OutlookPage.Cell;
import org.merewarden.advice.OutlookPage.Row;
import org.merewarden.core.policy.Policy;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** The table of alternatives: one column each, a row for each thing to know. */
@Component
class AlternativeRows {
    private static final double BAD_YEAR = 0.1;

    private final Texts texts;

    AlternativeRows(Texts texts) {
        this.texts = texts;
    }

    List<Row> of(AdviceWorking working, List<Alternative> all) {
        Policy policy = working.policy();
        int first = working.season();
        int last = first + policy.horizonYears() - 1;
        return List.of(
                row(texts.of("outlook.row.first", String.valueOf(first)), all, a -> plain(a.firstCatch())),
                row(
                        texts.of("outlook.row.once", String.valueOf(first), String.valueOf(last)),
                        all,
                        a -> chance(a.projection().belowLimitAtLeastOnce(), policy)),
                row(texts.of("outlook.row.collapse"), all, a -> {
                    Double collapse = a.collapseCourse();
                    return collapse == null
                            ? new Cell(texts.of("outlook.row.adapts"), false)
                            : chance(collapse, policy);
                }),
                row(
                        texts.of("outlook.row.expected"),
                        all,
                        a -> plain(a.projection().expectedCatch())),
                row(texts.of("outlook.row.bad"), all, a -> plain(a.projection().catchQuantile(BAD_YEAR))),
                row(
                        texts.of("outlook.row.biomass", String.valueOf(last)),
                        all,
                        a -> biomass(a, policy.horizonYears(), policy)));
    }

    /** The chance of B &lt; B lim at the end of each season. */
    List<Row> bySeason(AdviceWorking working, List<Alternative> all) {
        return IntStream.range(0, working.policy().horizonYears())
                .mapToObj(t -> row(
                        String.valueOf(working.season() + t),
                        all,
                        a -> chance(a.projection().belowLimit()[t], working.policy())))
                .toList();
    }

    /** Biomass at the end of each season, t. */
    List<Row> biomass(AdviceWorking working, List<Alternative> all) {
        return IntStream.rangeClosed(1, working.policy().horizonYears())
                .mapToObj(t -> row(String.valueOf(working.season() + t - 1), all, a -> biomass(a, t, working.policy())))
                .toList();
    }

    private static Row row(String name, List<Alternative> all, Function<Alternative, Cell> cell) {
        return new Row(name, all.stream().map(cell).toList());
    }

    private static Cell plain(double tonnes) {
        return new Cell(Figures.sig(tonnes), false);
    }

    private static Cell chance(double p, Policy policy) {
        return new Cell(Figures.percentBeside(p, policy.tolerance()), p > policy.tolerance());
    }

    private static Cell biomass(Alternative a, int season, Policy policy) {
        double tail = (1 - policy.intervalProbability()) / 2;
        double[] q = a.projection().biomassQuantiles(season, tail, 0.5, 1 - tail);
        return new Cell(Figures.interval(q[1], q[0], q[2]), false);
    }
}
