package org.merewarden.sharing;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.time.Clock;
import java.time.Instant;
import java.util.List;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.waterbody.CooperativeView;
import org.merewarden.waterbody.Register;
import org.merewarden.web.Choice;
import org.merewarden.web.Figures;
import org.merewarden.web.FormBinding;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.WebDataBinder;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.InitBinder;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;
import org.springframework.web.servlet.support.ServletUriComponentsBuilder;

/** The office's side of share links: make, see the last use, revoke. */
@Controller
class ShareController {
    private final ShareLinks links;
    private final Register register;
    private final MessageSource messages;
    private final Clock clock;

    ShareController(ShareLinks links, Register register, MessageSource messages, Clock clock) {
        this.links = links;
        this.register = register;
        this.messages = messages;
        this.clock = clock;
    }

    record Row(
            long id,
            String cooperative,
            String label,
            String made,
            String expires,
            String lastUsed,
            String state,
            boolean open) {}

    @InitBinder("form")
    void binder(WebDataBinder binder) {
        FormBinding.numbers(binder);
    }

    @GetMapping("/shares")
    String list(Model model) {
        return show(new ShareForm(), model);
    }

    /**
     * Shows the link in the answer itself, without a redirect: what carries a message over a redirect would have to keep
     * the token.
     */
    @PostMapping("/shares")
    String make(
            @Valid @ModelAttribute("form") ShareForm form,
            BindingResult errors,
            Model model,
            HttpServletResponse response) {
        Optional<CooperativeView> cooperative = register.cooperative(form.getCooperative());
        if (cooperative.isEmpty() && !errors.hasFieldErrors("cooperative")) {
            errors.rejectValue("cooperative", "sharing.unknown", word("sharing.unknown-cooperative"));
        }
        Integer days = form.getDays();
        if (errors.hasErrors() || cooperative.isEmpty() || days == null) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return show(form, model);
        }
        String token = links.make(cooperative.get(), form.getLabel().isEmpty() ? null : form.getLabel(), days);
        model.addAttribute(
                "link",
                ServletUriComponentsBuilder.fromCurrentContextPath()
                        .path("/view/" + token)
                        .toUriString());
        model.addAttribute("linkFor", cooperative.get().name());
        return show(new ShareForm(), model);
    }

    @PostMapping("/shares/{id}/revoke")
    String revoke(@PathVariable long id, RedirectAttributes flash) {
        boolean revoked = links.revoke(id);
        flash.addFlashAttribute(revoked ? "done" : "refused", word(revoked ? "sharing.revoked" : "sharing.not-open"));
        return "redirect:/shares";
    }

    private String show(ShareForm form, Model model) {
        Instant now = clock.instant();
        List<Row> rows = links.all().stream().map(link -> row(link, now)).toList();
        model.addAttribute("form", form);
        model.addAttribute("rows", rows);
        model.addAttribute("open", rows.stream().filter(Row::open).count());
        model.addAttribute(
                "cooperatives",
                register.cooperatives().stream()
                        .map(c -> new Choice(c.code(), c.name()))
                        .toList());
        return "sharing/shares";
    }

    private Row row(ShareLinks.Link link, Instant now) {
        boolean open = link.revokedAt() == null && link.expiresAt().isAfter(now);
        String state = link.revokedAt() != null
                ? word("sharing.state.revoked", Figures.dateTime(link.revokedAt()), link.revokedBy())
                : word(open ? "sharing.state.open" : "sharing.state.expired");
        return new Row(
                link.id(),
                link.cooperative(),
                link.label() == null ? "" : link.label(),
                word("sharing.made-by", Figures.dateTime(link.createdAt()), link.createdBy()),
                Figures.dateTime(link.expiresAt()),
                Figures.dateTime(link.lastUsedAt()),
                state,
                open);
    }

    private String word(String key, @Nullable Object... values) {
        return messages.getMessage(key, values, LocaleContextHolder.getLocale());
    }
}
