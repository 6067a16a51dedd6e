package org.merewarden.advice;

import java.util.List;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.merewarden.web.OfficeSettings;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;

/** A limit on one printable page: draft until it is issued. */
@Controller
class NoticeController {
    private final Register register;
    private final Decisions decisions;
    private final LimitHistory history;
    private final Assessments assessments;
    private final OfficeSettings settings;
    private final LimitStore limits;

    NoticeController(
            Register register,
            Decisions decisions,
            LimitHistory history,
            Assessments assessments,
            OfficeSettings settings,
            LimitStore limits) {
        this.register = register;
        this.decisions = decisions;
        this.history = history;
        this.assessments = assessments;
        this.settings = settings;
        this.limits = limits;
    }

    record Part(String cooperative, String share, String amount) {}

    record Act(String act, String at, String by, String reason) {}

    record Notice(
            long number,
            String office,
            String stock,
            String stockPath,
            String season,
            String kind,
            String amount,
            List<String[]> setAsides,
            String toBeLogged,
            String validity,
            @Nullable String measures,
            @Nullable String legalBasis,
            @Nullable String objection,
            @Nullable String strength,
            String state,
            List<Part> parts,
            List<Act> acts) {}

    @GetMapping("/notices/{id}")
    String show(@PathVariable long id, Model model) {
        model.addAttribute("notice", notice(id));
        return "advice/notice";
    }

    private Notice notice(long id) {
        NewLimit limit = decisions.find(id);
        StockView stock = register.stock(limit.stockId()).orElseThrow();
        List<LimitHistory.Decision> acts = history.ofLimit(id);
        return new Notice(
                id,
                settings.get(OfficeSettings.OFFICE_NAME),
                stock.title(),
                stock.path(),
                AdviceView.season(limit.season()),
                limit.kind().replace(' ', '-'),
                limit.amount() == null ? "" : Figures.withUnit(limit.amount(), limit.unit()),
                setAsides(limit),
                AdviceView.toBeLogged(limit),
                Figures.date(limit.validFrom()) + " – " + Figures.date(limit.validTo()),
                limit.measures(),
                limit.legalBasis(),
                limit.objection(),
                strength(stock.id(), limit),
                state(acts),
                parts(id),
                acts.stream()
                        .map(d -> new Act(d.act(), d.when(), d.decidedBy(), d.reason()))
                        .toList());
    }

    /** Of the assessment that the proposal rested on, whatever was assessed since; papers know none, so the latest. */
    private @Nullable String strength(long stockId, NewLimit limit) {
        Optional<AssessmentView> assessment = limit.origin().equals("decided")
                ? assessments.ofStock(stockId).stream()
                        .filter(a -> Objects.equals(a.id(), limit.assessmentId()))
                        .findFirst()
                : assessments.latest(stockId);
        return assessment.map(AssessmentView::strength).orElse(null);
    }

    /** The latest act; a notice is a draft until it is issued. */
    private static String state(List<LimitHistory.Decision> acts) {
        return acts.get(acts.size() - 1).act();
    }

    private static List<String[]> setAsides(NewLimit limit) {
        return List.of(
                new String[] {"subsistence", Figures.tonnes(limit.subsistenceTonnes())},
                new String[] {"angling", Figures.tonnes(limit.anglingTonnes())},
                new String[] {"research", Figures.tonnes(limit.researchTonnes())},
                new String[] {"other", Figures.tonnes(limit.otherTonnes())});
    }

    private List<Part> parts(long id) {
        return limits.allocationsOf(id).stream()
                .map(a -> new Part(
                        a.cooperativeName(),
                        Figures.sig(a.sharePercent()) + " %",
                        Figures.withUnit((double) a.amountKg(), "kg")))
                .toList();
    }
}
