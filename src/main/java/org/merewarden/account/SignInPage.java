package org.merewarden.account;

import java.util.List;
import org.springframework.beans.factory.ObjectProvider;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.ModelAttribute;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.bind.annotation.RequestParam;

/** The door. In the demonstration it shows the keys too. */
@Controller
class SignInPage {
    private final ObjectProvider<DemonstrationAccounts> demonstration;

    SignInPage(ObjectProvider<DemonstrationAccounts> demonstration) {
        this.demonstration = demonstration;
    }

    @ModelAttribute("keys")
    List<DemonstrationAccounts.Key> keys() {
        DemonstrationAccounts accounts = demonstration.getIfAvailable();
        return accounts == null ? List.of() : accounts.keys();
    }

    @GetMapping("/sign-in")
    String page(@RequestParam(required = false) String wrong, @RequestParam(required = false) String out, Model model) {
        model.addAttribute("problem", wrong == null ? null : "wrong");
        model.addAttribute("signedOut", out != null);
        return "account/sign-in";
    }

    /** Reached by a forward of the guard only, which has set the status. */
    @RequestMapping("/sign-in/later")
    String later(@RequestParam(required = false) String username, Model model) {
        model.addAttribute("problem", "later");
        model.addAttribute("username", username);
        return "account/sign-in";
    }
}
