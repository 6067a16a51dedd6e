package org.merewarden.web;

import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.sql.SQLException;
import org.junit.jupiter.api.Test;
import org.springframework.dao.DataIntegrityViolationException;
import org.springframework.dao.OptimisticLockingFailureException;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.setup.MockMvcBuilders;
import org.springframework.web.bind.annotation.GetMapping;
import org.springframework.web.bind.annotation.RestController;

class ConflictsTest {
    private final MockMvc mvc = MockMvcBuilders.standaloneSetup(new Rivals())
            .setControllerAdvice(new Conflicts())
            .build();

    @RestController
    static class Rivals {
        @GetMapping("/key")
        void sameKey() {
            throw new DataIntegrityViolationException("hibernate", new SQLException("unique", "23505"));
        }

        @GetMapping("/version")
        void sameVersion() {
            throw new OptimisticLockingFailureException("version");
        }

        @GetMapping("/defect")
        void defect() {
            throw new DataIntegrityViolationException("value too long", new SQLException("too long", "22001"));
        }
    }

    @Test
    void theLoserIsToldThatSomebodyElseWasFirst() throws Exception {
        mvc.perform(get("/key")).andExpect(status().isConflict());
        mvc.perform(get("/version")).andExpect(status().isConflict());
    }

    /** What no rule of a form has caught is a defect, and must not pass for somebody else's change. */
    @Test
    void aDefectIsNoConflict() {
        org.assertj.core.api.Assertions.assertThatThrownBy(() -> mvc.perform(get("/defect")))
                .hasCauseInstanceOf(DataIntegrityViolationException.class);
    }
}
