package org.merewarden.web;

import jakarta.servlet.RequestDispatcher;
import jakarta.servlet.http.HttpServletRequest;
import java.util.Set;
import java.util.UUID;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.boot.webmvc.error.ErrorAttributes;
import org.springframework.boot.webmvc.error.ErrorController;
import org.springframework.http.HttpStatus;
import org.springframework.stereotype.Controller;
import org.springframework.ui.Model;
import org.springframework.web.bind.annotation.RequestMapping;
import org.springframework.web.context.request.ServletWebRequest;

/** One page for whatever went wrong: says what to do, never what is inside. An unexpected error gets an id, also logged. */
@Controller
class ErrorPages implements ErrorController {
    private static final Logger log = LoggerFactory.getLogger(ErrorPages.class);
    private static final Set<Integer> EXPLAINED = Set.of(403, 404, 405, 409, 413, 422, 429);

    private final ErrorAttributes errors;

    ErrorPages(ErrorAttributes errors) {
        this.errors = errors;
    }

    @RequestMapping("/error")
    String error(HttpServletRequest request, Model model) {
        int status = request.getAttribute(RequestDispatcher.ERROR_STATUS_CODE) instanceof Integer code ? code : 404;
        if (status >= 500) {
            model.addAttribute("id", logged(request));
        }
        String kind = EXPLAINED.contains(status)
                ? Integer.toString(status)
                : HttpStatus.valueOf(status).is4xxClientError() ? "4xx" : "500";
        model.addAttribute("kind", kind);
        return "error";
    }

    private String logged(HttpServletRequest request) {
        String id = UUID.randomUUID().toString().substring(0, 8);
        log.error(
                "error {} at {} {}",
                id,
                request.getMethod(),
                request.getAttribute(RequestDispatcher.ERROR_REQUEST_URI),
                errors.getError(new ServletWebRequest(request)));
        return id;
    }
}
