package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;

import org.junit.jupiter.api.Test;
import org.merewarden.DemonstrationApplication;
import org.merewarden.Paper;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.test.web.servlet.MockMvc;

/** A notice of the demonstration is not to be taken for a real one. */
@DemonstrationApplication
class DemonstrationNoticeTest {
    @Autowired
    private MockMvc mvc;

    private byte[] answer(String address) throws Exception {
        return mvc.perform(get(address).with(user("ada").roles("CLERK")))
                .andReturn()
                .getResponse()
                .getContentAsByteArray();
    }

    @Test
    void pageAndPaperSayThatTheDataAreInvented() throws Exception {
        assertThat(new String(answer("/notices/1"), java.nio.charset.StandardCharsets.UTF_8))
                .contains("INVENTED DATA");
        try (Paper paper = new Paper(answer("/notices/1.pdf"))) {
            paper.picture(1, "notice-invented");
            for (int page = 1; page <= paper.pages(); page++) {
                assertThat(paper.text(page)).contains("INVENTED DATA · Notice 1");
            }
            assertThat(paper.text(1)).contains("INVENTED DATA. Every lake");
        }
    }
}
