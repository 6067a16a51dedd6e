package org.merewarden.web;

import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import java.sql.SQLException;
import org.springframework.core.NestedExceptionUtils;
import org.springframework.dao.DataIntegrityViolationException;
import org.springframework.dao.OptimisticLockingFailureException;
import org.springframework.http.HttpStatus;
import org.springframework.web.bind.annotation.ControllerAdvice;
import org.springframework.web.bind.annotation.ExceptionHandler;

/** Two people changed the same thing and the page they came from did not show both texts itself: the loser is told. */
@ControllerAdvice
class Conflicts {
    /** SQL's own state for a key that is taken, the same on H2 and PostgreSQL. */
    private static final String UNIQUE_VIOLATION = "23505";

    @ExceptionHandler(OptimisticLockingFailureException.class)
    void conflict(HttpServletResponse response) throws IOException {
        response.sendError(HttpStatus.CONFLICT.value());
    }

    /** Two people added the same code at the same moment; any other broken rule of the store is a defect and goes on. */
    @ExceptionHandler(DataIntegrityViolationException.class)
    void taken(DataIntegrityViolationException problem, HttpServletResponse response) throws IOException {
        if (!(NestedExceptionUtils.getMostSpecificCause(problem) instanceof SQLException sql)
                || !UNIQUE_VIOLATION.equals(sql.getSQLState())) {
            throw problem;
        }
        response.sendError(HttpStatus.CONFLICT.value());
    }
}
