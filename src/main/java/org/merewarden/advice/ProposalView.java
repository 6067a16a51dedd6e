package org.merewarden.advice;

import java.util.List;
import java.util.Optional;
import org.merewarden.waterbody.Register;
import org.merewarden.web.Choice;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** What stands around the fields in which a limit is typed. */
@Component
class ProposalView {
    private static final List<String> KINDS = List.of("catch", "effort", "measures only");

    private final Register register;
    private final Texts texts;

    ProposalView(Register register, Texts texts) {
        this.register = register;
        this.texts = texts;
    }

    /** One cooperative's allocation by hand; name is the field's. */
    record HandField(String name, String label) {}

    /**
     * The strings around the form.
     *
     * @param recommended there is something to differ from
     * @param hand a field for each cooperative with a right to the stock
     */
    record Proposing(
            String heading,
            String recommendation,
            boolean recommended,
            boolean provisional,
            String amountHint,
            String setAsidesHint,
            String termsHint,
            List<Choice> kinds,
            List<HandField> hand) {}

    Proposing page(long stockId, LimitForm form, LimitPrefill.Sources sources) {
        return new Proposing(
                heading(form, sources.season()),
                recommendation(sources),
                sources.advice().isPresent(),
                sources.advice().map(Adviser.Advice::provisional).orElse(false),
                amountHint(form, sources),
                setAsidesHint(form, sources),
                termsHint(form, sources),
                KINDS.stream()
                        .map(kind -> new Choice(kind, texts.of("advice.kind." + kind.replace(' ', '-'))))
                        .toList(),
                register.rightsOfStock(stockId).stream()
                        .map(r -> new HandField(
                                HandRules.field(r.cooperativeId()),
                                texts.of(
                                        "advice.form.hand.of",
                                        r.cooperativeName(),
                                        Figures.setPercent(r.sharePercent() / 100))))
                        .toList());
    }

    private String heading(LimitForm form, int season) {
        String of = AdviceView.season(season);
        if (form.draft != null) {
            return texts.of("advice.propose.draft", form.draft.toString(), of);
        }
        return texts.of(form.revision() ? "advice.propose.revision" : "advice.propose.season", of);
    }

    private String recommendation(LimitPrefill.Sources sources) {
        String season = AdviceView.season(sources.season());
        return sources.advice()
                .map(a -> texts.of(
                        a.provisional() ? "advice.recommended.provisional" : "advice.recommended",
                        season,
                        Figures.decided(a.limitTonnes()),
                        Integer.toString(a.policyNumber())))
                .orElseGet(() -> texts.of("advice.recommended.nothing", season));
    }

    private String amountHint(LimitForm form, LimitPrefill.Sources sources) {
        String last = sources.last()
                .map(file -> texts.of(
                        "advice.hint.last",
                        OpenProposals.amount(file.limit()),
                        AdviceView.season(file.limit().season()),
                        Long.toString(file.id())))
                .orElseGet(() -> texts.of("advice.hint.last.none"));
        boolean recommended = sources.advice().isPresent() && !form.revision() && form.draft == null;
        return recommended ? texts.of("advice.hint.amount") + " " + last : last;
    }

    private String setAsidesHint(LimitForm form, LimitPrefill.Sources sources) {
        if (form.draft != null) {
            return texts.of("advice.hint.draft", form.draft.toString());
        }
        if (sources.setAsides().isPresent() && !form.revision()) {
            return texts.of("advice.hint.setAsides.policy");
        }
        Optional<LimitFile> last = sources.last().filter(l -> sources.lastSetAsides() || form.revision());
        return last.map(l -> texts.of("advice.hint.terms", Long.toString(l.id())))
                .orElseGet(() -> texts.of("advice.hint.setAsides.none"));
    }

    private String termsHint(LimitForm form, LimitPrefill.Sources sources) {
        if (form.draft != null) {
            return texts.of("advice.hint.draft", form.draft.toString());
        }
        return sources.last()
                .map(l -> texts.of("advice.hint.terms", Long.toString(l.id())))
                .orElseGet(() -> texts.of("advice.hint.terms.none"));
    }
}
