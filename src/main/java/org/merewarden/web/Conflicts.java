package org.merewarden.web;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import org.springframework.dao.OptimisticLockingFailureException;
import org.springframework.http.HttpStatus;
import org.springframework.web.bind.annotation.ControllerAdvice;
import org.springframework.web.bind.annotation.ExceptionHandler;

/** Two people changed the same thing and the page they came from did not show both texts itself: the loser is told. */
@ControllerAdvice
class Conflicts {
    @ExceptionHandler(OptimisticLockingFailureException.class)
    void conflict(HttpServletResponse response) throws IOException {
        response.sendError(HttpStatus.CONFLICT.value());
    }
}
