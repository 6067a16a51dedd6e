package org.merewarden.assessment;

import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Objects;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.evidence.Habitat;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.prior.LakeShare;
import org.merewarden.records.EvidenceReader;
import org.merewarden.waterbody.LakePart;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.waterbody.WaterBodyView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** On a water body's page: what the lake leads to expect, beside what its stocks' assessments add up to. */
@Component
class LakeYieldPart implements LakePart {
    private final Register register;
    private final EvidenceReader reader;
    private final Assessments assessments;
    private final LakeFormulas formulas;
    private final LakeYieldWords words;
    private final Texts texts;

    LakeYieldPart(
            Register register,
            EvidenceReader reader,
            Assessments assessments,
            LakeFormulas formulas,
            LakeYieldWords words,
            Texts texts) {
        this.register = register;
        this.reader = reader;
        this.assessments = assessments;
        this.formulas = formulas;
        this.words = words;
        this.texts = texts;
    }

    /**
     * @param stocks one row for each registered stock
     * @param sum of the assessed stocks' MSY; a dash without any
     */
    record View(
            List<String> sentences, LakeFormulas.View formulas, List<Row> stocks, String sum, String sumPerHectare) {}

    /**
     * @param share of the sum of medians
     * @param expected share of the lake's yield that the prior takes
     */
    record Row(String stock, String path, String msy, String share, String expected, String evidence) {}

    @Override
    public String template() {
        return "assessment/lake-yield";
    }

    @Override
    public View view(WaterBodyView lake) {
        List<StockView> stocks = register.stocks().stream()
                .filter(s -> s.waterBodyId() == lake.id())
                .toList();
        Map<Long, LakeShare> shares = reader.subjects(lake.id()).entrySet().stream()
                .collect(Collectors.toMap(
                        Map.Entry::getKey,
                        e -> LakeShare.of(e.getValue().habitat(), e.getValue().traits())));
        Map<Long, AssessmentView> latest =
                assessments.latest().stream().collect(Collectors.toMap(AssessmentView::stockId, Function.identity()));
        List<AssessmentView> summed = stocks.stream()
                .map(s -> latest.get(s.id()))
                .filter(LakeYieldPart::hasMsy)
                .toList();
        double @Nullable [] sum = summed.isEmpty() ? null : sum(summed);
        Habitat habitat = habitat(lake, Math.max(1, stocks.size()));
        double medians = summed.stream().mapToDouble(a -> orZero(a.msyTonnes())).sum();
        return new View(
                words.sentences(shares, summed, sum, habitat),
                formulas.view(habitat),
                stocks.stream()
                        .map(s -> row(s, latest.get(s.id()), medians, Objects.requireNonNull(shares.get(s.id()))))
                        .toList(),
                sum == null ? Figures.UNKNOWN : Figures.interval(sum[1], sum[0], sum[2]),
                sum == null ? Figures.UNKNOWN : Figures.sig(1000 * sum[1] / lake.areaHectares()));
    }

    private static boolean hasMsy(@Nullable AssessmentView a) {
        return a != null && a.msyTonnes() != null;
    }

    private static double orZero(@Nullable Double value) {
        return value == null ? 0 : value;
    }

    /** 10, 50 and 90 % quantiles of the sum, draw by draw: the stocks' errors are taken as independent. */
    private double[] sum(List<AssessmentView> summed) {
        List<double[]> draws = summed.stream()
                .map(a -> assessments.posterior(a.id()).msyTonnes())
                .toList();
        int count = draws.stream().mapToInt(d -> d.length).min().orElse(0);
        double[] sums = IntStream.range(0, count)
                .mapToDouble(i -> draws.stream().mapToDouble(d -> d[i]).sum())
                .toArray();
        return Quantiles.of(sums, new double[] {0.1, 0.5, 0.9});
    }

    private static Habitat habitat(WaterBodyView lake, int stocks) {
        return new Habitat(
                lake.kind(),
                lake.areaHectares(),
                lake.meanDepthMetres(),
                lake.dissolvedSolidsMgPerLitre(),
                lake.conductivityMicrosiemensPerCm(),
                lake.meanAirTemperatureCelsius(),
                stocks);
    }

    private Row row(StockView s, @Nullable AssessmentView a, double medians, LakeShare share) {
        Double msy = a == null ? null : a.msyTonnes();
        String strength = a == null
                ? texts.get("lake.not-assessed")
                : texts.of("strength." + a.strength().toLowerCase(Locale.ROOT));
        return new Row(
                s.population().isEmpty() ? s.speciesName() : s.speciesName() + " (" + s.population() + ")",
                s.path(),
                a == null ? Figures.UNKNOWN : Figures.interval(msy, a.msyLowTonnes(), a.msyHighTonnes()),
                msy == null || medians == 0 ? Figures.UNKNOWN : Figures.percent(msy / medians),
                texts.get("lake.share.words", Figures.percent(share.value()), share.words()),
                a != null && LakeYieldWords.lakeOnly(a) ? texts.get("lake.lake-only", strength) : strength);
    }
}
