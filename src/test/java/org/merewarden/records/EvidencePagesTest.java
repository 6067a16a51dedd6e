package org.merewarden.records;

import static org.assertj.core.api.Assertions.assertThat;
import static org.hamcrest.Matchers.allOf;
import static org.hamcrest.Matchers.containsString;
import static org.hamcrest.Matchers.not;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.get;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.post;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.content;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.header;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.model;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrl;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.util.List;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.TestRegion;
import org.merewarden.WholeApplication;
import org.merewarden.core.evidence.CatchRecord;
import org.merewarden.core.evidence.EventRecord;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.jdbc.core.simple.JdbcClient;
import org.springframework.security.test.context.support.WithMockUser;
import org.springframework.test.web.servlet.MockMvc;
import org.springframework.test.web.servlet.ResultActions;
import org.springframework.transaction.annotation.Transactional;

@WholeApplication
@Transactional
@WithMockUser(username = "berit", roles = "BIOLOGIST")
class EvidencePagesTest {
    private static final String EVIDENCE = "/stocks/paged-lake/FPE/evidence";

    @Autowired
    private MockMvc mvc;

    @Autowired
    private EvidenceReader reader;

    @Autowired
    private JdbcClient jdbc;

    private long stock;

    @BeforeEach
    void aStock() {
        TestRegion region = new TestRegion(jdbc);
        stock = region.stock(region.lake("paged-lake", "Paged Lake"), "FPE");
    }

    @Test
    void anEmptyStockSaysSo() throws Exception {
        mvc.perform(get(EVIDENCE))
                .andExpect(status().isOk())
                .andExpect(content().string(containsString("Nothing is recorded of this stock yet")));
    }

    @Test
    void recordsFindingsAndStripAreShown() throws Exception {
        TestRegion region = new TestRegion(jdbc);
        region.catches(stock, 2018, List.of(12.3456));
        region.catches(stock, 2021, List.of(9.0));
        region.index(stock, 2018, List.of(3.0));

        mvc.perform(get(EVIDENCE))
                .andExpect(content()
                        .string(allOf(
                                containsString("12.3456"),
                                containsString("nothing is recorded for 2019–2020"),
                                containsString("<svg class=\"strip\""),
                                containsString("2018–2021"))));
    }

    @Test
    void aCorrectionIsANewEntryAndTheOldOneStaysToBeSeen() throws Exception {
        enterCatch("12.4", "ledger").andExpect(redirectedUrl(EVIDENCE));
        enterCatch("12.9", "two slips found").andExpect(redirectedUrl(EVIDENCE));

        assertThat(reader.evidence(stock).catches())
                .containsExactly(new CatchRecord(2020, "commercial", 12.9, null, 1));
        assertThat(jdbc.sql("select count(*) from catch_record where stock_id = ?")
                        .param(stock)
                        .query(Integer.class)
                        .single())
                .isEqualTo(2);
        mvc.perform(get(EVIDENCE))
                .andExpect(content()
                        .string(allOf(
                                containsString("catch_t 12.4 → 12.9; source ledger → two slips found (by berit"),
                                containsString("catchT=12.9"))));
        assertThat(jdbc.sql("select before_text from activity_entry where action = 'corrected catches'"
                                + " and subject = 'European perch in Paged Lake, 2020'")
                        .query(String.class)
                        .single())
                .contains("12.4 → 12.9");
    }

    private ResultActions enterCatch(String tonnes, String source) throws Exception {
        return mvc.perform(post(EVIDENCE + "/catches/new")
                .with(csrf())
                .param("year", "2020")
                .param("sector", "commercial")
                .param("catchT", tonnes)
                .param("source", source));
    }

    @Test
    void theFormOfACorrectionStartsWithWhatIsInForce() throws Exception {
        mvc.perform(get(EVIDENCE + "/catches/new").param("year", "2020").param("catchT", "12.4"))
                .andExpect(status().isOk())
                .andExpect(content().string(allOf(containsString("value=\"12.4\""), containsString("value=\"2020\""))));
    }

