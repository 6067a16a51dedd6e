package org.merewarden.assessment;

import java.util.ArrayList;
import java.util.List;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Help;
import org.merewarden.core.inference.Diagnostics.Learned;
import org.merewarden.core.prior.Prior;
import org.merewarden.web.Figures;
import org.springframework.context.MessageSource;
import org.springframework.stereotype.Component;

/**
 * What the records taught and what would teach more, in sentences. The bounds between the words are our judgement.
 *
 * <p>How far a parameter was narrowed is the length of its 80 % range after the records over that before, both of the
 * logarithm.
 */
@Component
public class AssessmentWords {
    /** Half the 80 % range of a normal density, in standard deviations. */
    static final double TEN_TO_MEDIAN = 1.2815515655446004;

    private static final double TAUGHT_NOTHING = 0.9;
    private static final double TAUGHT_LITTLE = 0.7;
    private static final double TAUGHT_MUCH = 0.4;
    private static final double NARROWED = 0.9;
    private static final double WORTH_SAYING = 0.02;

    private final Texts texts;

    public AssessmentWords(MessageSource messages) {
        this.texts = new Texts(messages);
    }

    /** One or two sentences; empty without diagnostics. */
    public List<String> taught(Diagnostics diagnostics) {
        List<Learned> estimated =
                diagnostics.learned().stream().filter(l -> l.overlap() != null).toList();
        if (!estimated.isEmpty() && estimated.stream().allMatch(AssessmentWords::taughtNothing)) {
            return List.of(texts.get("taught.nothing"));
        }
        List<String> sentences = new ArrayList<>();
        estimated.stream()
                .filter(l -> l.prior().parameter().equals("msy_t"))
                .findFirst()
                .ifPresent(msy -> sentences.add(msy(msy)));
        List<String> silent = estimated.stream()
                .filter(l -> !l.prior().parameter().equals("msy_t") && taughtNothing(l))
                .map(this::inSentence)
                .toList();
        if (!silent.isEmpty()) {
            sentences.add(texts.get("taught.silent", listed(silent)));
        }
        return sentences;
    }

    private String msy(Learned msy) {
        if (taughtNothing(msy)) {
            return texts.get("taught.msy.nothing");
        }
        double share = narrowed(msy);
        String range = share < NARROWED ? texts.get("taught.msy", share) : texts.get("taught.msy.as-wide");
        return range + moved(msy);
    }

    private String moved(Learned msy) {
        double low = low(msy.prior());
        double high = high(msy.prior());
        if (msy.median() >= low && msy.median() <= high) {
            return "";
        }
        return " " + texts.get(msy.median() < low ? "taught.lower" : "taught.higher");
    }

    private static boolean taughtNothing(Learned learned) {
        return learned.overlap() != null && learned.overlap() >= TAUGHT_NOTHING;
    }

    /** Length of the range after over that before, of the logarithm; 1 where nothing was known to be narrowed. */
    static double narrowed(Learned learned) {
        double before = 2 * TEN_TO_MEDIAN * learned.prior().logSd();
        double after = Math.log(learned.high() / learned.low());
        return before > 0 && Double.isFinite(after) ? after / before : 1;
    }

    static double low(Prior prior) {
        return prior.median() * Math.exp(-TEN_TO_MEDIAN * prior.logSd());
    }

    static double high(Prior prior) {
        return prior.median() * Math.exp(TEN_TO_MEDIAN * prior.logSd());
    }

    private String inSentence(Learned learned) {
        return texts.orElse(
                        "assessment.word." + learned.prior().parameter(),
                        learned.prior().parameter())
                + (learned.series().isEmpty() ? "" : " " + texts.get("word.of-series", learned.series()));
    }

    private String listed(List<String> names) {
        if (names.size() == 1) {
            return names.get(0);
        }
        return texts.get(
                "word.and", String.join(", ", names.subList(0, names.size() - 1)), names.get(names.size() - 1));
    }

    /** How much of a parameter's estimate comes from the records. */
    String overlap(@Nullable Double overlap) {
        if (overlap == null) {
            return texts.get("overlap.fixed");
        }
        String word = overlap >= TAUGHT_NOTHING
                ? "nothing"
                : overlap >= TAUGHT_LITTLE ? "little" : overlap >= TAUGHT_MUCH ? "much" : "most";
        return texts.get("overlap." + word, Figures.percent(overlap));
    }

    /** What further evidence would do, most helpful first; one sentence each. */
    public List<String> helps(Diagnostics diagnostics) {
        return diagnostics.helps().stream().map(this::help).toList();
    }

    private String help(Help help) {
        String what = texts.get("help." + help.gathering().name(), help.series());
        return help.narrowing() < WORTH_SAYING
                ? texts.get("help.hardly", what)
                : texts.get("help.narrows", what, Figures.percent(help.narrowing()));
    }
}
