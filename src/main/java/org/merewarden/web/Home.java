package org.merewarden.web;

import org.springframework.stereotype.Controller;
import org.springframework.web.bind.annotation.GetMapping;

/** The bare address leads to the portfolio. */
@Controller
class Home {
    @GetMapping("/")
    String home() {
        return "redirect:/portfolio";
    }
}
