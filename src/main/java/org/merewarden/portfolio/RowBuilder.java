package org.merewarden.portfolio;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.LimitView;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.web.Figures;
import org.merewarden.web.Svg;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** Turns what is known of a stock into the strings and small drawings of its row. */
@Component
class RowBuilder {
    /** Margins beyond ± this much of MSY fill their half of the bar. */
    private static final double MARGIN_RANGE = 1;

    private final Texts texts;

    RowBuilder(Texts texts) {
        this.texts = texts;
    }

    PortfolioView.Row row(Entry e) {
        return new PortfolioView.Row(
                e.stock().key(),
                texts.get("choose", e.stock().title()),
                e.stock().path(),
                e.stock().lakeName(),
                speciesName(e),
                e.standingCode(),
                standing(e),
                e.width().isEmpty() ? "" : texts.get("known." + e.width()),
                margin(e),
                marginBar(e),
                msy(e),
                known(e.msyKgPerHectare()),
                biomass(e),
                biomassLine(e),
                limit(e.limit()),
                taken(e),
                takenBar(e),
                e.assessment() == null ? "" : strength(e.assessment().strength()),
                e.assessment() == null ? "" : Figures.date(madeOn(e.assessment())));
    }

    String strength(String strength) {
        return texts.get("strength." + strength);
    }

    /** The word beside the mark. */
    String standing(Entry e) {
        if (e.standing() == null && e.assessment() != null) {
            return texts.get("standing.unsettled");
        }
        return texts.get("standing." + e.standingCode());
    }

    static String speciesName(Entry e) {
        String population = e.stock().population();
        return population.isEmpty() ? e.stock().speciesName() : e.stock().speciesName() + " (" + population + ")";
    }

    static LocalDate madeOn(AssessmentView assessment) {
        return LocalDate.ofInstant(
                assessment.madeAt(), LocaleContextHolder.getTimeZone().toZoneId());
    }

    private String margin(Entry e) {
        if (e.standing() == null) {
            return "";
        }
        if (e.closed()) {
            return texts.get("closed");
        }
        Double margin = e.margin();
        return margin == null
                ? Figures.UNKNOWN
                : texts.get("margin.words", Figures.percent(margin), Figures.percent(e.marginNegativeProbability()));
    }

    private String marginBar(Entry e) {
        Double margin = e.margin();
        return margin == null
                ? ""
                : Svg.barAboutZero(margin, MARGIN_RANGE, texts.get("margin.bar", Figures.percent(margin)));
    }

    private static String msy(Entry e) {
        AssessmentView a = e.assessment();
        return a == null || a.msyTonnes() == null
                ? ""
                : Figures.interval(a.msyTonnes(), a.msyLowTonnes(), a.msyHighTonnes());
    }

    private static String biomass(Entry e) {
        AssessmentView a = e.assessment();
        return a == null || a.bOverBmsy() == null
                ? ""
                : Figures.interval(a.bOverBmsy(), a.bOverBmsyLow(), a.bOverBmsyHigh());
    }

    /** The stored trend holds medians, so the band opens at its last point only. */
    private String biomassLine(Entry e) {
        AssessmentView a = e.assessment();
        if (a == null || a.trend().isEmpty() || a.bOverBmsyLow() == null || a.bOverBmsyHigh() == null) {
            return "";
        }
        int last = a.trend().size() - 1;
        List<Double> low = new ArrayList<>(a.trend());
        List<Double> high = new ArrayList<>(a.trend());
        low.set(last, a.bOverBmsyLow());
        high.set(last, a.bOverBmsyHigh());
        String title = texts.get("biomass.line", a.firstYear() + "", Figures.sig(a.bOverBmsy()));
        return Svg.lineWithBand(a.trend(), low, high, 1.0, title);
    }

    /** Total removals allowed, an effort in its unit, measures only, or from when the stock is closed. */
    String limit(@Nullable LimitView limit) {
        if (limit == null) {
            return "";
        }
        if (limit.closure()) {
            return texts.of("limit.closed", Figures.dateTime(limit.effectiveAt()));
        }
        Double amount = limit.amount();
        return amount == null ? texts.get("limit.measures") : Figures.decided(amount, limit.unit());
    }

    private static String taken(Entry e) {
        Double taken = e.takenTonnes();
        return taken == null ? "" : Figures.tonnes(taken);
    }

    private String takenBar(Entry e) {
        Double taken = e.takenTonnes();
        Double allowed = e.toBeLoggedTonnes();
        return taken == null || allowed == null
                ? ""
                : Svg.barToLimit(
                        taken, allowed, texts.get("taken.bar", Figures.tonnes(taken), Figures.decided(allowed)));
    }

    private static String known(@Nullable Double value) {
        return value == null ? "" : Figures.sig(value);
    }
}
