package org.merewarden.assessment;

import java.util.List;
import java.util.stream.DoubleStream;
import java.util.stream.Stream;
import org.merewarden.core.evidence.Evidence;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Learned;
import org.merewarden.core.prior.Prior;
import org.merewarden.core.prior.Priors;
import org.merewarden.web.Figures;
import org.merewarden.web.Svg;
import org.springframework.stereotype.Component;

/** Prior against posterior, one row for each parameter, all strips on one scale. */
@Component
class LearnedRows {
    private static final double[] SCALES = {3, 5, 10, 20, 50, 100};

    /** Log-sd of priors that leave a quantity open, as of a catchability in any unit. */
    private static final double SAYS_NOTHING = 3;

    private final AssessmentWords words;
    private final Texts texts;

    LearnedRows(AssessmentWords words, Texts texts) {
        this.words = words;
        this.texts = texts;
    }

    /** The least scale on which every range is whole, priors apart that were to say nothing; else the largest. */
    static double factor(Diagnostics diagnostics) {
        double furthest = diagnostics.learned().stream()
                .filter(l -> l.prior().logSd() < SAYS_NOTHING)
                .flatMapToDouble(l -> DoubleStream.of(
                                AssessmentWords.high(l.prior()), AssessmentWords.low(l.prior()), l.low(), l.high())
                        .map(end -> Math.exp(Math.abs(Math.log(end / l.prior().median())))))
                .max()
                .orElse(1);
        return DoubleStream.of(SCALES).filter(s -> s >= furthest).findFirst().orElse(SCALES[SCALES.length - 1]);
    }

    List<AssessmentPage.LearnedRow> rows(Diagnostics diagnostics, double factor) {
        return diagnostics.learned().stream().map(l -> row(l, factor)).toList();
    }

    private AssessmentPage.LearnedRow row(Learned l, double factor) {
        Prior prior = l.prior();
        boolean fixed = l.overlap() == null;
        String name = name(prior, l.series());
        String after = fixed ? Figures.sig(l.median()) : Figures.interval(l.median(), l.low(), l.high());
        Svg.Range thought = new Svg.Range(AssessmentWords.low(prior), prior.median(), AssessmentWords.high(prior));
        Svg.Range found = new Svg.Range(l.low(), l.median(), l.high());
        return new AssessmentPage.LearnedRow(
                name,
                Svg.beforeAndAfter(thought, found, factor, texts.get("strip", name, before(prior), after)),
                before(prior),
                after,
                words.overlap(l.overlap()));
    }

    /** The priors that were compared; where none were, those that follow from the stored evidence. */
    List<AssessmentPage.PriorRow> priors(Diagnostics diagnostics, Evidence evidence) {
        if (!diagnostics.learned().isEmpty()) {
            return diagnostics.learned().stream()
                    .map(l -> priorRow(l.prior(), l.series()))
                    .toList();
        }
        Priors priors = Priors.forStock(evidence);
        return Stream.of(priors.msy(), priors.fmsy(), priors.initialFraction())
                .map(p -> priorRow(p, ""))
                .toList();
    }

    private AssessmentPage.PriorRow priorRow(Prior prior, String series) {
        return new AssessmentPage.PriorRow(
                name(prior, series),
                before(prior),
                prior.logSd() == 0 ? texts.get("spread.fixed") : "× ÷ " + Figures.digits(Math.exp(prior.logSd()), 2),
                prior.source(),
                prior.validity(),
                prior.reason());
    }

    private static String before(Prior prior) {
        return prior.logSd() == 0
                ? Figures.sig(prior.median())
                : Figures.interval(prior.median(), AssessmentWords.low(prior), AssessmentWords.high(prior));
    }

    private String name(Prior prior, String series) {
        String name = texts.orElse("assessment.parameter." + prior.parameter(), prior.parameter());
        return series.isEmpty() ? name : name + ": " + series;
    }
}
