package org.merewarden.advice;

import java.util.ArrayList;
import java.util.List;
import org.merewarden.assessment.Assessments;
import org.merewarden.core.evidence.EffortRecord;
import org.merewarden.core.policy.LimitRule;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** What the rule would allow in effort. */
@Component
class EffortWords {
    private final Assessments assessments;
    private final Texts texts;

    EffortWords(Assessments assessments, Texts texts) {
        this.assessments = assessments;
        this.texts = texts;
    }

    /** A sentence for each series of effort whose catchability the assessment knows. */
    List<String> of(AdviceWorking w) {
        var parameters = w.outlook().posterior().parameters();
        List<EffortRecord> effort = assessments.evidence(w.assessment().id()).effort();
        List<String> sentences = new ArrayList<>();
        for (String series :
                effort.stream().map(EffortRecord::series).distinct().sorted().toList()) {
            double[] q = parameters.getOrDefault(
                    "catchability:" + series + " (effort)", parameters.get("catchability:" + series));
            if (q != null) {
                sentences.add(texts.of(
                        "outlook.effort",
                        series,
                        Figures.withUnit(new LimitRule(w.policy()).effort(w.outlook(), q), unit(effort, series))));
            }
        }
        return sentences;
    }

    private String unit(List<EffortRecord> effort, String series) {
        return effort.stream()
                .filter(e -> e.series().equals(series))
                .map(EffortRecord::unit)
                .filter(unit -> unit != null && !unit.isBlank())
                .findFirst()
                .orElseGet(() -> texts.of("outlook.effort.unit"));
    }
}
