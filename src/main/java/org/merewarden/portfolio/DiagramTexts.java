package org.merewarden.portfolio;

import java.util.List;
import org.merewarden.web.PageJson;
import org.springframework.stereotype.Component;

/** Words the equilibrium diagram. */
@Component
class DiagramTexts {
    private final Texts texts;

    DiagramTexts(Texts texts) {
        this.texts = texts;
    }

    Diagram diagram(List<StockCurve> curves, Axes axes, int focus) {
        return Diagram.of(
                curves,
                axes,
                focus,
                texts.get("axes." + axes.key() + ".x"),
                texts.get("axes." + axes.key() + ".y"),
                new Diagram.Words(
                        texts.get("diagram.stable"),
                        texts.get("diagram.unstable"),
                        texts.get("diagram.fold"),
                        texts.get("diagram.now"),
                        texts.get("diagram.limit"),
                        texts.get("diagram.cloud"),
                        texts.get("diagram.band")));
    }

    String large(Diagram diagram) {
        return DiagramDrawing.large(diagram, title(diagram));
    }

    String small(Diagram diagram) {
        return DiagramDrawing.small(diagram, title(diagram));
    }

    String onPaper(Diagram diagram) {
        return DiagramDrawing.onPaper(diagram, title(diagram));
    }

    String json(Diagram diagram) {
        return PageJson.of(diagram);
    }

    private String title(Diagram diagram) {
        List<String> names = diagram.stocks().stream().map(Diagram.Series::name).toList();
        return texts.get("diagram.title", String.join(", ", names));
    }
}
