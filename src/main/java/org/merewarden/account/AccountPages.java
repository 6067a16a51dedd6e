package org.merewarden.account;

import static java.util.Objects.requireNonNull;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import org.merewarden.web.Choice;
import org.springframework.context.MessageSource;
import org.springframework.dao.OptimisticLockingFailureException;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** Accounts: the list with the form for a new one, and one account with what can be done about it. */
@Controller
@RequestMapping("/accounts")
class AccountPages {
    private static final String LIST = "account/accounts";
    private static final String ONE = "account/account";

    private final Accounts accounts;
    private final MessageSource texts;

    AccountPages(Accounts accounts, MessageSource texts) {
        this.accounts = accounts;
        this.texts = texts;
    }

    @ModelAttribute("roles")
    List<Choice> roles(Locale locale) {
        return Arrays.stream(Role.values())
                .map(role -> new Choice(role.name(), texts.getMessage("role." + role, null, locale)))
                .toList();
    }

    @GetMapping
    String list(@ModelAttribute("form") AccountForm form, Model model, Locale locale) {
        List<AccountRow> rows = accounts.all().stream().map(a -> row(a, locale)).toList();
        model.addAttribute("rows", rows);
        return LIST;
    }

    @PostMapping
    String create(
            @Valid @ModelAttribute("form") AccountForm form,
            BindingResult errors,
            Model model,
            Locale locale,
            RedirectAttributes next,
            HttpServletResponse response) {
        String username = SignInGuard.name(form.getUsername());
        AccountForm.checkUsername(form.getUsername(), errors);
        form.checkWaters(errors);
        Passwords.check(form.getPassword(), "password", errors);
        if (accounts.exists(username)) {
            errors.rejectValue("username", "account.username.taken", new Object[] {username}, "taken");
        }
        if (errors.hasErrors()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return list(form, model, locale);
        }
        accounts.create(
                username, form.getDisplayName(), requireNonNull(form.getRole()), form.waterCodes(), form.getPassword());
        return done(next, "account.done.created", username, locale, "redirect:/accounts");
    }

    @GetMapping("/{username}")
    String one(@PathVariable String username, Model model, Locale locale) {
        Account account = accounts.get(username);
        model.addAttribute("form", AccountForm.of(account));
        return show(account, model, locale);
    }

    @PostMapping("/{username}")
    String describe(
            @PathVariable String username,
            @Valid @ModelAttribute("form") AccountForm form,
            BindingResult errors,
            Model model,
            Locale locale,
            RedirectAttributes next,
            HttpServletResponse response) {
        form.checkWaters(errors);
        if (!errors.hasErrors()) {
            try {
                accounts.describe(
                        username,
                        form.getVersion(),
                        form.getDisplayName(),
                        requireNonNull(form.getRole()),
                        form.waterCodes());
                return done(next, "account.done.changed", username, locale, "redirect:/accounts");
            } catch (Accounts.LastAdministrator e) {
                errors.rejectValue("role", "account.last-administrator");
            } catch (OptimisticLockingFailureException e) {
                response.setStatus(HttpStatus.CONFLICT.value());
                Account stored = accounts.get(username);
                model.addAttribute("stored", row(stored, locale));
                form.setVersion(stored.version());
                return show(stored, model, locale);
            }
        }
        response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
        return show(accounts.get(username), model, locale);
    }

    private String show(Account account, Model model, Locale locale) {
        model.addAttribute("account", row(account, locale));
        model.addAttribute("enabled", account.enabled());
        return ONE;
    }

    private AccountRow row(Account account, Locale locale) {
        return AccountRow.of(account, texts, locale);
    }

    private String done(RedirectAttributes next, String key, String username, Locale locale, String where) {
        next.addFlashAttribute("done", texts.getMessage(key, new Object[] {username}, locale));
        return where;
    }
}
