package org.merewarden.intake;

import static java.nio.charset.StandardCharsets.UTF_8;
import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;
import static org.hamcrest.Matchers.containsString;
import static org.hamcrest.Matchers.not;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.multipart;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.header;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.jsonPath;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.net.URI;
import java.net.http.HttpClient;
import java.net.http.HttpRequest;
import java.net.http.HttpResponse;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.boot.test.web.server.LocalServerPort;
import org.springframework.jdbc.core.JdbcTemplate;
import org.springframework.mock.web.MockMultipartFile;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;
import org.springframework.test.web.servlet.request.MockHttpServletRequestBuilder;
import org.springframework.test.web.servlet.request.MockMultipartHttpServletRequestBuilder;
import org.springframework.test.web.servlet.request.RequestPostProcessor;

/** An import from its upload to its end, through the pages. Every test brings gadgets under codes of its own. */
@WholeApplication
class ImportPagesTest {
    private static final String HEADER = "gadget_code,gadget_year,weight_t,colour\n";
    private static final RequestPostProcessor BIOLOGIST = user("ada").roles("BIOLOGIST");

    @LocalServerPort
    private int port;

    @Autowired
    private MockMvc mvc;

    @Autowired
    private JdbcTemplate jdbc;

    @Autowired
    private Importer importer;

    @Autowired
    private FolderImport folders;

    @Autowired
    private Tables tables;

    @Autowired
    private ImportStore store;

    private static MockMultipartFile file(String name, String text) {
        return new MockMultipartFile("files", name, "text/csv", text.getBytes(StandardCharsets.UTF_8));
    }

    private long upload(MockMultipartFile... files) throws Exception {
        MockMultipartHttpServletRequestBuilder request = multipart("/imports");
        for (MockMultipartFile file : files) {
            request.file(file);
        }
        String address = mvc.perform(request.with(BIOLOGIST).with(csrf()))
                .andExpect(status().is3xxRedirection())
                .andReturn()
                .getResponse()
                .getRedirectedUrl();
        return Long.parseLong(address.substring("/imports/".length()));
    }

    private ResultActions see(String address) throws Exception {
        return mvc.perform(get(address).with(BIOLOGIST));
    }

    private ResultActions act(String address, String... parameters) throws Exception {
        MockHttpServletRequestBuilder request = post(address).with(BIOLOGIST).with(csrf());
        for (int i = 0; i < parameters.length; i += 2) {
            request.param(parameters[i], parameters[i + 1]);
        }
        return mvc.perform(request);
    }

    private String version(long id) {
        return jdbc.queryForObject("select version from import_batch where id = ?", String.class, id);
    }

    private String state(long id) {
        return jdbc.queryForObject("select state from import_batch where id = ?", String.class, id);
    }

    private long row(long id, int line) {
        return jdbc.queryForObject(
                "select r.id from import_row r join import_file f on f.id = r.file_id"
                        + " where f.batch_id = ? and r.line_number = ?",
                Long.class,
                id,
                line);
    }

    private List<Double> weights(String code) {
        return jdbc.queryForList("select weight from test_gadget where code = ? order by yr", Double.class, code);
    }

