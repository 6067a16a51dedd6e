package org.merewarden.account;

import java.util.Locale;
import org.springframework.context.MessageSource;
import org.springframework.stereotype.Controller;
import org.springframework.validation.BindingResult;
import org.springframework.validation.MapBindingResult;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.bind.annotation.RequestParam;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** The single acts on an account: a new password, no longer may sign in, may again. */
@Controller
@RequestMapping("/accounts/{username}")
class AccountActs {
    private final Accounts accounts;
    private final MessageSource texts;

    AccountActs(Accounts accounts, MessageSource texts) {
        this.accounts = accounts;
        this.texts = texts;
    }

    @PostMapping("/password")
    String password(
            @PathVariable String username,
            @RequestParam(defaultValue = "") String password,
            Locale locale,
            RedirectAttributes next) {
        BindingResult errors = new MapBindingResult(new java.util.HashMap<>(), "password");
        Passwords.check(password, "password", errors);
        if (errors.getFieldError() != null) {
            next.addFlashAttribute("refused", texts.getMessage(errors.getFieldError(), locale));
            return back(username);
        }
        accounts.setPassword(username, password);
        return done(next, "account.done.password", username, locale);
    }

    @PostMapping("/disable")
    String disable(@PathVariable String username, Locale locale, RedirectAttributes next) {
        try {
            accounts.disable(username);
            return done(next, "account.done.disabled", username, locale);
        } catch (Accounts.LastAdministrator e) {
            next.addFlashAttribute("refused", texts.getMessage("account.last-administrator", null, locale));
            return back(username);
        }
    }

    @PostMapping("/enable")
    String enable(@PathVariable String username, Locale locale, RedirectAttributes next) {
        accounts.enable(username);
        return done(next, "account.done.enabled", username, locale);
    }

    private String done(RedirectAttributes next, String key, String username, Locale locale) {
        next.addFlashAttribute("done", texts.getMessage(key, new Object[] {username}, locale));
        return "redirect:/accounts";
    }

    /** Only names that are in the store come here, since each act looks the account up first. */
    private String back(String username) {
        return "redirect:/accounts/" + accounts.get(username).username();
    }
}
