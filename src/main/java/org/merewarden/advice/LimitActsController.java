package org.merewarden.advice;

import java.util.function.Supplier;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Texts;
import org.springframework.dao.DuplicateKeyException;
import org.springframework.dao.PessimisticLockingFailureException;
import org.springframework.dao.QueryTimeoutException;
import org.springframework.stereotype.Controller;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Deciding about what was drafted or proposed. */
@Controller
class LimitActsController {
    private final Register register;
    private final Decisions decisions;
    private final Proposals proposals;
    private final Recommendations recommendations;
    private final Texts texts;

    LimitActsController(
            Register register, Decisions decisions, Proposals proposals, Recommendations recommendations, Texts texts) {
        this.register = register;
        this.decisions = decisions;
        this.proposals = proposals;
        this.recommendations = recommendations;
        this.texts = texts;
    }

    @PostMapping("/limits/{id}/issue")
    String issue(@PathVariable long id, @RequestParam(defaultValue = "") String reason, RedirectAttributes flash) {
        return act(
                id,
                () -> decisions.issue(id, reason.isBlank() ? null : reason.strip())
                        ? "advice.issued"
                        : "advice.issued.ahead",
                flash);
    }

    @PostMapping("/limits/{id}/refuse")
    String refuse(@PathVariable long id, @RequestParam(defaultValue = "") String reason, RedirectAttributes flash) {
        return act(
                id,
                () -> {
                    decisions.refuse(id, needed(reason));
                    return "advice.refused";
                },
                flash);
    }

    @PostMapping("/limits/{id}/withdraw")
    String withdraw(@PathVariable long id, @RequestParam(defaultValue = "") String reason, RedirectAttributes flash) {
        String page = act(
                id, () -> decisions.withdraw(id, needed(reason)) ? "advice.withdrawn.none" : "advice.withdrawn", flash);
        int season = decisions.find(id).season();
        return recommendations.advisable(season) ? page + "?season=" + season : page;
    }

    @PostMapping("/limits/{id}/discard")
    String discard(@PathVariable long id, RedirectAttributes flash) {
        return act(
                id,
                () -> {
                    proposals.discard(id);
                    return "advice.discarded";
                },
                flash);
    }

    private static String needed(String reason) {
        if (reason.isBlank()) {
            throw new NotAllowed("advice.reason.needed");
        }
        return reason.strip();
    }

    /** @param act does it and names the sentence that says so */
    private String act(long id, Supplier<String> act, RedirectAttributes flash) {
        NewLimit limit = decisions.find(id);
        StockView stock = register.stock(limit.stockId()).orElseThrow();
        try {
            flash.addFlashAttribute("done", texts.of(act.get(), Long.toString(id), AdviceView.season(limit.season())));
        } catch (NotAllowed e) {
            flash.addFlashAttribute("refused", texts.of(String.valueOf(e.getMessage()), Long.toString(id)));
        } catch (PessimisticLockingFailureException | QueryTimeoutException e) {
            flash.addFlashAttribute("refused", texts.of("advice.busy"));
        } catch (DuplicateKeyException e) {
            flash.addFlashAttribute("refused", texts.of("advice.decided", Long.toString(id)));
        }
        return "redirect:" + stock.path() + "/advice";
    }
}
