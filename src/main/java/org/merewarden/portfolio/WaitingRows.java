package org.merewarden.portfolio;

import java.util.List;
import java.util.Map;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.WaitingLimits;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** The proposals that wait for a decision, each leading to its stock's advice. */
@Component
class WaitingRows {
    private final WaitingLimits waiting;
    private final Texts texts;

    WaitingRows(WaitingLimits waiting, Texts texts) {
        this.waiting = waiting;
        this.texts = texts;
    }

    record Row(String text, String address) {}

    List<Row> of(List<Entry> entries) {
        Map<Long, StockView> stocks =
                entries.stream().map(Entry::stock).collect(Collectors.toMap(StockView::id, Function.identity()));
        return waiting.waiting().stream()
                .filter(proposal -> stocks.containsKey(proposal.stockId()))
                .map(proposal -> row(proposal, stocks.get(proposal.stockId())))
                .toList();
    }

    private Row row(WaitingLimits.Proposal proposal, @Nullable StockView stock) {
        String title = stock == null ? "" : stock.title();
        String path = stock == null ? "" : stock.path();
        String season = Integer.toString(proposal.season());
        return new Row(
                texts.get("waiting.row", title, amount(proposal), season), path + "/advice?season=" + season + "#open");
    }

    private String amount(WaitingLimits.Proposal proposal) {
        Double amount = proposal.amount();
        if (amount == null) {
            return texts.get("limit.measures");
        }
        return proposal.unit().equals("t") ? Figures.decided(amount) : Figures.withUnit(amount, proposal.unit());
    }
}
