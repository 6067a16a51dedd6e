package org.merewarden.advice;

import static org.assertj.core.api.Assertions.assertThat;
import static org.merewarden.advice.LimitDesk.APPROVER;
import static org.merewarden.advice.LimitDesk.BIOLOGIST;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.multipart;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.header;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.nio.charset.StandardCharsets;
import java.security.MessageDigest;
import java.util.HexFormat;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Random;
import org.junit.jupiter.api.AfterAll;
import org.junit.jupiter.api.BeforeAll;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestInstance;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.mock.web.MockMultipartFile;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;

@WholeApplication
@TestInstance(TestInstance.Lifecycle.PER_CLASS)
class LimitPapersTest {
    @Autowired
    private LimitDesk desk;

    @Autowired
    private JdbcClient jdbc;

    @Autowired
    private MockMvc mvc;

    private long issued;
    private long open;

    @BeforeAll
    void register() throws Exception {
        var region = new TestRegion(jdbc);
        region.stock(region.lake("pap-lake", "Papers Lake"), "FPE");
        desk.recommendNothing();
        issued = desk.propose("/stocks/pap-lake/FPE", desk.fields(2151), BIOLOGIST);
        desk.act(issued, "issue", "A first ceiling.", APPROVER);
        open = desk.propose("/stocks/pap-lake/FPE", desk.fields(2152), BIOLOGIST);
    }

    @AfterAll
    void restore() {
        desk.restore();
    }

    private static Map<String, String> objection() {
        Map<String, String> fields = new LinkedHashMap<>();
        fields.put("objector", "Anglers’ association");
        fields.put("receivedOn", "2026-03-01");
        fields.put("text", "The set-aside is too small.");
        fields.put("answer", "");
        return fields;
    }

    @Test
    void objectionsAreNotedAndNeverChanged() throws Exception {
        assertThat(LimitDesk.said(desk.send("/limits/" + issued + "/objections", objection(), BIOLOGIST), "done"))
                .contains("is noted");
        Map<String, String> answered = objection();
        answered.put("answer", "It was one tonne last year too.");
        desk.send("/limits/" + issued + "/objections", answered, APPROVER);
        assertThat(desk.page("/limits/" + issued + "/papers", BIOLOGIST))
                .contains("Objections (2)")
                .contains("Anglers’ association, received 1 Mar 2026")
                .contains("It was one tonne last year too.");
        for (String[] bad : new String[][] {
            {"objector", "", "Name the organisation or role"},
            {"objector", "x".repeat(201), "At most 200 characters"},
            {"receivedOn", "2199-01-01", "2199-01-01 lies in the future"},
            {"receivedOn", "yesterday", "is no date such as"},
            {"text", " ", "Write down what was objected"}
        }) {
            Map<String, String> fields = objection();
            fields.put(bad[0], bad[1]);
            assertThat(LimitDesk.body(desk.send("/limits/" + issued + "/objections", fields, BIOLOGIST)
                            .andExpect(status().is(422))))
                    .contains(bad[2]);
        }
        assertThat(jdbc.sql("select count(*) from limit_objection where limit_id = ?")
                        .param(issued)
                        .query(Integer.class)
                        .single())
                .isEqualTo(2);
    }

    @Test
    void aLimitThatWasNotIssuedHasNoPapers() throws Exception {
        mvc.perform(get("/limits/" + open + "/papers").with(BIOLOGIST)).andExpect(status().isNotFound());
        desk.send("/limits/" + open + "/objections", objection(), BIOLOGIST).andExpect(status().isNotFound());
    }

    private ResultActions attach(String name, byte[] bytes) throws Exception {
        return mvc.perform(multipart("/limits/" + issued + "/signed-pages")
                .file(new MockMultipartFile("file", name, "application/octet-stream", bytes))
                .with(BIOLOGIST)
                .with(csrf()));
    }

    private static byte[] pdf(int size) {
        byte[] bytes = new byte[size];
        new Random(7).nextBytes(bytes);
        byte[] head = "%PDF-1.7\n".getBytes(StandardCharsets.US_ASCII);
        System.arraycopy(head, 0, bytes, 0, head.length);
        return bytes;
    }

    @Test
    void aSignedPageComesBackAsItWas() throws Exception {
        // more than two of the store's pieces, and not a whole number of them
        byte[] bytes = pdf(2_345_678);
        assertThat(LimitDesk.said(attach("../scans/Notice “7”.pdf", bytes), "done"))
                .contains("is kept");
        var kept = jdbc.sql("select id, file_name, sha256, attached_by from limit_attachment where limit_id = ?"
                        + " and media_type = 'application/pdf'")
                .param(issued)
                .query()
                .singleRow();
        assertThat(kept)
                .containsEntry("file_name", "Notice “7”.pdf")
                .containsEntry("attached_by", "ines")
                .containsEntry(
                        "sha256",
                        HexFormat.of()
                                .formatHex(MessageDigest.getInstance("SHA-256").digest(bytes)));
        mvc.perform(get("/limits/" + issued + "/signed-pages/" + kept.get("id")).with(BIOLOGIST))
                .andExpect(header().string("X-Content-Type-Options", "nosniff"))
                .andExpect(header().string("Content-Disposition", org.hamcrest.Matchers.startsWith("attachment; ")))
                .andExpect(header().string("Content-Type", "application/pdf"))
                .andExpect(content().bytes(bytes));
        // of another limit's address there is none
        mvc.perform(get("/limits/" + open + "/signed-pages/" + kept.get("id")).with(BIOLOGIST))
                .andExpect(status().isNotFound());
        assertThat(LimitDesk.body(attach("again.pdf", bytes).andExpect(status().is(422))))
                .contains("This very page is attached already.");
    }

    @Test
    void otherFilesAreRefusedByNameAndRule() throws Exception {
        assertThat(LimitDesk.body(attach("page.pdf", "<html>%PDF-".getBytes(StandardCharsets.US_ASCII))
                        .andExpect(status().is(422))))
                .contains("page.pdf is neither PDF nor JPEG nor PNG by its first bytes.");
        assertThat(LimitDesk.body(attach("large.pdf", pdf(10 * 1024 * 1024 + 1)).andExpect(status().is(422))))
                .contains("large.pdf has 10,485,761 bytes; a signed page has at most 10,485,760 (10 MiB).");
        assertThat(LimitDesk.body(attach("", new byte[0]).andExpect(status().is(422))))
                .contains("Choose a file");
        byte[] png = {(byte) 0x89, 'P', 'N', 'G', '\r', '\n', 0x1A, '\n', 0};
        assertThat(LimitDesk.said(attach("scan.png", png), "done")).contains("is kept");
        byte[] jpeg = {(byte) 0xFF, (byte) 0xD8, (byte) 0xFF, 0};
        assertThat(LimitDesk.said(attach("scan.jpg", jpeg), "done")).contains("is kept");
    }
}
