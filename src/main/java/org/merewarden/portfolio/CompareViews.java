package org.merewarden.portfolio;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;
import org.springframework.web.util.UriComponentsBuilder;

/** Builds the comparison's page from the curves. */
@Component
class CompareViews {
    private final DiagramTexts diagrams;
    private final RowBuilder rows;
    private final Texts texts;

    CompareViews(DiagramTexts diagrams, RowBuilder rows, Texts texts) {
        this.diagrams = diagrams;
        this.rows = rows;
        this.texts = texts;
    }

    /** @param sentences what could not be shown */
    CompareView view(
            List<StockCurve> curves, Axes axes, @Nullable String focus, List<String> asked, List<String> sentences) {
        List<String> lede = new ArrayList<>(sentences);
        if (curves.isEmpty()) {
            lede.add(texts.get("compare.none"));
            return new CompareView(lede, null, null, List.of(), List.of(), List.of(), List.of());
        }
        lede.add(0, answer(curves));
        int focused = Math.max(0, index(curves, focus));
        Diagram diagram = diagrams.diagram(curves, axes, focused);
        return new CompareView(
                lede,
                diagrams.large(diagram),
                diagrams.json(diagram),
                axesLinks(asked, axes, key(curves.get(focused))),
                focusLinks(curves, asked, axes, focused),
                curves.stream().map(this::row).toList(),
                curves.size() < 2 ? List.of() : multiples(curves, axes));
    }

    private String answer(List<StockCurve> curves) {
        return curves.stream()
                .map(StockCurve::entry)
                .filter(e -> e.margin() != null)
                .min(Column.MARGIN.order(false))
                .map(e -> texts.get("compare.answer", curves.size(), e.stock().title(), Figures.percent(e.margin())))
                .orElseGet(() -> texts.get("compare.count", curves.size()));
    }

    private List<String> multiples(List<StockCurve> curves, Axes axes) {
        return curves.stream()
                .map(c -> diagrams.small(diagrams.diagram(List.of(c), axes, 0)))
                .toList();
    }

    private List<CompareView.Link> axesLinks(List<String> asked, Axes axes, String focus) {
        return Stream.of(Axes.values())
                .map(a -> new CompareView.Link(
                        texts.get("axes." + a.key()), address(asked, a, focus), a == axes ? "page" : null))
                .toList();
    }

    private static List<CompareView.Link> focusLinks(
            List<StockCurve> curves, List<String> asked, Axes axes, int focused) {
        return IntStream.range(0, curves.size())
                .mapToObj(i -> new CompareView.Link(
                        curves.get(i).entry().stock().title(),
                        address(asked, axes, key(curves.get(i))),
                        i == focused ? "page" : null))
                .toList();
    }

    private static String address(List<String> asked, Axes axes, String focus) {
        UriComponentsBuilder builder = UriComponentsBuilder.fromPath("/portfolio/compare");
        asked.forEach(key -> builder.queryParam("stock", key));
        return builder.queryParam("axes", axes.key())
                .queryParam("focus", focus)
                .encode()
                .build()
                .toUriString();
    }

    private CompareView.Row row(StockCurve c) {
        Entry e = c.entry();
        AssessmentView a = c.assessment();
        Double tipping = e.standing() == null ? null : e.standing().tippingBiomassTonnes();
        Spread now = c.biomassNow();
        return new CompareView.Row(
                e.stock().path(),
                e.stock().title(),
                Figures.interval(a.msyTonnes(), a.msyLowTonnes(), a.msyHighTonnes()),
                Figures.tonnes(c.law().capacityTonnes()),
                texts.get(
                        "compare.fold",
                        Figures.tonnes(c.fold().x()),
                        Figures.tonnes(c.fold().y())),
                Figures.interval(now.mid(), now.low80(), now.high80()),
                rows.limit(e.limit()),
                e.closed() ? texts.get("closed") : Figures.percent(e.margin()),
                Figures.tonnes(tipping),
                tipping == null ? Figures.UNKNOWN : Figures.tonnes(now.mid() - tipping));
    }

    private static int index(List<StockCurve> curves, @Nullable String key) {
        return IntStream.range(0, curves.size())
                .filter(i -> key(curves.get(i)).equals(key))
                .findFirst()
                .orElse(-1);
    }

    private static String key(StockCurve curve) {
        return curve.entry().stock().key();
    }
}
