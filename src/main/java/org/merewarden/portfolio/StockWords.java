package org.merewarden.portfolio;

import java.util.ArrayList;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.StandingView;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.season.UptakeView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** What is said of one stock: the answer, the words of its diagram, its season, what it rests on. */
@Component
class StockWords {
    static final String STOCKED_ONLY = "stocked only";

    private final Texts texts;
    private final RowBuilder rows;

    StockWords(Texts texts, RowBuilder rows) {
        this.texts = texts;
        this.rows = rows;
    }

    List<String> lede(Entry e, int season) {
        List<String> lede = new ArrayList<>();
        AssessmentView a = e.assessment();
        if (a != null && !a.settled()) {
            lede.add(texts.get(
                    "stock.unsettled",
                    String.join(" ", a.verdict().stream().limit(1).toList())));
        }
        String stands = e.width().isEmpty() ? "stock.stands" : "stock.stands-" + e.width();
        lede.add(texts.get(stands, e.stock().title(), rows.standing(e)));
        if (a != null && a.biomassTonnes() != null && a.bOverBmsy() != null) {
            lede.add(texts.get(
                    a.bOverBmsy() < 1 ? "stock.biomass-under" : "stock.biomass-above",
                    Figures.tonnes(a.biomassTonnes()),
                    Figures.sig(a.biomassLowTonnes()),
                    Figures.tonnes(a.biomassHighTonnes())));
        }
        lede.add(limit(e, season));
        lede.addAll(courses(e));
        return lede;
    }

    private String limit(Entry e, int season) {
        String year = Integer.toString(season);
        LimitView limit = e.limit();
        if (limit == null) {
            return texts.get("stock.limit.none", year);
        }
        if (limit.closure()) {
            return closed(e, limit);
        }
        if (limit.amount() == null) {
            return texts.get("stock.limit.measures", year);
        }
        boolean nothing = limit.amountTonnes() != null && limit.amountTonnes() == 0;
        return nothing ? texts.get("stock.limit.zero", year) : texts.get("stock.limit", rows.limit(limit), year);
    }

    private String closed(Entry e, LimitView closure) {
        String from = Figures.dateTime(closure.effectiveAt());
        return e.allowed() == null
                ? texts.get("stock.limit.closed", from)
                : texts.get("stock.limit.closed-after", from, rows.limit(e.allowed()));
    }

    private List<String> courses(Entry e) {
        StandingView s = e.standing();
        if (e.stock().recruitment().equals(STOCKED_ONLY)) {
            return List.of(texts.get("stock.stocked-only"));
        }
        if (s == null || s.removalsTonnes() == 0) {
            return List.of();
        }
        return List.of(texts.get(
                s.removalsBasis().equals("limit") ? "stock.course.limit" : "stock.course.last",
                Figures.tonnes(s.removalsTonnes()),
                Figures.chances(s.collapseProbability())));
    }

    /** Fold, margin, tipping biomass, collapse course and return time, each with what it means here. */
    List<StockPage.Term> diagram(StockCurve curve) {
        AssessmentView a = curve.assessment();
        StandingView s = curve.entry().standing();
        List<StockPage.Term> terms = new ArrayList<>();
        terms.add(term(
                "fold",
                texts.get(
                        "word.fold",
                        Figures.tonnes(a.msyTonnes()),
                        Figures.sig(a.msyLowTonnes()),
                        Figures.tonnes(a.msyHighTonnes()),
                        Figures.tonnes(curve.fold().y()))));
        if (s != null) {
            if (curve.entry().margin() != null && s.removalsTonnes() > 0) {
                terms.add(term("margin", margin(s)));
            }
            terms.add(term("tipping", tipping(s)));
            if (s.removalsTonnes() > 0) {
                terms.add(term("course", course(s)));
            }
            Double years = s.returnTimeYears();
            terms.add(term(
                    "return",
                    years == null ? texts.get("word.return.none") : texts.get("word.return", Figures.sig(years))));
        }
        return terms;
    }

