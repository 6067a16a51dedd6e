package org.merewarden.assessment;

import java.util.List;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.prior.Estimate;
import org.merewarden.core.prior.LakeYield;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** What the lake itself leads to expect: each formula with its figure, its error and where it holds, in strings. */
@Component
class LakeFormulas {
    /**
     * @param morphoedaphic whether the morphoedaphic index is among the formulas
     * @param together all of them as one expectation: "150 (40–560)" t a year
     */
    record View(List<Row> rows, boolean morphoedaphic, String together) {}

    /** @param error the factor either way in two cases of three */
    record Row(String source, String tonnes, String perHectare, String error, String validity) {}

    /** No rows where no formula applies. */
    View view(Habitat habitat) {
        List<Estimate> estimates = LakeYield.predictTonnes(habitat);
        return new View(
                estimates.stream().map(e -> row(e, habitat.areaHectares())).toList(),
                estimates.stream().anyMatch(e -> e.source().startsWith("Ryder")),
                estimates.isEmpty() ? Figures.UNKNOWN : interval(Estimate.combined(estimates)));
    }

    private static Row row(Estimate e, double areaHectares) {
        return new Row(
                e.source(),
                interval(e),
                Figures.sig(1000 * e.value() / areaHectares),
                "× ÷ " + Figures.digits(Math.exp(e.logSd()), 2),
                e.validity());
    }

    private static String interval(Estimate e) {
        double factor = Math.exp(AssessmentWords.TEN_TO_MEDIAN * e.logSd());
        return Figures.interval(e.value(), e.value() / factor, e.value() * factor);
    }
}
