package org.merewarden.assessment;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.prior.Estimate;
import org.merewarden.core.prior.LakeShare;
import org.merewarden.core.prior.LakeYield;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** How the stocks of a lake and its formulas compare, in sentences. */
@Component
class LakeYieldWords {
    private static final double ROUNDING = 1e-9;

    private final Texts texts;

    LakeYieldWords(Texts texts) {
        this.texts = texts;
    }

    /**
     * @param shares of every registered stock
     * @param summed the assessed ones
     * @param sum 10, 50 and 90 % quantiles of their summed MSY, t a year; null without any
     */
    List<String> sentences(
            Map<Long, LakeShare> shares, List<AssessmentView> summed, double @Nullable [] sum, Habitat habitat) {
        List<String> sentences = new ArrayList<>();
        if (sum != null) {
            sentences.add(texts.get(
                    summed.size() == 1 ? "lake.single" : "lake.sum",
                    summed.size(),
                    Figures.tonnes(sum[1]),
                    Figures.sig(sum[0]),
                    Figures.tonnes(sum[2])));
        }
        List<Estimate> estimates = LakeYield.predictTonnes(habitat);
        if (estimates.isEmpty()) {
            sentences.add(texts.get(habitat.kind().equals("river") ? "lake.river" : "lake.unknown"));
        } else {
            sentences.addAll(expected(Estimate.combined(estimates), sum, share(shares, summed)));
        }
        sentences.addAll(reservations(shares, summed));
        return sentences;
    }

    /** The lake's expectation, and whether the stocks' sum lies within their share of it. */
    private List<String> expected(Estimate lake, double @Nullable [] sum, double share) {
        double factor = Math.exp(AssessmentWords.TEN_TO_MEDIAN * lake.logSd());
        double low = lake.value() / factor;
        double high = lake.value() * factor;
        String expected =
                texts.get("lake.expected", Figures.tonnes(lake.value()), Figures.sig(low), Figures.tonnes(high));
        if (sum == null) {
            return List.of(expected);
        }
        String way = sum[1] > share * high ? "more" : sum[1] < share * low ? "less" : "agree";
        return List.of(
                expected,
                texts.get("lake.part-of-it", Figures.percent(share), Figures.tonnes(share * lake.value())),
                texts.get("lake." + way));
    }

    private List<String> reservations(Map<Long, LakeShare> shares, List<AssessmentView> summed) {
        List<String> sentences = new ArrayList<>();
        double all = shares.values().stream().mapToDouble(LakeShare::value).sum();
        if (all > 1 + ROUNDING) {
            sentences.add(texts.get("lake.too-much", Figures.percent(all)));
        }
        if (summed.size() < shares.size()) {
            sentences.add(texts.get("lake.unassessed", shares.size() - summed.size()));
        }
        long lakeOnly = summed.stream().filter(LakeYieldWords::lakeOnly).count();
        if (lakeOnly > 0) {
            sentences.add(texts.get("lake.circular", lakeOnly));
        }
        return sentences;
    }

    /** The share of the lake's yield that the priors of these stocks take together. */
    private static double share(Map<Long, LakeShare> shares, List<AssessmentView> summed) {
        return summed.stream()
                .map(a -> shares.get(a.stockId()))
                .filter(Objects::nonNull)
                .mapToDouble(LakeShare::value)
                .sum();
    }

    static boolean lakeOnly(AssessmentView a) {
        return a.lastYear() < a.firstYear();
    }
}