    @Test
    void whatIsWrongIsSaidAtItsField() throws Exception {
        mvc.perform(post(EVIDENCE + "/catches/new")
                        .with(csrf())
                        .param("year", "20x0")
                        .param("sector", "poachers")
                        .param("catchT", "-1")
                        .param("reportedFraction", "1.5")
                        .param("source", ""))
                .andExpect(status().is(422))
                .andExpect(model().attributeHasFieldErrors("form", "year", "catchT", "reportedFraction", "source"))
                .andExpect(content().string(containsString("is no whole number: “20x0”")));
        enterSector("poachers")
                .andExpect(status().is(422))
                .andExpect(model().attributeHasFieldErrors("form", "sector"));
        mvc.perform(post(EVIDENCE + "/surveys/new")
                        .with(csrf())
                        .param("year", "2020")
                        .param("series", "marks")
                        .param("timeOfYear", "0.5")
                        .param("kind", "biomass")
                        .param("value", "30")
                        .param("source", "study"))
                .andExpect(status().is(422))
                .andExpect(model().attributeHasFieldErrors("form", "cv"));
        assertThat(reader.evidence(stock).seasons()).isEmpty();
    }

    private ResultActions enterSector(String sector) throws Exception {
        return mvc.perform(post(EVIDENCE + "/catches/new")
                .with(csrf())
                .param("year", "2020")
                .param("sector", sector)
                .param("catchT", "1")
                .param("source", "slip"));
    }

    @Test
    void typedFiguresObeyTheBoundsOfTheColumns() throws Exception {
        for (String effort : List.of("1e999", "1e300", "1,250")) {
            mvc.perform(post(EVIDENCE + "/effort/new")
                            .with(csrf())
                            .param("year", "2020")
                            .param("series", "nets")
                            .param("effort", effort)
                            .param("source", "ledger"))
                    .andExpect(status().is(422))
                    .andExpect(model().attributeHasFieldErrors("form", "effort"));
        }
        enterCatch("5000000", "a sea, in t").andExpect(redirectedUrl(EVIDENCE));
        enterCatch("100000001", "beyond all measure").andExpect(status().is(422));
        assertThat(jdbc.sql("select count(*) from effort_record where stock_id = ?")
                        .param(stock)
                        .query(Integer.class)
                        .single())
                .isZero();
    }

    @Test
    void anEventOfTheWaterReachesItsStock() throws Exception {
        mvc.perform(get("/water-bodies/paged-lake/events"))
                .andExpect(status().isOk())
                .andExpect(content().string(containsString("do not eat or sell")));
        enterKill("0.4", "0.3")
                .andExpect(status().is(422))
                .andExpect(model().attributeHasFieldErrors("form", "likely"));
        enterKill("0.1", "0.3").andExpect(redirectedUrl("/water-bodies/paged-lake/events"));

        assertThat(reader.evidence(stock).events())
                .containsExactly(new EventRecord("paged-kill", 2019, "fish kill", 0.1, 0.3, 0.5, null, null));
        mvc.perform(get("/water-bodies/paged-lake/events")).andExpect(content().string(containsString("paged-kill")));
        mvc.perform(get(EVIDENCE)).andExpect(content().string(containsString("paged-kill")));
    }

    private ResultActions enterKill(String low, String likely) throws Exception {
        return mvc.perform(post("/water-bodies/paged-lake/events")
                .with(csrf())
                .param("key", "paged-kill")
                .param("year", "2019")
                .param("date", "2019-07-02")
                .param("kind", "fish kill")
                .param("low", low)
                .param("likely", likely)
                .param("high", "0.5")
                .param("source", "warden’s report"));
    }

    @Test
    void theFileHasTheColumnsOfTheFormatAndNoFormula() throws Exception {
        enterCatch("12.4", "=HYPERLINK(1)").andExpect(redirectedUrl(EVIDENCE));

        mvc.perform(get(EVIDENCE + "/catches.csv"))
                .andExpect(header().string("Content-Disposition", containsString("preliminary-confidential")))
                .andExpect(content()
                        .string("water_body,species,population,year,sector,catch_t,cv,reported_fraction,source\r\n"
                                + "paged-lake,FPE,,2020,commercial,12.4,,,'=HYPERLINK(1)\r\n"));
    }

    @Test
    void whatIsNotThereIsNotFound() throws Exception {
        mvc.perform(get("/stocks/paged-lake/FPI/evidence")).andExpect(status().isNotFound());
        mvc.perform(get(EVIDENCE + "/priors/new")).andExpect(status().isNotFound());
        mvc.perform(get(EVIDENCE + "/nothing.csv")).andExpect(status().isNotFound());
        mvc.perform(get("/water-bodies/nowhere/events")).andExpect(status().isNotFound());
        mvc.perform(get(EVIDENCE)).andExpect(content().string(not(containsString("??"))));
    }
}