    @Test
    void goesFromUploadByMendingToTheStoreAndComesBackTheSame() throws Exception {
        long id = upload(file(
                "test-gadgets.csv", HEADER + "way-a,2020,1,red\nway-a,2021,<b>,\nway-a,2022,-1,\nway-a,2023,4,\n"));
        String page = "/imports/" + id;
        see(page)
                .andExpect(status().isOk())
                .andExpect(content().string(containsString("2 refused, 2 new. Nothing is stored")))
                .andExpect(content().string(containsString("&lt;b&gt;")))
                .andExpect(content().string(containsString("a number such as 12.4 is needed")))
                .andExpect(content().string(containsString("colour")));
        act(page + "/commit", "version", version(id)).andExpect(status().isConflict());
        assertThat(weights("way-a")).isEmpty();

        String mend = page + "/rows/" + row(id, 3);
        see(mend).andExpect(content().string(containsString("value=\"&lt;b&gt;\"")));
        act(mend, "version", version(id), "cell.weight_t", "still wrong")
                .andExpect(status().isUnprocessableContent())
                .andExpect(content().string(containsString("still wrong")));
        act(mend, "version", version(id), "cell.weight_t", "2.5", "cell.no_such_column", "x")
                .andExpect(redirectedUrl(page));
        assertThat(jdbc.queryForMap("select * from import_row where id = ?", row(id, 3)))
                .containsEntry("mended_by", "ada")
                .containsEntry("fate", "NEW")
                .hasEntrySatisfying(
                        "original_cells", c -> assertThat(c.toString()).contains("<b>"))
                .hasEntrySatisfying(
                        "cells", c -> assertThat(c.toString()).contains("2.5").doesNotContain("no_such"));

        String leave = page + "/rows/" + row(id, 4) + "/left-out";
        act(leave, "version", version(id), "out", "true").andExpect(redirectedUrl(page));
        see(page + "?fate=left-out").andExpect(content().string(containsString("left out by ada")));
        act(leave, "version", version(id), "out", "false").andExpect(redirectedUrl(page));
        see(page).andExpect(content().string(containsString("1 refused")));
        act(leave, "version", version(id), "out", "true").andExpect(redirectedUrl(page));

        String version = version(id);
        act(page + "/commit", "version", version).andExpect(redirectedUrl(page));
        assertThat(weights("way-a")).containsExactly(1.0, 2.5, 4.0);
        act(page + "/commit", "version", version).andExpect(status().isConflict());
        act(page + "/commit", "version", version(id)).andExpect(status().isConflict());
        act(page + "/discard", "version", version(id)).andExpect(status().isConflict());
        act(mend, "version", version(id), "cell.weight_t", "9").andExpect(status().isConflict());
        assertThat(weights("way-a")).containsExactly(1.0, 2.5, 4.0);
        assertThat(jdbc.queryForList(
                        "select action from activity_entry where actor = 'ada' and subject = ?",
                        String.class,
                        "import " + id))
                .containsExactly("uploaded import", "committed import");
        see(page).andExpect(content().string(containsString("This is stored in the register")));
        see("/imports").andExpect(content().string(containsString("test-gadgets.csv")));

        long again = upload(file("test-gadgets.csv", HEADER + "way-a,2020,1,red\nway-a,2021,2.5,\nway-a,2023,5,\n"));
        see("/imports/" + again)
                .andExpect(content().string(containsString("1 changed, 2 the same as stored")))
                .andExpect(content().string(containsString("weight_t 4.0 → 5.0")));
        act("/imports/" + again + "/discard", "version", version(again)).andExpect(redirectedUrl("/imports/" + again));
        assertThat(state(again)).isEqualTo("DISCARDED");
        assertThat(weights("way-a")).containsExactly(1.0, 2.5, 4.0);
        see("/imports/" + again).andExpect(content().string(containsString("was discarded")));
    }

    @Test
    void letsALaterTableNameWhatAnEarlierOneBrings() throws Exception {
        long id = upload(
                file("test-parts.csv", "part_code,of_gadget,of_year\nref-1,ref-g,2020\nref-2,ref-unknown,2020\n"),
                file("test-gadgets.csv", HEADER + "ref-g,2020,1,\n"));
        see("/imports/" + id)
                .andExpect(content().string(containsString("no such gadget in that year")))
                .andExpect(content().string(containsString("1 refused, 2 new")));
        act("/imports/" + id + "/rows/" + row(id, 3) + "/left-out", "version", version(id), "out", "true");
        act("/imports/" + id + "/commit", "version", version(id)).andExpect(redirectedUrl("/imports/" + id));
        assertThat(jdbc.queryForList("select gadget from test_part where import_id = ?", String.class, id))
                .containsExactly("ref-g");
    }