    private String margin(StandingView s) {
        return texts.get(
                s.margin() < 0 ? "word.margin.beyond" : "word.margin",
                Figures.tonnes(s.removalsTonnes()),
                Figures.percent(Math.abs(s.margin())),
                Figures.percent(s.marginLow()),
                Figures.percent(s.marginHigh()),
                Figures.chances(s.marginNegativeProbability()));
    }

    private String course(StandingView s) {
        return texts.get("word.course", Figures.tonnes(s.removalsTonnes()), Figures.chances(s.collapseProbability()));
    }

    private String tipping(StandingView s) {
        if (s.tippingBiomassTonnes() != null && s.removalsTonnes() > 0) {
            return texts.get(
                    "word.tipping", Figures.tonnes(s.removalsTonnes()), Figures.tonnes(s.tippingBiomassTonnes()));
        }
        return texts.get(s.removalsTonnes() == 0 ? "word.tipping.zero" : "word.tipping.beyond");
    }

    List<StockPage.Term> season(Entry e) {
        List<StockPage.Term> terms = new ArrayList<>();
        LimitView limit = e.limit();
        Double taken = e.takenTonnes();
        if (limit != null) {
            terms.add(term("limit", e.closedEarly() ? closedLimit(e, limit) : rows.limit(limit)));
            LimitView until = e.allowed();
            if (until != null && until.toBeLoggedTonnes() != null) {
                terms.add(term("set-asides", Figures.decided(until.setAsidesTonnes())));
                terms.add(term("to-be-logged", Figures.decided(until.toBeLoggedTonnes())));
            }
        }
        terms.add(term("taken", taken == null ? texts.get("season.nothing") : Figures.tonnes(taken)));
        Double allowed = e.toBeLoggedTonnes();
        if (allowed != null && allowed > 0 && taken != null && (!e.closedEarly() || taken > allowed)) {
            terms.add(term("left", left(allowed - taken)));
        }
        addRecords(terms, e.uptake());
        return terms;
    }

    private String closedLimit(Entry e, LimitView closure) {
        return e.allowed() == null
                ? rows.limit(closure)
                : texts.get("season.closed", rows.limit(closure), rows.limit(e.allowed()));
    }

    private String left(double tonnes) {
        return tonnes < 0
                ? texts.get("season.over", Figures.tonnes(-tonnes))
                : texts.get("season.left", Figures.tonnes(tonnes));
    }

    private void addRecords(List<StockPage.Term> terms, @Nullable UptakeView uptake) {
        if (uptake == null) {
            return;
        }
        if (uptake.recordedUpTo() != null) {
            terms.add(term("recorded", Figures.date(uptake.recordedUpTo())));
        }
        if (!uptake.silentCooperatives().isEmpty()) {
            terms.add(term("silent", String.join(", ", uptake.silentCooperatives())));
        }
    }

    /** Evidence strength, how many records of each kind it comes from, and whether the estimation settled. */
    String strength(AssessmentView a, Evidence evidence) {
        String strength = texts.get(
                "basis.strength",
                rows.strength(a.strength()),
                (int) evidence.catches().stream().map(c -> c.year()).distinct().count(),
                evidence.surveys().size(),
                (int) evidence.surveys().stream()
                        .map(s -> s.series())
                        .distinct()
                        .count(),
                (int) evidence.effort().stream().map(x -> x.year()).distinct().count(),
                evidence.events().size());
        return strength + " " + texts.get(a.settled() ? "basis.settled" : "basis.unsettled");
    }

    String method(AssessmentView a) {
        return texts.get("basis.method", a.method(), Integer.toString(a.number()), Figures.dateTime(a.madeAt()));
    }

    private StockPage.Term term(String key, String text) {
        return new StockPage.Term(texts.get("term." + key), text);
    }
}
