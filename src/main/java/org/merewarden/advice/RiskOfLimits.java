package org.merewarden.advice;

import java.util.Optional;
import org.merewarden.core.inference.Posterior;
import org.merewarden.waterbody.StockView;
import org.springframework.stereotype.Service;

/** What the rule makes of a stock, for other features: its recommendation in a sentence and the risk curve. */
@Service
public class RiskOfLimits {
    private final Adviser adviser;
    private final OutlookPages pages;
    private final OutlookDrawings drawings;

    RiskOfLimits(Adviser adviser, OutlookPages pages, OutlookDrawings drawings) {
        this.adviser = adviser;
        this.pages = pages;
        this.drawings = drawings;
    }

    /**
     * @param curve finished SVG for a column of paper
     * @param posterior of the assessment that it rests on
     */
    public record Risk(String recommendation, String curve, long assessmentId, Posterior posterior) {}

    /** @return empty where the rule has nothing to work on for the season */
    public Optional<Risk> of(StockView stock, int season) {
        return adviser.work(stock.id(), season)
                .map(w -> new Risk(
                        pages.lede(w),
                        drawings.onPaper(w, drawings.curve(w), stock.title()),
                        w.assessment().id(),
                        w.outlook().posterior()));
    }
}
