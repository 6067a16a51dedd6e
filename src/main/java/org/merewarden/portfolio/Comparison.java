package org.merewarden.portfolio;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.inference.Posterior;
import org.springframework.stereotype.Service;

/** Sets the equilibrium curves of chosen stocks beside each other and says which could not be. */
@Service
class Comparison {
    static final int MOST = 12;

    private final Portfolio portfolio;
    private final Assessments assessments;
    private final CompareViews views;
    private final Texts texts;

    Comparison(Portfolio portfolio, Assessments assessments, CompareViews views, Texts texts) {
        this.portfolio = portfolio;
        this.assessments = assessments;
        this.views = views;
        this.texts = texts;
    }

    /**
     * @param asked keys lake:species, the first twelve different ones count
     * @param focus key of the stock that is drawn with arrows, band and cloud; else the first
     */
    CompareView view(List<String> asked, Axes axes, @Nullable String focus) {
        List<String> different = asked.stream().distinct().toList();
        List<String> keys = different.stream().limit(MOST).toList();
        Map<String, Entry> known = keys.isEmpty() ? Map.of() : known();
        List<Entry> chosen =
                keys.stream().filter(known::containsKey).map(known::get).toList();
        List<StockCurve> curves = chosen.stream().flatMap(this::curve).toList();
        List<String> sentences = new ArrayList<>();
        if (different.size() > MOST) {
            sentences.add(texts.get("compare.most", MOST, different.size()));
        }
        name(sentences, "compare.unknown", keys.stream().filter(k -> !known.containsKey(k)));
        name(
                sentences,
                "compare.unassessed",
                chosen.stream()
                        .filter(e -> curves.stream().noneMatch(c -> c.entry() == e))
                        .map(e -> e.stock().title()));
        return views.view(curves, axes, focus, keys, sentences);
    }

    private Map<String, Entry> known() {
        return portfolio.entries(portfolio.presentSeason()).stream()
                .collect(Collectors.toMap(e -> e.stock().key(), Function.identity()));
    }

    private void name(List<String> sentences, String text, Stream<String> names) {
        String all = names.collect(Collectors.joining(", "));
        if (!all.isEmpty()) {
            sentences.add(texts.get(text, all));
        }
    }

    private Stream<StockCurve> curve(Entry entry) {
        AssessmentView assessment = entry.assessment();
        if (assessment == null) {
            return Stream.empty();
        }
        Posterior posterior = assessments.posterior(assessment.id());
        return posterior.draws() == 0 ? Stream.empty() : Stream.of(StockCurve.of(entry, assessment, posterior));
    }
}
