package org.merewarden.sharing;

import jakarta.servlet.http.HttpServletResponse;
import org.merewarden.web.NotFound;
import org.springframework.http.HttpHeaders;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.PathVariable;

/** What a cooperative sees through its link; nobody signs in here. */
@Controller
class ViewController {
    private final ShareLinks links;
    private final CooperativePage page;

    ViewController(ShareLinks links, CooperativePage page) {
        this.links = links;
        this.page = page;
    }

    @GetMapping("/view/{token}")
    String view(@PathVariable String token, Model model, HttpServletResponse response) {
        response.setHeader("X-Robots-Tag", "noindex");
        response.setHeader(HttpHeaders.CACHE_CONTROL, "no-store");
        response.setHeader("Referrer-Policy", "no-referrer");
        // one and the same answer whether the token is unknown, expired or revoked
        long cooperative = links.open(token).orElseThrow(() -> new NotFound("share view"));
        model.addAttribute("content", page.of(cooperative));
        return "sharing/view";
    }
}
