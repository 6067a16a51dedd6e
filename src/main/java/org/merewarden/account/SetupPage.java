package org.merewarden.account;

import jakarta.servlet.http.HttpServletResponse;
import jakarta.validation.Valid;
import java.util.Locale;
import org.springframework.context.MessageSource;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.validation.BindingResult;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.PathVariable;
import org.springframework.web.bind.annotation.PostMapping;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.servlet.mvc.support.RedirectAttributes;

/** The first door: makes the first administrator, once. */
@Controller
@RequestMapping("/setup/{token}")
class SetupPage {
    private final SetupTokens tokens;
    private final MessageSource texts;

    SetupPage(SetupTokens tokens, MessageSource texts) {
        this.tokens = tokens;
        this.texts = texts;
    }

    @GetMapping
    String page(@PathVariable String token, @ModelAttribute("form") SetupForm form) {
        tokens.check(token);
        return "account/setup";
    }

    @PostMapping
    String use(
            @PathVariable String token,
            @Valid @ModelAttribute("form") SetupForm form,
            BindingResult errors,
            Locale locale,
            RedirectAttributes next,
            HttpServletResponse response) {
        tokens.check(token);
        AccountForm.checkUsername(form.getUsername(), errors);
        Passwords.check(form.getPassword(), "password", errors);
        if (errors.hasErrors()) {
            response.setStatus(HttpStatus.UNPROCESSABLE_CONTENT.value());
            return "account/setup";
        }
        tokens.use(token, SignInGuard.name(form.getUsername()), form.getDisplayName(), form.getPassword());
        next.addFlashAttribute("done", texts.getMessage("setup.done", null, locale));
        return "redirect:/sign-in";
    }
}