    @Test
    void asksAgainWhenTheStoreChangedSinceThePreview() throws Exception {
        long first = upload(file("test-gadgets.csv", HEADER + "race,2020,1,\n"));
        long second = upload(file("test-gadgets.csv", HEADER + "race,2020,2,\n"));
        act("/imports/" + first + "/commit", "version", version(first)).andExpect(status().is3xxRedirection());
        act("/imports/" + second + "/commit", "version", version(second))
                .andExpect(status().isConflict())
                .andExpect(content().string(containsString("weight_t 1.0 → 2.0")));
        assertThat(weights("race")).containsExactly(1.0);
        act("/imports/" + second + "/commit", "version", version(second)).andExpect(status().is3xxRedirection());
        assertThat(weights("race")).containsExactly(2.0);
    }

    @Test
    void storesNothingWhenOneTableFails() throws Exception {
        long id = upload(
                file("test-gadgets.csv", HEADER + "half,2020,1,\n"),
                file("test-parts.csv", "part_code,of_gadget,of_year\nexplode,half,2020\n"));
        act("/imports/" + id + "/commit", "version", version(id)).andExpect(status().isConflict());
        assertThat(weights("half")).isEmpty();
        assertThat(state(id)).isEqualTo("EXAMINED");
    }

    @Test
    void asksForTheTableOfAFileItDoesNotKnow() throws Exception {
        long id = upload(file("what.csv", "colour,size\nred,1\n"), file("test-gadgets.csv", "gadget_code\nx\n"));
        see("/imports/" + id)
                .andExpect(content().string(containsString("It is not clear which table this is")))
                .andExpect(content().string(containsString("needs the columns gadget_year, weight_t")));
        List<Long> files =
                jdbc.queryForList("select id from import_file where batch_id = ? order by id", Long.class, id);
        String file = "/imports/" + id + "/files/" + files.get(0);
        act(file + "/table", "version", version(id), "table", "test-parts").andExpect(status().is3xxRedirection());
        see("/imports/" + id).andExpect(content().string(containsString("needs the columns part_code")));
        act(file + "/table", "version", version(id), "table", "no-such-table").andExpect(status().isNotFound());
        act(file + "/left-out", "version", version(id), "out", "true").andExpect(status().is3xxRedirection());
        act("/imports/" + id + "/commit", "version", version(id)).andExpect(status().isConflict());
        act("/imports/" + id + "/files/" + files.get(1) + "/left-out", "version", version(id), "out", "true");
        act("/imports/" + id + "/commit", "version", version(id)).andExpect(status().is3xxRedirection());
    }

    @Test
    void refusesAnUploadWithoutFilesAndUnknownImports() throws Exception {
        mvc.perform(multipart("/imports").with(BIOLOGIST).with(csrf())).andExpect(status().isUnprocessableContent());
        see("/imports/999999").andExpect(status().isNotFound());
        long id = upload(file("test-gadgets.csv", HEADER + "other,2020,1,\n"));
        see("/imports/999999/rows/" + row(id, 2)).andExpect(status().isNotFound());
    }

    /** Over a real connection: the server must read on, or the browser shows a broken connection and no sentence. */
    @Test
    void aFileBeyondTheLimitIsAnsweredWithASentence() throws Exception {
        String start = "--x\r\nContent-Disposition: form-data; name=\"files\"; filename=\"big.csv\"\r\n\r\n";
        byte[] file = new byte[51 * 1024 * 1024];
        HttpRequest request = HttpRequest.newBuilder(URI.create("http://localhost:" + port + "/imports"))
                .header("Content-Type", "multipart/form-data; boundary=x")
                .POST(HttpRequest.BodyPublishers.ofByteArrays(
                        List.of(start.getBytes(UTF_8), file, "\r\n--x--\r\n".getBytes(UTF_8))))
                .build();
        HttpResponse<String> answer = HttpClient.newHttpClient().send(request, HttpResponse.BodyHandlers.ofString());
        assertThat(answer.statusCode()).isEqualTo(413);
        assertThat(answer.body()).contains("larger than 50 MB");
    }

