package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.awt.Rectangle;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.HeavyNotice;
import org.merewarden.Paper;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.test.web.servlet.MockMvc;

/** The notice as a file, read back by another library than the one that laid it out. */
@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class NoticePaperTest {
    /** A4 is 210 mm by 297 mm; the margins are 15 mm, 17 mm above, and hold running lines above and below. */
    private static final Rectangle WITHIN = new Rectangle(14, 5, 182, 287);

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcClient jdbc;

    private HeavyNotice heavy;

    @BeforeAll
    void register() {
        heavy = new HeavyNotice(mvc, jdbc, "paper-lake").register();
    }

    private Paper paper(long id) throws Exception {
        return new Paper(
                mvc.perform(get("/notices/" + id + ".pdf").with(user("ada").roles("CLERK")))
                        .andExpect(status().isOk())
                        .andExpect(content().contentType("application/pdf"))
                        .andReturn()
                        .getResponse()
                        .getContentAsByteArray());
    }

    private static void assertWithinMargins(Paper paper, String name) throws Exception {
        for (int page = 1; page <= paper.pages(); page++) {
            Rectangle ink = Paper.ink(paper.picture(page, name));
            assertThat(WITHIN.contains(ink)).as("page %d, ink %s", page, ink).isTrue();
            assertThat(ink.width).isGreaterThan(150);
        }
    }

    @Test
    void aHeavyNoticeIsOneTaggedPage() throws Exception {
        long id = heavy.propose(heavy.proposal(2120));
        heavy.decide(id, "issue", HeavyNotice.REMARK);
        try (Paper paper = paper(id)) {
            assertWithinMargins(paper, "notice-heavy");
            assertThat(paper.pages()).isEqualTo(1);
            assertThat(paper.title()).isEqualTo("Notice " + id);
            assertThat(paper.language()).isEqualTo("en");
            assertThat(paper.marked()).isTrue();
            assertThat(paper.tags()).contains("H1", "Table", "TH", "TD", "P", "L", "LI");
            assertThat(paper.fonts()).containsExactlyInAnyOrder("DejaVuSans", "DejaVuSans-Bold");
            // (123 − 3.25 − 4.5 − 0.75 − 6.5) × 0.8 = 86.4 t; an eighth of it is 10,800 kg
            assertThat(paper.text())
                    .contains("Notice " + id, "European perch in Broad Water of the Upper Valley", "2120", "Issued on")
                    .contains("123 t", "3.25 t", "4.5 t", "0.75 t", "6.5 t", "80%", "86.4 t")
                    .contains("12.5 %", "10,800 kg", "Landing Place 1", "Landing Place 8", "1 Feb 2120", "30 Nov 2120")
                    .contains(HeavyNotice.MEASURES, HeavyNotice.LEGAL, HeavyNotice.OBJECTION)
                    .contains(HeavyNotice.REASON, HeavyNotice.REMARK, "unassessed")
                    .contains("The model has no ages or sizes and cannot judge these measures.")
                    .contains("A limit is no entitlement", "proposed", "ines", "issued", "tobias")
                    .containsSubsequence(
                            "Notice " + id, "Where and by when", "From the limit", "Allocations", "A limit is no")
                    .doesNotContain("DRAFT", "WITHDRAWN", "SUPERSEDED", "INVENTED");
            assertWithinMargins(paper, "notice-heavy");
        }
    }

    @Test
    void itSaysWhatItIsUntilItBindsAndAfterwards() throws Exception {
        long first = heavy.propose(heavy.proposal(2121));
        assertMark(first, "DRAFT: not issued");
        heavy.decide(first, "issue", "Agreed.");
        long second = heavy.propose(heavy.proposal(2121));
        heavy.decide(second, "issue", "Agreed again.");
        assertMark(first, "SUPERSEDED: no longer in force");
        heavy.decide(second, "withdraw", "The ice broke late.");
        assertMark(second, "WITHDRAWN: no longer in force");
        long third = heavy.propose(heavy.proposal(2121));
        heavy.decide(third, "refuse", "Too high.");
        assertMark(third, "DRAFT: refused, never issued");
    }

    /** In the page, and on the paper both as a line of its own and in the head of each page. */
    private void assertMark(long id, String mark) throws Exception {
        String html = mvc.perform(get("/notices/" + id).with(user("ada").roles("CLERK")))
                .andReturn()
                .getResponse()
                .getContentAsString();
        assertThat(html).contains("<p class=\"stamp\">" + mark + "</p>", "/notices/" + id + ".pdf");
        try (Paper paper = paper(id)) {
            assertThat(paper.text().split(mark, -1))
                    .as("the mark and " + paper.pages() + " heads")
                    .hasSize(paper.pages() + 2);
            assertWithinMargins(paper, "notice-" + mark.split(":")[0].toLowerCase(java.util.Locale.ROOT));
        }
    }

    @Test
    void whatDoesNotFitGoesToAnotherPageAndIsNotCut() throws Exception {
        String endless = "x".repeat(2500) + " last words of the measures";
        String reason = "y".repeat(3000) + " last words of the reason";
        long id = heavy.propose(heavy.proposal(2122).with(r -> {
            r.setParameter("measures", endless);
            r.setParameter("reason", reason);
            return r;
        }));
        heavy.decide(id, "issue", "Agreed & \u0007 <b>so</b>.");
        try (Paper paper = paper(id)) {
            assertThat(paper.pages()).isGreaterThan(1);
            String text = paper.text();
            assertThat(text)
                    .contains("last words of the measures", "last words of the reason", "Agreed & \ufffd <b>so</b>.");
            assertThat(text.chars().filter(c -> c == 'x').count()).isGreaterThanOrEqualTo(2500);
            assertThat(text.chars().filter(c -> c == 'y').count()).isGreaterThanOrEqualTo(3000);
            assertThat(paper.text(paper.pages())).contains("issued", "tobias", "Notice " + id);
            assertWithinMargins(paper, "notice-endless");
        }
    }

    @Test
    void whereNoNoticeIsThereIsNoFile() throws Exception {
        mvc.perform(get("/notices/999999.pdf").with(user("ada").roles("CLERK"))).andExpect(status().isNotFound());
        mvc.perform(get("/notices/999999.pdf")).andExpect(status().is3xxRedirection());
    }
}
