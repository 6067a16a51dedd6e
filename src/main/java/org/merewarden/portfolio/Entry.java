package org.merewarden.portfolio;

import java.util.List;
import java.util.Locale;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.StandingView;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.season.UptakeView;
import org.merewarden.waterbody.RightView;
import org.merewarden.waterbody.StockView;

/**
 * What the office knows of one stock in one season, side by side.
 *
 * @param assessment the latest; null where none is stored
 * @param standing null where no assessment has draws
 * @param limit the limit in force
 * @param beforeClosure what was allowed until the stock was closed; null where it is open
 * @param uptake null where the season's log has nothing on the stock
 */
record Entry(
        StockView stock,
        List<RightView> rights,
        @Nullable AssessmentView assessment,
        @Nullable StandingView standing,
        @Nullable LimitView limit,
        @Nullable LimitView beforeClosure,
        @Nullable UptakeView uptake) {
    static final String UNASSESSED = "unassessed";
    private static final String NO_REMOVALS = "none";
    private static final List<String> WELL_KNOWN = List.of("STRONG", "FAIR");

    /** secure, watch, strained, critical or unassessed. */
    String standingCode() {
        return standing == null ? UNASSESSED : standing.standing().toLowerCase(Locale.ROOT);
    }

    /** Nothing may be taken, or nothing was allowed last season and nothing is decided since. */
    boolean closed() {
        if (limit != null) {
            Double amount = limit.amountTonnes();
            return amount != null && amount == 0;
        }
        return assessment != null && assessment.closedLastSeason();
    }

    /** (MSY − removals)/MSY; null where it says nothing: closed, or no removals known to count from. */
    @Nullable
    Double margin() {
        StandingView s = judged();
        return s == null ? null : s.margin();
    }

    /** P(margin < 0); null with the margin. */
    @Nullable
    Double marginNegativeProbability() {
        StandingView s = judged();
        return s == null ? null : s.marginNegativeProbability();
    }

    private @Nullable StandingView judged() {
        return standing == null || closed() || standing.removalsBasis().equals(NO_REMOVALS) ? null : standing;
    }

    /** Why a standing other than secure may have more to do with width than with level, in a text's key. */
    String width() {
        if (standing == null || !standing.mainlyLittleKnown()) {
            return "";
        }
        return assessment != null && WELL_KNOWN.contains(assessment.strength()) ? "wide" : "little";
    }

    @Nullable
    Double msyTonnes() {
        return assessment == null ? null : assessment.msyTonnes();
    }

    /** MSY per hectare of the register's area, kg/ha a year. */
    @Nullable
    Double msyKgPerHectare() {
        Double msy = msyTonnes();
        return msy == null ? null : 1000 * msy / stock.areaHectares();
    }

    @Nullable
    Double biomassOverBmsy() {
        return assessment == null ? null : assessment.bOverBmsy();
    }

    boolean closedEarly() {
        return limit != null && limit.closure();
    }

    /** What is allowed, or was until the stock was closed. */
    @Nullable
    LimitView allowed() {
        return closedEarly() ? beforeClosure : limit;
    }

    /** Total removals allowed this season, t; until the closure where the stock is closed. */
    @Nullable
    Double limitTonnes() {
        LimitView allowed = allowed();
        return allowed == null ? null : allowed.amountTonnes();
    }

    /** Of it, what is to be logged. */
    @Nullable
    Double toBeLoggedTonnes() {
        LimitView allowed = allowed();
        return allowed == null ? null : allowed.toBeLoggedTonnes();
    }

    /** Live weight recorded in the season, t; null where there is neither a log nor a limit. */
    @Nullable
    Double takenTonnes() {
        if (uptake == null) {
            return limit == null ? null : 0.0;
        }
        return uptake.takenKg() / 1000;
    }

    /** Taken as a share of the amount to be logged; null without such an amount. */
    @Nullable
    Double takenShare() {
        Double taken = takenTonnes();
        Double allowed = toBeLoggedTonnes();
        return taken == null || allowed == null || allowed == 0 ? null : taken / allowed;
    }
}
