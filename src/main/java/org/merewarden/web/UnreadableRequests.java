package org.merewarden.web;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import org.springframework.beans.InvalidPropertyException;
import org.springframework.http.HttpStatus;
import org.springframework.web.bind.annotation.ControllerAdvice;
import org.springframework.web.bind.annotation.ExceptionHandler;

/** A form names a field that no page offers, such as line −1 or line 300 of a slip: the sender's fault, not the office's. */
@ControllerAdvice
class UnreadableRequests {
    @ExceptionHandler(InvalidPropertyException.class)
    void noSuchField(HttpServletResponse response) throws IOException {
        response.sendError(HttpStatus.BAD_REQUEST.value());
    }
}
