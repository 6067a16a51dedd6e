package org.merewarden.browser;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;

import com.microsoft.playwright.Page;
import org.junit.jupiter.api.Test;
import org.merewarden.HeavyNotice;
import org.merewarden.Paper;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.boot.test.web.server.LocalServerPort;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;

/** The notice's page as a browser prints it. */
@WholeApplication
class NoticePrintBrowserTest {
    @LocalServerPort
    private int port;

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    @Test
    void aHeavyNoticeIsOnePage() throws Exception {
        HeavyNotice heavy = new HeavyNotice(mvc, jdbc, "print-lake").register();
        long id = heavy.propose(heavy.proposal(2123));
        heavy.decide(id, "issue", HeavyNotice.REMARK);
        String html = mvc.perform(get("/notices/" + id).with(user("ada").roles("CLERK")))
                .andReturn()
                .getResponse()
                .getContentAsString();
        try (Browsers browsers = Browsers.start();
                Page page = browsers.browser().newPage()) {
            // an address of the application, so that the page finds its style
            page.navigate("http://localhost:" + port + "/sign-in");
            page.setContent(html);
            page.waitForLoadState(com.microsoft.playwright.options.LoadState.NETWORKIDLE);
            try (Paper paper = new Paper(page.pdf(new Page.PdfOptions().setPreferCSSPageSize(true)))) {
                for (int p = 1; p <= paper.pages(); p++) {
                    paper.picture(p, "notice-printed");
                }
                assertThat(paper.text()).contains("123 t", "86.4 t", HeavyNotice.REASON, HeavyNotice.REMARK, "tobias");
                assertThat(paper.pages()).isEqualTo(1);
            }
        }
    }
}
