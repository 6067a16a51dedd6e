package org.merewarden.advice;

import org.jspecify.annotations.Nullable;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Texts;
import org.springframework.dao.DuplicateKeyException;
import org.springframework.dao.PessimisticLockingFailureException;
import org.springframework.dao.QueryTimeoutException;
import org.springframework.stereotype.Component;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Stores what was sent once and says what became of it. */
@Component
class ProposalDesk {
    private final Proposals proposals;
    private final LimitHistory history;
    private final Texts texts;

    ProposalDesk(Proposals proposals, LimitHistory history, Texts texts) {
        this.proposals = proposals;
        this.history = history;
        this.texts = texts;
    }

    /** What is to be done with a proposal. */
    enum Act {
        DRAFT,
        PROPOSE,
        CLOSE
    }

    /** Where to go next, with a sentence for that page. */
    String store(StockView stock, Proposal proposal, Act act, RedirectAttributes flash) {
        String key = proposal.limit().terms().entryKey();
        if (!before(key, flash)) {
            try {
                long id = stored(proposal, act);
                String state = history.file(id).orElseThrow().state();
                flash.addFlashAttribute("done", texts.of("advice.written." + state, Long.toString(id)));
            } catch (DuplicateKeyException e) {
                if (!before(key, flash)) {
                    flash.addFlashAttribute("refused", texts.of("advice.draft.gone"));
                }
            } catch (PessimisticLockingFailureException | QueryTimeoutException e) {
                flash.addFlashAttribute("refused", texts.of("advice.busy"));
            } catch (NotAllowed e) {
                flash.addFlashAttribute("refused", texts.of(String.valueOf(e.getMessage())));
            }
        }
        return "redirect:" + stock.path() + "/advice";
    }

    private long stored(Proposal proposal, Act act) {
        return switch (act) {
            case DRAFT -> proposals.draft(proposal);
            case PROPOSE -> proposals.propose(proposal);
            case CLOSE -> proposals.close(proposal);
        };
    }

    /** A form that was sent twice is stored once; somebody who changed it in between must know that. */
    private boolean before(@Nullable String key, RedirectAttributes flash) {
        if (key == null) {
            return false;
        }
        var number = history.ofKey(key);
        number.ifPresent(
                id -> flash.addFlashAttribute("refused", texts.of("advice.written.before", Long.toString(id))));
        return number.isPresent();
    }
}