    @Test
    void showsManyRowsInPages() throws Exception {
        StringBuilder text = new StringBuilder(HEADER);
        for (int i = 0; i < 150; i++) {
            text.append("many-").append(i).append(",2020,1,\n");
        }
        long id = upload(file("test-gadgets.csv", text.toString()));
        see("/imports/" + id + "?fate=new")
                .andExpect(content().string(containsString("many-99 ")))
                .andExpect(content().string(not(containsString("many-100 "))))
                .andExpect(content().string(containsString("fate=new&amp;page=2")));
        see("/imports/" + id + "?fate=new&page=2").andExpect(content().string(containsString("many-149 ")));
    }

    @Test
    void describesTheFormats() throws Exception {
        see("/formats").andExpect(status().isOk()).andExpect(content().string(containsString("test-gadgets")));
        see("/formats/test-gadgets.csv")
                .andExpect(header().string("Content-Disposition", containsString("test-gadgets.csv")))
                .andExpect(content()
                        .string("gadget_code,gadget_year,gadget_sector,weight_t,share,pieces,seen_on,remark\r\n"));
        see("/formats/test-gadgets.json")
                .andExpect(jsonPath("$.primaryKey[2]").value("gadget_sector"))
                .andExpect(jsonPath("$.missingValues[0]").value(""))
                .andExpect(jsonPath("$.fields[1].type").value("year"))
                .andExpect(jsonPath("$.fields[1].constraints.maximum").value(2200))
                .andExpect(jsonPath("$.fields[3].constraints.required").value(true))
                .andExpect(jsonPath("$.fields[4].constraints.maximum").value(1.0));
        see("/formats/no-such.json").andExpect(status().isNotFound());
        see("/formats/datapackage.json").andExpect(jsonPath("$.resources").isNotEmpty());
    }

    @Test
    void loadsAFolderThroughTheSameExamination(@TempDir Path folder) throws Exception {
        Files.writeString(folder.resolve("test-gadgets.csv"), HEADER + "folder,2020,1,\n");
        Files.writeString(folder.resolve("readme.csv"), "nothing of ours");
        folders.load(folder.toUri().toString(), "a test");
        assertThat(weights("folder")).containsExactly(1.0);
        Files.writeString(folder.resolve("test-gadgets.csv"), HEADER + "folder,2021,1,\nfolder,2022,x,\n");
        assertThatThrownBy(() -> folders.load(folder.toUri().toString(), "a test"))
                .isInstanceOfSatisfying(
                        RefusedImport.class,
                        e -> assertThat(e.messages())
                                .hasSize(1)
                                .first()
                                .asString()
                                .startsWith("test-gadgets.csv, line 3, column weight_t, “x”: "));
        assertThat(weights("folder")).containsExactly(1.0);
    }

    @Test
    void findsNothingToRefuseInTheDemonstrationRegion() throws Exception {
        long id = importer.upload(FolderFiles.read(tables, "classpath:db-seed/"), "a test");
        assertThat(RefusedImport.of(store.files(id)).messages()).isEmpty();
        assertThat(store.files(id)).extracting(ImportedFile::refused).containsOnly(false);
    }

    /** Whatever comes, an upload ends as an import on record, and nothing reaches the register by itself. */
    @Test
    void keepsAnyUploadOutOfTheRegister() {
        Random random = new Random(3);
        byte[] good = (HEADER + "fuzz,2020,1,\"a\"\nfuzz,2021,2,ü\n").getBytes(StandardCharsets.UTF_8);
        int before = jdbc.queryForObject("select count(*) from test_gadget", Integer.class);
        for (int i = 0; i < 100; i++) {
            byte[] bytes = ReadingTest.mutated(good, random);
            long id =
                    importer.upload(List.of(new Upload(i % 2 == 0 ? "test-gadgets.csv" : "\u0000.xlsx", bytes)), null);
            assertThat(state(id)).isEqualTo("EXAMINED");
        }
        assertThat(jdbc.queryForObject("select count(*) from test_gadget", Integer.class))
                .isEqualTo(before);
    }
}
