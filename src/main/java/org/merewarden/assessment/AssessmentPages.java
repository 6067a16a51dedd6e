package org.merewarden.assessment;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.TreeMap;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.prior.Priors;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** Brings the page of one stored assessment together. */
@Component
class AssessmentPages {
    private final Assessments assessments;
    private final AssessmentWords words;
    private final LearnedRows learned;
    private final ChecksBuilder checks;
    private final LakeFormulas formulas;
    private final Texts texts;

    AssessmentPages(
            Assessments assessments,
            AssessmentWords words,
            LearnedRows learned,
            ChecksBuilder checks,
            LakeFormulas formulas,
            Texts texts) {
        this.assessments = assessments;
        this.words = words;
        this.learned = learned;
        this.checks = checks;
        this.formulas = formulas;
        this.texts = texts;
    }

    AssessmentPage page(StockView stock, AssessmentView view) {
        Posterior posterior = assessments.posterior(view.id());
        Diagnostics diagnostics = posterior.diagnostics();
        Evidence evidence = assessments.evidence(view.id());
        double factor = LearnedRows.factor(diagnostics);
        return new AssessmentPage(
                stock.title(),
                stock.path(),
                view.number(),
                lede(stock, view, posterior),
                view.verdict(),
                posterior.estimates().containsKey("pareto_k"),
                facts(view, posterior),
                quantities(posterior),
                words.taught(diagnostics),
                Figures.sig(factor),
                learned.rows(diagnostics, factor),
                diagnostics.learned().isEmpty() ? unlearned(posterior) : null,
                evidence.traits().stockedOnly() ? List.of() : learned.priors(diagnostics, evidence),
                lake(evidence),
                checks.checks(diagnostics),
                words.helps(diagnostics),
                estimates(posterior),
                seasons(posterior));
    }

    private List<String> lede(StockView stock, AssessmentView a, Posterior posterior) {
        List<String> lede = new ArrayList<>();
        if (!a.settled()) {
            lede.add(texts.get("lede.unsettled"));
        }
        if (posterior.draws() > 0) {
            lede.add(texts.get(
                    "lede.msy",
                    stock.title(),
                    Figures.tonnes(a.msyTonnes()),
                    Figures.sig(a.msyLowTonnes()),
                    Figures.tonnes(a.msyHighTonnes())));
            lede.add(texts.get(
                    "lede.biomass",
                    Integer.toString(posterior.lastYear() + 1),
                    Figures.tonnes(a.biomassTonnes()),
                    Figures.sig(a.biomassLowTonnes()),
                    Figures.tonnes(a.biomassHighTonnes()),
                    Figures.sig(a.bOverBmsy())));
        }
        if (posterior.draws() > 0 && posterior.seasons() == 0) {
            lede.add(texts.get("lede.lake-only"));
        }
        lede.add(texts.get("lede.made", Figures.dateTime(a.madeAt()), a.madeBy()));
        return lede;
    }

    private static AssessmentPage.Facts facts(AssessmentView view, Posterior posterior) {
        return new AssessmentPage.Facts(
                view.method(),
                view.strength().toLowerCase(Locale.ROOT),
                posterior.seasons() == 0 ? "" : posterior.firstYear() + "–" + posterior.lastYear(),
                Figures.dateTime(view.madeAt()),
                view.madeBy(),
                posterior.draws(),
                view.evidenceHash());
    }

    private String unlearned(Posterior posterior) {
        return texts.get(posterior.draws() > 0 && posterior.seasons() == 0 ? "unlearned.lake-only" : "unlearned");
    }

    /** Where MSY was first taken from the lake. */
    private LakeFormulas.@Nullable View lake(Evidence evidence) {
        if (evidence.traits().stockedOnly() || Priors.own(evidence, "msy_t").isPresent()) {
            return null;
        }
        LakeFormulas.View view = formulas.view(evidence.habitat());
        return view.rows().isEmpty() ? null : view;
    }

    private static List<AssessmentPage.Quantity> quantities(Posterior p) {
        if (p.draws() == 0) {
            return List.of();
        }
        List<AssessmentPage.Quantity> quantities = new ArrayList<>();
        quantities.add(quantity("msy_t", p, i -> p.msyTonnes()[i]));
        quantities.add(quantity("fmsy", p, i -> p.fmsyPerYear()[i]));
        quantities.add(quantity("k_t", p, p::capacity));
        quantities.add(quantity("bmsy_t", p, p::bmsy));
        quantities.add(quantity("biomass_t", p, p::presentBiomass));
        quantities.add(quantity("b_over_bmsy", p, i -> p.presentBiomass(i) / p.bmsy(i)));
        if (p.seasons() > 0) {
            quantities.add(quantity("f_over_fmsy", p, i -> fishingRatio(p, i, p.seasons() - 1)));
        }
        return quantities;
    }

    private static AssessmentPage.Quantity quantity(String name, Posterior posterior, IntToDoubleFunction ofDraw) {
        return new AssessmentPage.Quantity(name, interval(posterior, ofDraw));
    }

    private static double fishingRatio(Posterior p, int draw, int season) {
        return p.fishingPerYear()[draw][season] / p.fmsyPerYear()[draw];
    }

    private static String interval(Posterior posterior, IntToDoubleFunction ofDraw) {
        double[] values =
                IntStream.range(0, posterior.draws()).mapToDouble(ofDraw).toArray();
        double[] q = Quantiles.of(values, new double[] {0.1, 0.5, 0.9});
        return Figures.interval(q[1], q[0], q[2]);
    }

    private static Map<String, String> estimates(Posterior posterior) {
        Map<String, String> sorted = new TreeMap<>();
        posterior.estimates().forEach((name, value) -> sorted.put(name, Figures.digits(value, 6)));
        return sorted;
    }

    private static List<AssessmentPage.Season> seasons(Posterior p) {
        return p.draws() == 0
                ? List.of()
                : IntStream.rangeClosed(0, p.seasons())
                        .mapToObj(t -> season(p, t))
                        .toList();
    }

    private static AssessmentPage.Season season(Posterior p, int t) {
        boolean fished = t < p.seasons();
        return new AssessmentPage.Season(
                p.firstYear() + t,
                interval(p, i -> p.biomassTonnes()[i][t]),
                interval(p, i -> p.biomassTonnes()[i][t] / p.bmsy(i)),
                fished ? interval(p, i -> p.fishingPerYear()[i][t]) : Figures.UNKNOWN,
                fished ? interval(p, i -> fishingRatio(p, i, t)) : Figures.UNKNOWN,
                t < p.removalsTonnes()[0].length ? interval(p, i -> p.removalsTonnes()[i][t]) : Figures.UNKNOWN);
    }
}
